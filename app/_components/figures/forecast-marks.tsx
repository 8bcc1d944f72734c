/** What stands around the lines of the forecast chart: axes, the line where the forecast begins, the firms' names at the line ends. */
import { textColour } from '@/app/_lib/tone';
import type { EventMark } from '@/lib/brief/event-marks';
import type { ForecastSeries, ForecastView } from '@/lib/brief/types';
import styles from './forecast-figure.module.css';
import { type ForecastLayout, type PlotBox, thinTicks } from './forecast-layout';
import type { PlotScale } from './forecast-paths';
import { Cross, EventLine } from './mark-shapes';

/** Room for a letter of the label: Literata italic, 14 px. */
const LETTER_WIDTH = 7;
const LABEL_GAP = 7;
const NAME_GAP = 8;
/** Inside the plot a name stands this far above its line. */
const NAME_LIFT = 9;
const TICK_LENGTH = 6;
const X_LABEL_DROP = 22;
const Y_LABEL_GAP = 8;

interface ForecastAxesProps {
  view: ForecastView;
  layout: ForecastLayout;
  scale: PlotScale;
}

export function ForecastAxes({ view, layout: { plot }, scale }: ForecastAxesProps) {
  const bottom = plot.y + plot.height;
  return (
    <g>
      {view.ticks.map(({ value, label }) => (
        <g key={value}>
          <line
            x1={plot.x}
            x2={plot.x + plot.width}
            y1={scale.y(value)}
            y2={scale.y(value)}
            className={styles.grid}
          />
          <text
            x={plot.x - Y_LABEL_GAP}
            y={scale.y(value)}
            dy="0.35em"
            textAnchor="end"
            className={styles.tick}
          >
            {label}
          </text>
        </g>
      ))}
      {thinTicks(view.monthTicks, view.monthDomain, plot.width).map(({ value, label }) => (
        <g key={value}>
          <line
            x1={scale.x(value)}
            x2={scale.x(value)}
            y1={bottom}
            y2={bottom + TICK_LENGTH}
            className={styles.tickMark}
          />
          <text x={scale.x(value)} y={bottom + X_LABEL_DROP} textAnchor="middle" className={styles.tick}>
            {label}
          </text>
        </g>
      ))}
    </g>
  );
}

/** Dated events, each a lettered line. */
export function EventMarks({ marks, plot, scale }: { marks: EventMark[]; plot: PlotBox; scale: PlotScale }) {
  return marks.map((mark) => <EventLine key={mark.letter} mark={mark} x={scale.x(mark.month)} plot={plot} />);
}

/** Counts that the fit does not see. */
export function LeftOutMarks({ view, scale }: { view: ForecastView; scale: PlotScale }) {
  return view.leftOut.counts.map(({ key, month, value }) => (
    <Cross
      key={`${key} ${month}`}
      x={scale.x(month)}
      y={scale.y(value)}
      colour={key === 'rival' ? 'var(--rival)' : 'var(--focal)'}
    />
  ));
}

interface FromLineProps {
  mark: ForecastView['forecastFrom'];
  plot: PlotBox;
  scale: PlotScale;
}

export function ForecastFromLine({ mark: { month, label }, plot, scale }: FromLineProps) {
  const x = scale.x(month);
  const isLeft = x + LABEL_GAP + label.length * LETTER_WIDTH > plot.x + plot.width;
  return (
    <g>
      <line x1={x} x2={x} y1={plot.y - 14} y2={plot.y + plot.height} className={styles.fromLine} />
      <text
        x={isLeft ? x - LABEL_GAP : x + LABEL_GAP}
        y={plot.y - 8}
        textAnchor={isLeft ? 'end' : 'start'}
        className={styles.fromLabel}
      >
        {label}
      </text>
    </g>
  );
}

interface LineEndNamesProps {
  series: ForecastSeries[];
  layout: ForecastLayout;
  scale: PlotScale;
  lastMonth: number;
}

export function LineEndNames({ series, layout, scale, lastMonth }: LineEndNamesProps) {
  const x = scale.x(lastMonth);
  return series.map((line) => {
    const y = scale.y(line.end.labelValue);
    return (
      <text
        key={line.key}
        x={layout.isNarrow ? x - 2 : x + NAME_GAP}
        y={layout.isNarrow ? y - NAME_LIFT : y}
        dy={layout.isNarrow ? 0 : '0.35em'}
        textAnchor={layout.isNarrow ? 'end' : 'start'}
        fill={textColour(line.tone)}
        className={styles.endName}
      >
        {line.end.text}
      </text>
    );
  });
}
