/** The line above the forecast chart that spells the month being read; without a reading, the last month of the forecast. */
import { markColour } from '@/app/_lib/tone';
import type { ForecastSeries, ForecastView } from '@/lib/brief/types';
import styles from './forecast-figure.module.css';

export function ForecastReadOut({ view, index }: { view: ForecastView; index: number }) {
  const row = view.rows[index];
  if (!row) return null;
  return (
    <dl className={styles.readOut}>
      <div className={styles.readMonth}>
        <dt className="visually-hidden">Month</dt>
        <dd>{row.label}</dd>
      </div>
      {view.series.map((series) => (
        <div key={series.key} className={styles.readSeries}>
          <dt>
            <SeriesSample series={series} />
            {series.name}
          </dt>
          <dd>{row.points[series.key]?.text || 'no count'}</dd>
        </div>
      ))}
    </dl>
  );
}

function SeriesSample({ series }: { series: ForecastSeries }) {
  const colour = markColour(series.tone);
  return (
    <svg width={26} height={10} aria-hidden="true" className={styles.sample}>
      <line
        x1={0}
        x2={26}
        y1={5}
        y2={5}
        stroke={colour}
        strokeWidth={2}
        strokeDasharray={series.isDashed ? '5 3' : undefined}
      />
      {series.marker === 'square-open' ? (
        <rect x={10} y={2} width={6} height={6} fill="var(--paper)" stroke={colour} strokeWidth={1.25} />
      ) : null}
      {series.marker === 'round' ? <circle cx={13} cy={5} r={3} fill={colour} /> : null}
    </svg>
  );
}
