'use client';

/** Custom layers of the forecast chart: the line where the forecast begins, and the firms' names at the line ends. */
import { usePlotArea, useXAxisScale, useYAxisScale, ZIndexLayer } from 'recharts';
import { textColour } from '@/app/_lib/tone';
import type { ForecastSeries } from '@/lib/brief/types';
import styles from './forecast-figure.module.css';
import type { ForecastLayout } from './forecast-layout';
import { ABOVE_MARKS } from './map-layout';

/** Room for a letter of the label: Literata italic, 14 px. */
const LETTER_WIDTH = 7;
const LABEL_GAP = 7;
const NAME_GAP = 8;
/** Inside the plot a name stands this far above its line. */
const NAME_LIFT = 9;

export function ForecastFromLine({ month, label }: { month: number; label: string }) {
  const x = useXAxisScale()?.(month);
  const plot = usePlotArea();
  if (x === undefined || !plot) return null;
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
  lastMonth: number;
}

export function LineEndNames({ series, layout, lastMonth }: LineEndNamesProps) {
  const x = useXAxisScale()?.(lastMonth);
  const scaleY = useYAxisScale();
  if (x === undefined || !scaleY) return null;
  const names = series.map((line) => {
    const y = scaleY(line.end.labelValue);
    if (y === undefined) return null;
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
  return <ZIndexLayer zIndex={ABOVE_MARKS}>{names}</ZIndexLayer>;
}
