'use client';

/** What the two maps share: their axes inside Recharts, the frame of the plot, the names of the axes. */
import { usePlotArea, XAxis, YAxis } from 'recharts';
import type { Tick } from '@/lib/brief/types';
import { labelOf, TICK_STYLE } from './axis-style';
import styles from './map.module.css';
import { MAP_X_AXIS, type MapLayout } from './map-layout';

interface MapAxis {
  domain: [number, number];
  ticks: Tick[];
}

/** The labels end in an arrow that points along their axis; the upright one lies flat, so its arrow stands first and points up. */
const ARROW = /\s*→$/;

/** Axes as elements, not as a component: Recharts looks for them among its children. */
export function renderMapAxes(x: MapAxis, y: MapAxis, layout: MapLayout, scale: 'linear' | 'log') {
  return [
    <XAxis
      key="x"
      dataKey="x"
      type="number"
      scale={scale}
      domain={x.domain}
      ticks={x.ticks.map((tick) => tick.value)}
      tickFormatter={labelOf(x.ticks)}
      tick={TICK_STYLE}
      tickLine={{ stroke: 'var(--rule-strong)' }}
      tickMargin={5}
      axisLine={false}
      height={MAP_X_AXIS}
      interval={0}
      allowDataOverflow
    />,
    <YAxis
      key="y"
      dataKey="y"
      type="number"
      scale={scale}
      domain={y.domain}
      ticks={y.ticks.map((tick) => tick.value)}
      tickFormatter={labelOf(y.ticks)}
      tick={TICK_STYLE}
      tickLine={false}
      axisLine={false}
      width={layout.yAxisWidth}
      interval={0}
      allowDataOverflow
    />,
  ];
}

/** The border of the plot and the axes' names: the upright one lies flat above the plot, where it can be read. */
export function MapFrame({ xLabel, yLabel }: { xLabel: string; yLabel: string }) {
  const plot = usePlotArea();
  if (!plot) return null;
  return (
    <g>
      <rect x={plot.x} y={plot.y} width={plot.width} height={plot.height} className={styles.frame} />
      <text x={plot.x} y={plot.y - 11} className={styles.axisName}>
        ↑ {yLabel.replace(ARROW, '')}
      </text>
      <text
        x={plot.x + plot.width}
        y={plot.y + plot.height + 42}
        textAnchor="end"
        className={styles.axisName}
      >
        {xLabel}
      </text>
    </g>
  );
}
