/**
 * Seasonal naive on ln users: each month as the same month of the last year known.
 *
 *   y(T+h) = y of the newest observed month 12 k months before T+h, k >= 1;  variance s^2 k
 *   s^2: mean square of the changes over twelve months in the training months
 *
 * Student t with as many degrees of freedom as there are such changes. Source: Hyndman & Athanasopoulos, Forecasting: Principles
 * and Practice, sections 5.2 and 5.5.
 */
import { type BaselineEnd, endWith, type LogSeries } from './baseline';

const YEAR = 12;
const MIN_CHANGES = 3;

export function forecastSeasonalNaive(series: LogSeries, months: number): BaselineEnd {
  const squares: number[] = [];
  for (let t = YEAR; t < series.length; t++) {
    const [before, now] = [series[t - YEAR], series[t]];
    if (before !== null && now !== null) squares.push((now - before) ** 2);
  }
  if (squares.length < MIN_CHANGES) return { ok: false, code: 'too-short' };
  const variance = squares.reduce((total, square) => total + square, 0) / squares.length;
  const centre = new Float64Array(months);
  const scale = new Float64Array(months);
  for (let h = 1; h <= months; h++) {
    const source = findSameMonth(series, series.length - 1 + h);
    if (!source) return { ok: false, code: 'too-short' };
    centre[h - 1] = source.value;
    scale[h - 1] = Math.sqrt(variance * source.years);
  }
  return endWith({ centre, scale, df: squares.length });
}

function findSameMonth(series: LogSeries, target: number): { value: number; years: number } | null {
  for (let years = 1; target - years * YEAR >= 0; years++) {
    const value = series[target - years * YEAR];
    if (value !== null && value !== undefined) return { value, years };
  }
  return null;
}
