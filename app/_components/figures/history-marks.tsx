'use client';

/** Marks on the chart of counts and on the forecast chart: events as lettered lines, months left out of the fit as crosses. */
import { usePlotArea, useXAxisScale, useYAxisScale } from 'recharts';
import type { EventMark } from '@/lib/brief/event-marks';
import styles from './history-marks.module.css';

/** Pixels of a cross to each side of its middle. */
const ARM = 3.2;
/** A letter stands this far above the plot. */
const LETTER_LIFT = 4;

/** An event is a dotted line; one from which strengths may have changed a solid one. */
export function EventLines({ marks }: { marks: EventMark[] }) {
  const scale = useXAxisScale();
  const plot = usePlotArea();
  if (!scale || !plot) return null;
  return marks.map(({ month, letter, isBreak }) => {
    const x = scale(month);
    if (x === undefined || !(x >= plot.x - 0.5 && x <= plot.x + plot.width + 0.5)) return null;
    return (
      <g key={letter}>
        <line
          x1={x}
          x2={x}
          y1={plot.y}
          y2={plot.y + plot.height}
          className={styles.event}
          data-break={isBreak || undefined}
        />
        <text x={x} y={plot.y - LETTER_LIFT} textAnchor="middle" className={styles.letter}>
          {letter}
        </text>
      </g>
    );
  });
}

export interface LeftOutMonth {
  month: number;
  focal: number | null;
  rival: number | null;
}

/** Counts that the fit does not see: a cross in the firm's colour. */
export function LeftOutCounts({ months }: { months: LeftOutMonth[] }) {
  const scaleX = useXAxisScale();
  const scaleY = useYAxisScale();
  if (!scaleX || !scaleY) return null;
  return months.flatMap(({ month, ...counts }) =>
    (['focal', 'rival'] as const).map((firm) => {
      const count = counts[firm];
      const [x, y] = [scaleX(month), count === null ? undefined : scaleY(count)];
      if (x === undefined || y === undefined) return null;
      return (
        <path
          key={`${month}-${firm}`}
          d={`M${x - ARM} ${y - ARM}L${x + ARM} ${y + ARM}M${x - ARM} ${y + ARM}L${x + ARM} ${y - ARM}`}
          stroke={`var(--${firm})`}
          className={styles.leftOut}
        />
      );
    }),
  );
}
