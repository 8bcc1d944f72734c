/** Rounding to a power of ten that a 90 % interval supports, and spelling the result in a locale. */

/** A 90 % interval. */
export interface Width {
  q05: number;
  q95: number;
}

export interface StepSpeller {
  /** `value` rounded to a multiple of 10^exponent, or finer to keep one significant digit, but never finer than 10^finest. */
  spell(value: number, exponent: number, finest?: number): string;
  /** "low to high", or one number when both read the same. `decorate` changes each number's text. */
  spellRange(
    low: number,
    high: number,
    exponent: number,
    finest?: number,
    decorate?: (text: string) => string,
  ): string;
}

/** Part of the interval's width that the rounding step may reach. */
const STEP_OF_WIDTH = 0.25;
/** Digits shown when no interval says how many are supported. */
export const DIGITS_WITHOUT_INTERVAL = 3;
/** Most digits shown. */
const MAX_DIGITS = 3;
/** Most decimals that are spelt; smaller numbers read as 0. */
const MAX_DECIMALS = 9;
const MINUS = '\u2212';

/** Exponent of the largest power of ten not above `x`; `x` positive. */
export function exponentOf(x: number): number {
  const exponent = Math.floor(Math.log10(x));
  return 10 ** (exponent + 1) <= x ? exponent + 1 : exponent;
}

/** Exponent of the rounding step for a value and its interval; 0 when all are 0. */
export function stepExponent(value: number, width?: Width): number {
  const ends = width ? Math.max(Math.abs(width.q05), Math.abs(width.q95)) : 0;
  const largest = Math.max(Math.abs(value), ends);
  if (!(largest > 0)) return 0;
  const top = exponentOf(largest);
  const spread = width ? Math.abs(width.q95 - width.q05) : 0;
  if (!(spread > 0)) return top - (DIGITS_WITHOUT_INTERVAL - 1);
  return Math.min(top, Math.max(top - (MAX_DIGITS - 1), exponentOf(spread * STEP_OF_WIDTH)));
}

/** Exponent of the coarsest step that shows `value` unchanged, or as well as `digits` significant digits can. */
export function shortestExponent(value: number, digits: number): number {
  if (value === 0) return 0;
  const finest = exponentOf(Math.abs(value)) - (digits - 1);
  let exponent = exponentOf(Math.abs(value));
  while (exponent > finest && Math.abs(roundToStep(value, exponent) - value) > 1e-9 * Math.abs(value))
    exponent--;
  return exponent;
}

/** `value` to a multiple of 10^exponent, half away from zero; never negative zero. */
export function roundToStep(value: number, exponent: number): number {
  const scaled = exponent > 0 ? value / 10 ** exponent : value * 10 ** -exponent;
  const rounded = Math.sign(scaled) * Math.round(Math.abs(scaled));
  const back = exponent > 0 ? rounded * 10 ** exponent : rounded / 10 ** -exponent;
  return back === 0 ? 0 : back;
}

/** @param locale BCP 47 tag */
export function createStepSpeller(locale: string): StepSpeller {
  const formatters = new Map<number, Intl.NumberFormat>();
  const withDecimals = (value: number, decimals: number): string => {
    let formatter = formatters.get(decimals);
    if (!formatter) {
      formatter = new Intl.NumberFormat(locale, {
        minimumFractionDigits: decimals,
        maximumFractionDigits: decimals,
      });
      formatters.set(decimals, formatter);
    }
    return (value < 0 ? MINUS : '') + formatter.format(Math.abs(value));
  };
  const spell = (value: number, exponent: number, finest = -MAX_DECIMALS): string => {
    if (!Number.isFinite(value)) throw new RangeError(`value must be finite, got ${value}`);
    const own = value === 0 ? exponent : Math.min(exponent, exponentOf(Math.abs(value)));
    const kept = Math.max(own, finest);
    return withDecimals(roundToStep(value, kept), Math.max(-kept, 0));
  };
  return {
    spell,
    spellRange: (low, high, exponent, finest, decorate = (text) => text) => {
      const [from, to] = [decorate(spell(low, exponent, finest)), decorate(spell(high, exponent, finest))];
      return from === to ? from : `${from} to ${to}`;
    },
  };
}
