'use client';

/** What the push adds and takes, month by month: pushed minus not pushed, with its bands, around a line at zero. */
import { useId, useMemo } from 'react';
import { Area, CartesianGrid, ComposedChart, Line, ReferenceLine, XAxis, YAxis } from 'recharts';
import { markColour } from '@/app/_lib/tone';
import type { DifferenceView } from '@/lib/brief/types';
import { labelOf, TICK_STYLE } from '../figures/axis-style';
import { thinTicks } from '../figures/forecast-layout';
import { HatchPattern } from '../figures/hatch-pattern';
import { DIFFERENCE_AXES, DIFFERENCE_MARGIN, placeDifferencePlot } from './difference-plot-box';

interface DifferencePlotProps {
  view: DifferenceView;
  size: { width: number; height: number };
}

export function DifferencePlot({ view, size }: DifferencePlotProps) {
  const patternId = useId();
  const data = useMemo(() => flattenRows(view), [view]);
  const ticks = thinTicks(view.monthTicks, view.monthDomain, placeDifferencePlot(size).width);
  return (
    <ComposedChart
      width={size.width}
      height={size.height}
      data={data}
      margin={DIFFERENCE_MARGIN}
      accessibilityLayer={false}
    >
      <defs>
        {view.series.map(({ key, tone, isDashed }) =>
          isDashed ? <HatchPattern key={key} id={`${patternId}-${key}`} tone={tone} /> : null,
        )}
      </defs>
      <CartesianGrid vertical={false} stroke="var(--rule)" />
      <XAxis
        dataKey="month"
        type="number"
        domain={view.monthDomain}
        ticks={ticks.map((tick) => tick.value)}
        tickFormatter={labelOf(ticks)}
        tick={TICK_STYLE}
        height={DIFFERENCE_AXES.x}
        axisLine={false}
        tickLine={{ stroke: 'var(--rule-strong)' }}
        tickMargin={5}
        interval={0}
      />
      <YAxis
        width={DIFFERENCE_AXES.y}
        domain={view.domain}
        ticks={view.ticks.map((tick) => tick.value)}
        tickFormatter={labelOf(view.ticks)}
        tick={TICK_STYLE}
        axisLine={false}
        tickLine={false}
        interval={0}
        allowDataOverflow
      />
      <ReferenceLine y={0} stroke="var(--ink)" strokeWidth={1} />
      {view.series.flatMap((line) => renderSeries(line, `url(#${patternId}-${line.key})`))}
    </ComposedChart>
  );
}

function flattenRows(view: DifferenceView) {
  return view.rows.map((row) => {
    const flat: Record<string, number | [number, number] | null> = { month: row.month };
    for (const { key } of view.series) {
      const point = row.points[key];
      flat[`${key}Outer`] = point?.band90 ?? null;
      flat[`${key}Inner`] = point?.band50 ?? null;
      flat[`${key}Mid`] = point?.mid ?? null;
    }
    return flat;
  });
}

function renderSeries({ key, tone, isDashed }: DifferenceView['series'][number], hatch: string) {
  const colour = markColour(tone);
  const still = { type: 'linear', isAnimationActive: false, activeDot: false } as const;
  const marks = [
    <Area
      key={`${key}-outer`}
      {...still}
      dataKey={`${key}Outer`}
      stroke="none"
      fill={colour}
      fillOpacity="var(--band-outer)"
    />,
    <Area
      key={`${key}-inner`}
      {...still}
      dataKey={`${key}Inner`}
      stroke="none"
      fill={colour}
      fillOpacity="var(--band-inner)"
    />,
    <Line
      key={`${key}-mid`}
      {...still}
      dataKey={`${key}Mid`}
      stroke={colour}
      strokeWidth={2.25}
      strokeDasharray={isDashed ? '7 4' : undefined}
      dot={false}
    />,
  ];
  if (isDashed) {
    marks.unshift(
      <Area
        key={`${key}-hatch`}
        {...still}
        dataKey={`${key}Outer`}
        stroke="none"
        fill={hatch}
        fillOpacity={1}
      />,
    );
  }
  return marks;
}
