'use client';

/**
 * The forecast chart, drawn with Recharts from rows that `lib/brief` prepared. The focal firm has a solid line, round marks
 * and plain bands; the rival a dashed line, open squares and hatched bands.
 */
import { useId, useMemo } from 'react';
import { Area, CartesianGrid, ComposedChart, type DotItemDotProps, Line, XAxis, YAxis } from 'recharts';
import { markColour } from '@/app/_lib/tone';
import type { ForecastSeries, ForecastView } from '@/lib/brief/types';
import { labelOf, TICK_STYLE } from './axis-style';
import { type ForecastLayout, thinTicks } from './forecast-layout';
import { ForecastFromLine, LineEndNames } from './forecast-marks';
import { HatchPattern } from './hatch-pattern';

/** Marks closer than this (pixels) are drawn smaller. */
const CROWDED_BELOW = 7;
const DASH = '7 4';

interface ForecastPlotProps {
  view: ForecastView;
  layout: ForecastLayout;
  size: { width: number; height: number };
}

export function ForecastPlot({ view, layout, size }: ForecastPlotProps) {
  const patternId = useId();
  const rows = useMemo(() => flattenRows(view), [view]);
  const months = view.monthDomain[1] - view.monthDomain[0];
  const isCrowded = layout.plot.width / months < CROWDED_BELOW;
  const monthTicks = thinTicks(view.monthTicks, view.monthDomain, layout.plot.width);
  return (
    <ComposedChart
      width={size.width}
      height={size.height}
      data={rows}
      margin={{ top: layout.top, right: layout.right, bottom: 0, left: 0 }}
      accessibilityLayer={false}
    >
      <defs>
        {view.series
          .filter((series) => series.isHatched)
          .map((series) => (
            <HatchPattern key={series.key} id={`${patternId}-${series.key}`} tone={series.tone} />
          ))}
      </defs>
      <CartesianGrid vertical={false} stroke="var(--rule)" />
      <XAxis
        dataKey="month"
        type="number"
        domain={view.monthDomain}
        ticks={monthTicks.map((tick) => tick.value)}
        tickFormatter={labelOf(monthTicks)}
        height={layout.xAxisHeight}
        tick={TICK_STYLE}
        axisLine={false}
        tickLine={{ stroke: 'var(--rule-strong)' }}
        tickMargin={5}
        interval={0}
      />
      <YAxis
        type="number"
        domain={view.domain}
        ticks={view.ticks.map((tick) => tick.value)}
        tickFormatter={labelOf(view.ticks)}
        width={layout.yAxisWidth}
        tick={TICK_STYLE}
        axisLine={false}
        tickLine={false}
        interval={0}
        allowDataOverflow
      />
      {view.series.flatMap((series) => renderBands(series, `url(#${patternId}-${series.key})`))}
      <ForecastFromLine month={view.forecastFrom.month} label={view.forecastFrom.label} />
      {view.series.map((series) => renderHistory(series, isCrowded))}
      {view.series.map(renderMedian)}
      <LineEndNames series={view.series} layout={layout} lastMonth={view.monthDomain[1]} />
    </ComposedChart>
  );
}

type FlatRow = Record<string, number | [number, number] | null>;

function flattenRows(view: ForecastView): FlatRow[] {
  return view.rows.map((row) => {
    const flat: FlatRow = { month: row.month };
    for (const { key } of view.series) {
      const point = row.points[key];
      flat[`${key}Seen`] = point?.seen ?? null;
      flat[`${key}Mid`] = point?.mid ?? null;
      flat[`${key}Inner`] = point?.band50 ?? null;
      flat[`${key}Outer`] = point?.band90 ?? null;
    }
    return flat;
  });
}

function renderBands(series: ForecastSeries, hatch: string) {
  const colour = markColour(series.tone);
  const shared = { stroke: 'none', isAnimationActive: false, activeDot: false, type: 'linear' } as const;
  const bands = [
    <Area
      key={`${series.key}-outer`}
      {...shared}
      dataKey={`${series.key}Outer`}
      fill={colour}
      fillOpacity="var(--band-outer)"
    />,
    <Area
      key={`${series.key}-inner`}
      {...shared}
      dataKey={`${series.key}Inner`}
      fill={colour}
      fillOpacity="var(--band-inner)"
    />,
  ];
  if (series.isHatched) {
    bands.push(
      <Area
        key={`${series.key}-hatch`}
        {...shared}
        dataKey={`${series.key}Outer`}
        fill={hatch}
        fillOpacity={1}
      />,
    );
  }
  return bands;
}

function renderHistory(series: ForecastSeries, isCrowded: boolean) {
  return (
    <Line
      key={`${series.key}-seen`}
      dataKey={`${series.key}Seen`}
      type="linear"
      stroke={markColour(series.tone)}
      strokeWidth={1.25}
      dot={series.marker === 'none' ? false : (props) => renderMark(props, series, isCrowded)}
      activeDot={false}
      isAnimationActive={false}
    />
  );
}

function renderMark({ cx, cy, index }: DotItemDotProps, series: ForecastSeries, isCrowded: boolean) {
  if (cx == null || cy == null) return <g key={index} />;
  const colour = markColour(series.tone);
  if (series.marker === 'round') {
    return <circle key={index} cx={cx} cy={cy} r={isCrowded ? 1.8 : 2.6} fill={colour} />;
  }
  const side = isCrowded ? 3.4 : 5.2;
  return (
    <rect
      key={index}
      x={cx - side / 2}
      y={cy - side / 2}
      width={side}
      height={side}
      fill="var(--paper)"
      stroke={colour}
      strokeWidth={1.25}
    />
  );
}

function renderMedian(series: ForecastSeries) {
  return (
    <Line
      key={`${series.key}-mid`}
      dataKey={`${series.key}Mid`}
      type="linear"
      stroke={markColour(series.tone)}
      strokeWidth={2.25}
      strokeDasharray={series.isDashed ? DASH : undefined}
      dot={false}
      activeDot={false}
      isAnimationActive={false}
    />
  );
}
