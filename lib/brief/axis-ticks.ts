/** Axes: round upper ends, evenly spaced ticks at 1, 2 or 5 times a power of ten, log ticks, and ticks on months. */
import type { Month } from '../series/types';
import type { MonthFormat } from './month-words';
import type { Tick } from './types';

/** Ticks that a linear axis aims at. */
const TICKS_WANTED = 4;
/** Most labelled months on an axis. */
const MONTH_TICKS_WANTED = 8;

export interface Axis {
  domain: [number, number];
  ticks: Tick[];
}

/** Step of 1, 2 or 5 times a power of ten that cuts `span` in about `wanted` parts. */
function niceStep(span: number, wanted: number): number {
  const rough = span / wanted;
  const power = 10 ** Math.floor(Math.log10(rough));
  const factor = [1, 2, 5, 10].find((one) => one * power >= rough * (1 - 1e-9)) ?? 10;
  return factor * power;
}

/** From 0 to a round number not below `max`; a `max` that is not positive reads as 1. */
export function axisFromZero(max: number, spell: (value: number) => string, wanted = TICKS_WANTED): Axis {
  const top = max > 0 ? max : 1;
  const step = niceStep(top, wanted);
  const count = Math.ceil(top / step - 1e-9);
  return { domain: [0, count * step], ticks: stepTicks(0, count, step, spell) };
}

/** Ticks of a round axis from 0 that do not pass `max`. */
export function ticksUpTo(max: number, spell: (value: number) => string): Tick[] {
  return axisFromZero(max, spell).ticks.filter((tick) => tick.value <= max * (1 + 1e-9));
}

/** A round axis around zero that holds `low` and `high`. */
export function axisAroundZero(
  low: number,
  high: number,
  spell: (value: number) => string,
  wanted = TICKS_WANTED,
): Axis {
  const bottom = Math.min(0, low);
  const top = Math.max(0, high);
  const step = niceStep(top - bottom > 0 ? top - bottom : 1, wanted);
  const first = Math.floor(bottom / step + 1e-9);
  const last = Math.max(first + 1, Math.ceil(top / step - 1e-9));
  return { domain: [first * step, last * step], ticks: stepTicks(first, last, step, spell) };
}

function stepTicks(first: number, last: number, step: number, spell: (value: number) => string): Tick[] {
  return Array.from({ length: last - first + 1 }, (_, i) => {
    // a product, not a running sum, so that 0.3 is not 0.30000000000000004 by accumulation
    const value = Number(((first + i) * step).toPrecision(12));
    return { value, label: spell(value) };
  });
}

/** Powers of ten between `low` and `high`, with 3 times them when there are fewer than three. */
export function logTicks(low: number, high: number, spell: (value: number) => string): Tick[] {
  const decades = [];
  for (let exponent = Math.ceil(Math.log10(low) - 1e-9); 10 ** exponent <= high * (1 + 1e-9); exponent++) {
    decades.push(10 ** exponent);
  }
  const values = decades.length >= 3 ? thin(decades) : withinDecades(low, high);
  return values.map((value) => ({ value, label: spell(value) }));
}

function withinDecades(low: number, high: number): number[] {
  const values: number[] = [];
  for (let exponent = Math.floor(Math.log10(low)); 10 ** exponent <= high; exponent++) {
    for (const factor of [1, 2, 5]) {
      const value = Number((factor * 10 ** exponent).toPrecision(12));
      if (value >= low && value <= high) values.push(value);
    }
  }
  return values;
}

/** At most six decades, the one of 1 among them. */
function thin(decades: number[]): number[] {
  const every = Math.ceil(decades.length / 6);
  const atOne = decades.findIndex((value) => Math.abs(value - 1) < 1e-9);
  const offset = Math.max(0, atOne) % every;
  return decades.filter((_, i) => i % every === offset);
}

/**
 * Ticks on months, at most `wanted`: each January (labelled by its year), every second, fifth or tenth year of long spans,
 * every third or single month of short ones.
 */
export function monthTicks(from: Month, to: Month, format: MonthFormat, wanted = MONTH_TICKS_WANTED): Tick[] {
  const span = to - from;
  const stepMonths = [1, 3, 6, 12, 24, 60, 120, 240].find((step) => span / step <= wanted) ?? 600;
  const ticks: Tick[] = [];
  for (let month = Math.ceil(from / stepMonths) * stepMonths; month <= to; month += stepMonths) {
    ticks.push({ value: month, label: stepMonths >= 12 ? String(format.year(month)) : format.short(month) });
  }
  return ticks;
}
