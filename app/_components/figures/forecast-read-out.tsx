/** The line above the forecast chart that spells the month being read; without a reading, the last month of the forecast. */
import type { ForecastView } from '@/lib/brief/types';
import styles from './forecast-figure.module.css';
import { SeriesSample } from './series-sample';

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
            <SeriesSample tone={series.tone} isDashed={series.isDashed} marker={series.marker} />
            {series.name}
          </dt>
          <dd>{row.points[series.key]?.text || 'no count'}</dd>
        </div>
      ))}
    </dl>
  );
}
