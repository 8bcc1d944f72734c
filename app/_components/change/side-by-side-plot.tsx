/** Lines of several scenarios over the months, as plain SVG: no push thin and dotted, the others by dash and weight. */

import { LOCALE } from '@/app/_lib/locale';
import { axisFromZero } from '@/lib/brief/axis-ticks';
import { createNumberFormat } from '@/lib/brief/number-format';
import type { SideBySideRow } from '@/lib/brief/side-by-side';
import { placeOn, thinTicks } from '../figures/forecast-layout';
import styles from './change.module.css';

const BOX = { left: 56, right: 10, top: 8, bottom: 28 };
const numbers = createNumberFormat(LOCALE);
const SHARE_TICKS = [0, 0.25, 0.5, 0.75, 1].map((value) => ({ value, label: `${value * 100} %` }));

/** In the order of the lines: no push, then up to four scenarios. */
export const LINE_STYLES = [
  { stroke: 'var(--ink-2)', strokeWidth: 1.25, strokeDasharray: '1.5 3' },
  { stroke: 'var(--focal)', strokeWidth: 2.25 },
  { stroke: 'var(--rival)', strokeWidth: 2.25, strokeDasharray: '7 4' },
  { stroke: 'var(--both)', strokeWidth: 2.25, strokeDasharray: '2 3' },
  { stroke: 'var(--head-start-text)', strokeWidth: 2.25, strokeDasharray: '10 3 2 3' },
] as const;

interface SideBySidePlotProps {
  rows: SideBySideRow[];
  isShare: boolean;
  size: { width: number; height: number };
}

export function SideBySidePlot({ rows, isShare, size }: SideBySidePlotProps) {
  const { axis, x, y, months } = layOut(rows, isShare, size);
  const lines = rows[0]?.points.map((_, line) => line) ?? [];
  return (
    <svg width={size.width} height={size.height} aria-hidden>
      {axis.ticks.map(({ value, label }) => (
        <g key={value}>
          <line x1={BOX.left} x2={size.width - BOX.right} y1={y(value)} y2={y(value)} stroke="var(--rule)" />
          <text x={BOX.left - 8} y={y(value)} dy="0.35em" textAnchor="end" className={styles.tick}>
            {label}
          </text>
        </g>
      ))}
      {months.map(({ value, label }) => (
        <text key={value} x={x(value)} y={size.height - 8} textAnchor="middle" className={styles.tick}>
          {label}
        </text>
      ))}
      {lines.map((line) => (
        <path
          key={line}
          fill="none"
          {...LINE_STYLES[line]}
          d={`M${rows.map(({ month, points }) => `${x(month).toFixed(1)},${y(points[line]!.mid).toFixed(1)}`).join('L')}`}
        />
      ))}
    </svg>
  );
}

function layOut(rows: SideBySideRow[], isShare: boolean, size: { width: number; height: number }) {
  const domain: [number, number] = [rows[0]?.month ?? 0, rows[rows.length - 1]?.month ?? 1];
  const most = Math.max(1, ...rows.flatMap(({ points }) => points.map(({ mid }) => mid)));
  const axis = isShare
    ? { domain: [0, 1] as [number, number], ticks: SHARE_TICKS }
    : axisFromZero(most, numbers.axis);
  const width = size.width - BOX.left - BOX.right;
  const every = rows
    .filter((_, index) => index % 3 === 0)
    .map(({ month, label }) => ({ value: month, label }));
  return {
    axis,
    months: thinTicks(every, domain, width),
    x: (month: number) => placeOn(domain, BOX.left, BOX.left + width, month),
    y: (value: number) => placeOn(axis.domain, size.height - BOX.bottom, BOX.top, value),
  };
}
