/** Shapes of the marks that charts share: a lettered line for an event, a cross for a count that the fit does not see. */
import type { EventMark } from '@/lib/brief/event-marks';
import type { PlotBox } from './forecast-layout';
import styles from './history-marks.module.css';

/** Pixels of a cross to each side of its middle. */
const ARM = 3.2;
/** A letter stands this far above the plot. */
const LETTER_LIFT = 4;

/** Dotted; solid for an event from which strengths may have changed. */
export function EventLine({ mark, x, plot }: { mark: EventMark; x: number; plot: PlotBox }) {
  return (
    <g>
      <line
        x1={x}
        x2={x}
        y1={plot.y}
        y2={plot.y + plot.height}
        className={styles.event}
        data-break={mark.isBreak || undefined}
      />
      <text x={x} y={plot.y - LETTER_LIFT} textAnchor="middle" className={styles.letter}>
        {mark.letter}
      </text>
    </g>
  );
}

export function Cross({ x, y, colour }: { x: number; y: number; colour: string }) {
  const [left, right, top, bottom] = [x - ARM, x + ARM, y - ARM, y + ARM];
  return (
    <path
      d={`M${left} ${top}L${right} ${bottom}M${left} ${bottom}L${right} ${top}`}
      stroke={colour}
      className={styles.leftOut}
    />
  );
}
