/**
 * Where the parts of the forecast chart stand, in CSS pixels, for the size its frame has. Wide: names at the line ends in
 * a right margin. Narrow: names above the line ends, inside the plot, and fewer month labels.
 */
import type { Tick } from '@/lib/brief/types';

/** Below this frame width the names move into the plot. */
const NARROW_BELOW = 560;
const TOP = 26;
const AXIS_HEIGHT = 30;
/** Room for a letter of a name at a line end: Public Sans, semibold, 14 px, wide letters included. */
const LETTER_WIDTH = 8.6;
const LONGEST_NAME_WIDTH = 150;
const NAME_GAP = 8;
const TICK_LETTER_WIDTH = 7.2;
/** Between a tick's label and its axis, with some air at the left. */
const TICK_ROOM = 14;
const LEAST_TICK_GAP = 14;
const LEAST_LOG_GAP = 4;

export interface PlotBox {
  x: number;
  y: number;
  width: number;
  height: number;
}

export interface ForecastLayout {
  isNarrow: boolean;
  plot: PlotBox;
  top: number;
  right: number;
  yAxisWidth: number;
  xAxisHeight: number;
}

export function layOutForecast(
  size: { width: number; height: number },
  yLabels: string[],
  endNames: string[],
): ForecastLayout {
  const isNarrow = size.width < NARROW_BELOW;
  const yAxisWidth = Math.ceil(longest(yLabels) * TICK_LETTER_WIDTH) + TICK_ROOM;
  const nameWidth = Math.min(longest(endNames) * LETTER_WIDTH, LONGEST_NAME_WIDTH);
  const right = isNarrow ? 6 : Math.ceil(nameWidth) + NAME_GAP;
  const plot = {
    x: yAxisWidth,
    y: TOP,
    width: Math.max(size.width - yAxisWidth - right, 1),
    height: Math.max(size.height - TOP - AXIS_HEIGHT, 1),
  };
  return { isNarrow, plot, top: TOP, right, yAxisWidth, xAxisHeight: AXIS_HEIGHT };
}

function longest(texts: string[]): number {
  return texts.reduce((most, text) => Math.max(most, text.length), 0);
}

/** Every tick, or every second, third, ... one, so that their labels do not touch. */
export function thinTicks(ticks: Tick[], domain: [number, number], width: number): Tick[] {
  if (ticks.length < 2) return ticks;
  const pixelsPerUnit = width / (domain[1] - domain[0]);
  const room = longest(ticks.map((tick) => tick.label)) * TICK_LETTER_WIDTH + LEAST_TICK_GAP;
  const spacing = (ticks[1]!.value - ticks[0]!.value) * pixelsPerUnit;
  const every = Math.max(1, Math.ceil(room / spacing));
  return ticks.filter((_, index) => index % every === 0);
}

/** The same on a log axis: as many as fit, 1 (100 %) always among them. Ticks at 0 or below have no place there. */
export function thinLogTicks(ticks: Tick[], domain: [number, number], width: number): Tick[] {
  const [low, high] = domain.map(Math.log) as [number, number];
  const place = (tick: Tick) => ((Math.log(tick.value) - low) / (high - low)) * width;
  const room = longest(ticks.map((tick) => tick.label)) * TICK_LETTER_WIDTH + LEAST_LOG_GAP;
  const kept: Tick[] = [];
  for (const tick of [...ticks].sort((a, b) => Math.abs(Math.log(a.value)) - Math.abs(Math.log(b.value)))) {
    if (kept.every((other) => Math.abs(place(other) - place(tick)) >= room)) kept.push(tick);
  }
  return kept.sort((a, b) => a.value - b.value);
}

/** Pixel of a value on a linear axis that runs from `from` to `to` pixels. */
export function placeOn(domain: [number, number], from: number, to: number, value: number): number {
  return from + ((value - domain[0]) / (domain[1] - domain[0])) * (to - from);
}
