'use client';

/** Two firms' counts as they were read, without a fit, and their marks: the chart of a preview and of the data pages. */
import { CartesianGrid, ComposedChart, type DotItemDotProps, Line, XAxis, YAxis } from 'recharts';
import { listMonths } from '@/app/_lib/list-months';
import { LOCALE } from '@/app/_lib/locale';
import { axisFromZero, monthTicks } from '@/lib/brief/axis-ticks';
import type { EventMark } from '@/lib/brief/event-marks';
import { createMonthFormat } from '@/lib/brief/month-words';
import { createNumberFormat } from '@/lib/brief/number-format';
import type { Exclusion } from '@/lib/series/exclusions';
import type { MonthlySeries } from '@/lib/series/types';
import { labelOf, TICK_STYLE } from './axis-style';
import { thinTicks } from './forecast-layout';
import { EventLines, LeftOutCounts } from './history-marks';

const Y_AXIS_WIDTH = 52;
/** Half of the label of a last month. */
const RIGHT = 34;
const numbers = createNumberFormat(LOCALE);
const months = createMonthFormat(LOCALE);

interface HistoryPlotProps {
  series: MonthlySeries;
  exclusions: readonly Exclusion[];
  marks: EventMark[];
  size: { width: number; height: number };
}

export function HistoryPlot({ series, exclusions, marks, size }: HistoryPlotProps) {
  const excluded = new Set(exclusions.map(({ month }) => month));
  const all = listMonths(series);
  const leftOut = all.filter(({ month }) => excluded.has(month));
  const rows = all.map((row) => (excluded.has(row.month) ? { ...row, focal: null, rival: null } : row));
  const domain: [number, number] = [series.firstMonth, series.firstMonth + Math.max(rows.length - 1, 1)];
  const ticks = thinTicks(monthTicks(...domain, months), domain, size.width - Y_AXIS_WIDTH - RIGHT);
  const counts = [...series.focal, ...series.rival].filter((count) => count !== null);
  const axis = axisFromZero(Math.max(0, ...counts), numbers.axis);
  return (
    <ComposedChart
      width={size.width}
      height={size.height}
      data={rows}
      margin={{ top: marks.length > 0 ? 20 : 8, right: RIGHT, bottom: 0, left: 0 }}
      accessibilityLayer={false}
    >
      <CartesianGrid vertical={false} stroke="var(--rule)" />
      <XAxis
        dataKey="month"
        type="number"
        domain={domain}
        ticks={ticks.map((tick) => tick.value)}
        tickFormatter={labelOf(ticks)}
        tick={TICK_STYLE}
        axisLine={false}
        tickLine={{ stroke: 'var(--rule-strong)' }}
        tickMargin={5}
        interval={0}
      />
      <YAxis
        width={Y_AXIS_WIDTH}
        domain={axis.domain}
        ticks={axis.ticks.map((tick) => tick.value)}
        tickFormatter={labelOf(axis.ticks)}
        interval={0}
        tick={TICK_STYLE}
        axisLine={false}
        tickLine={false}
      />
      <Line
        dataKey="focal"
        type="linear"
        stroke="var(--focal)"
        strokeWidth={1.5}
        dot={renderRound}
        activeDot={false}
        isAnimationActive={false}
      />
      <Line
        dataKey="rival"
        type="linear"
        stroke="var(--rival)"
        strokeWidth={1.5}
        strokeDasharray="6 3"
        dot={renderSquare}
        activeDot={false}
        isAnimationActive={false}
      />
      <LeftOutCounts months={leftOut} />
      <EventLines marks={marks} />
    </ComposedChart>
  );
}

function renderRound({ cx, cy, index, value }: DotItemDotProps) {
  if (cx == null || cy == null || value == null) return <g key={index} />;
  return <circle key={index} cx={cx} cy={cy} r={2.2} fill="var(--focal)" />;
}

function renderSquare({ cx, cy, index, value }: DotItemDotProps) {
  if (cx == null || cy == null || value == null) return <g key={index} />;
  return (
    <rect
      key={index}
      x={cx - 2.2}
      y={cy - 2.2}
      width={4.4}
      height={4.4}
      fill="var(--paper)"
      stroke="var(--rival)"
      strokeWidth={1.2}
    />
  );
}
