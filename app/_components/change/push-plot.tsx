'use client';

/** The forecast with the push (line and 90 % band) against the one without it (thin line), from the last observed month on. */
import { useId, useMemo } from 'react';
import { Area, CartesianGrid, ComposedChart, Line, XAxis, YAxis } from 'recharts';
import { LOCALE } from '@/app/_lib/locale';
import { markColour } from '@/app/_lib/tone';
import { axisFromZero } from '@/lib/brief/axis-ticks';
import { createNumberFormat } from '@/lib/brief/number-format';
import type { DifferenceView, PushRow, Tick } from '@/lib/brief/types';
import { labelOf, TICK_STYLE } from '../figures/axis-style';
import { thinTicks } from '../figures/forecast-layout';
import { HatchPattern } from '../figures/hatch-pattern';

const Y_AXIS_WIDTH = 52;
const MARGIN = { top: 8, right: 12, bottom: 0, left: 0 };
const numbers = createNumberFormat(LOCALE);
const SHARE_TICKS: Tick[] = [0, 0.25, 0.5, 0.75, 1].map((value) => ({ value, label: `${value * 100} %` }));

interface PushPlotProps {
  rows: PushRow[];
  series: DifferenceView['series'];
  isShare: boolean;
  monthDomain: [number, number];
  monthTicks: Tick[];
  size: { width: number; height: number };
}

export function PushPlot({ rows, series, isShare, monthDomain, monthTicks, size }: PushPlotProps) {
  const patternId = useId();
  const data = useMemo(() => flattenRows(rows, series), [rows, series]);
  const axis = isShare
    ? { domain: [0, 1] as [number, number], ticks: SHARE_TICKS }
    : axisFromZero(topOf(rows), numbers.axis);
  const ticks = thinTicks(monthTicks, monthDomain, size.width - Y_AXIS_WIDTH - MARGIN.right);
  return (
    <ComposedChart
      width={size.width}
      height={size.height}
      data={data}
      margin={MARGIN}
      accessibilityLayer={false}
    >
      <defs>
        {series.map(({ key, tone, isDashed }) =>
          isDashed ? <HatchPattern key={key} id={`${patternId}-${key}`} tone={tone} /> : null,
        )}
      </defs>
      <CartesianGrid vertical={false} stroke="var(--rule)" />
      <XAxis
        dataKey="month"
        type="number"
        domain={monthDomain}
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
        tick={TICK_STYLE}
        axisLine={false}
        tickLine={false}
        interval={0}
        allowDataOverflow
      />
      {series.flatMap((line) => renderSeries(line, `url(#${patternId}-${line.key})`))}
    </ComposedChart>
  );
}

function flattenRows(rows: PushRow[], series: DifferenceView['series']) {
  return rows.map((row) => {
    const flat: Record<string, number | [number, number] | null> = { month: row.month };
    for (const { key } of series) {
      const point = row.points[key];
      flat[`${key}Band`] = point?.band90 ?? null;
      flat[`${key}Pushed`] = point?.pushed ?? null;
      flat[`${key}Baseline`] = point?.baseline ?? null;
    }
    return flat;
  });
}

/** The highest line, and of the bands as much as stays within twice of it. */
function topOf(rows: PushRow[]): number {
  const points = rows.flatMap((row) => Object.values(row.points));
  const line = Math.max(0, ...points.flatMap((point) => [point.pushed, point.baseline]));
  const band = Math.max(0, ...points.map((point) => point.band90[1]));
  return Math.min(band, 2 * line) || 1;
}

function renderSeries({ key, tone, isDashed }: DifferenceView['series'][number], hatch: string) {
  const colour = markColour(tone);
  const still = { type: 'linear', isAnimationActive: false, activeDot: false } as const;
  const marks = [
    <Area
      key={`${key}-band`}
      {...still}
      dataKey={`${key}Band`}
      stroke="none"
      fill={colour}
      fillOpacity="var(--band-outer)"
    />,
    <Line
      key={`${key}-baseline`}
      {...still}
      dataKey={`${key}Baseline`}
      stroke={colour}
      strokeWidth={1}
      strokeDasharray="1.5 3"
      dot={false}
    />,
    <Line
      key={`${key}-pushed`}
      {...still}
      dataKey={`${key}Pushed`}
      stroke={colour}
      strokeWidth={2.25}
      strokeDasharray={isDashed ? '7 4' : undefined}
      dot={false}
    />,
  ];
  if (isDashed) {
    marks.splice(
      1,
      0,
      <Area
        key={`${key}-hatch`}
        {...still}
        dataKey={`${key}Band`}
        stroke="none"
        fill={hatch}
        fillOpacity={1}
      />,
    );
  }
  return marks;
}
