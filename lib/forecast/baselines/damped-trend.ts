/**
 * Damped-trend exponential smoothing on ln users (Gardner & McKenzie 1985), errors in one source:
 *
 *   y(t) = l + phi b + e,   l' = l + phi b + a e,   b' = phi b + a g e
 *   y(T+h) = l + (phi + ... + phi^h) b;  variance s^2 (1 + sum_{j<h} c_j^2),  c_j = a (1 + g (phi + ... + phi^j))
 *
 * a, g and phi minimise the squared one-month errors; the first level and trend come from a line through the first counts. A month
 * without a count moves the state on without learning. s^2 by n - 5; Student t with n - 5 degrees of freedom.
 * Variance: Hyndman, Koehler, Ord & Snyder (2008), table 6.1, written as a sum.
 */
import { minimiseInBox } from '../../numeric/box-search';
import { type BaselineEnd, endWith, type LogSeries, listObserved } from './baseline';

const MIN_COUNTS = 8;
/** Counts that give the first level and trend. */
const WARM_UP = 6;
/** a, g, phi, and the two of the first state. */
const PARAMETERS = 5;
/** Lower and upper ends of a, g, phi. Below 0.8 the trend is gone within a quarter (common practice). */
const LOW = [0.02, 0, 0.8];
const HIGH = [1, 1, 1];
/** First grid of the search, points along each axis. */
const GRID = 5;

interface Smoothing {
  level: number;
  trend: number;
  squares: number;
}

export function forecastDampedTrend(series: LogSeries, months: number): BaselineEnd {
  const { times, values } = listObserved(series);
  if (values.length < MIN_COUNTS) return { ok: false, code: 'too-short' };
  const start = fitLine(times.slice(0, WARM_UP), values.slice(0, WARM_UP));
  const { point } = minimiseInBox((theta) => smooth(series, start, theta).squares, LOW, HIGH, GRID);
  const [a, g, phi] = point;
  const { level, trend, squares } = smooth(series, start, point);
  const df = values.length - PARAMETERS;
  const variance = squares / df;
  const centre = new Float64Array(months);
  const scale = new Float64Array(months);
  let damping = 0;
  let spread = 1;
  for (let h = 1; h <= months; h++) {
    damping += phi ** h;
    centre[h - 1] = level + damping * trend;
    scale[h - 1] = Math.sqrt(variance * spread);
    spread += (a * (1 + g * damping)) ** 2;
  }
  return endWith({ centre, scale, df });
}

function smooth(
  series: LogSeries,
  start: { level: number; trend: number },
  theta: ArrayLike<number>,
): Smoothing {
  const [a, g, phi] = [theta[0], theta[1], theta[2]];
  let { level, trend } = start;
  let squares = 0;
  for (const value of series) {
    trend *= phi;
    level += trend;
    if (value === null) continue;
    const error = value - level;
    squares += error * error;
    level += a * error;
    trend += a * g * error;
  }
  return { level, trend, squares };
}

/** Level one month before the first count, and the change a month. */
function fitLine(times: readonly number[], values: readonly number[]): { level: number; trend: number } {
  const n = times.length;
  const centreTime = times.reduce((sum, t) => sum + t, 0) / n;
  const centreValue = values.reduce((sum, value) => sum + value, 0) / n;
  let above = 0;
  let below = 0;
  for (let i = 0; i < n; i++) {
    above += (times[i] - centreTime) * (values[i] - centreValue);
    below += (times[i] - centreTime) ** 2;
  }
  const trend = above / below;
  return { level: centreValue - trend * (centreTime + 1), trend };
}
