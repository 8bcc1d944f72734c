/**
 * Scores of forecasts; all but the coverage are better the lower they are, and are in the units of what is forecast.
 *
 *   CRPS of an ensemble   mean |x_i - y| - sum |x_i - x_j| / (2 n^2); fair: / (2 n (n - 1))
 *   interval score        (u - l) + (2/a) max(l - y, 0) + (2/a) max(y - u, 0), interval of level 1 - a
 *   weighted interval     (|y - m| / 2 + sum a_k/2 IS_k) / (K + 1/2)
 *   MASE                  mean |y - f| / mean |Y_t - Y_{t-m}| over the training months
 *
 * Sources: Gneiting & Raftery 2007 (CRPS, interval score eq. 43), Ferro 2014 (fair), Bracher et al. 2021 (weighted interval score),
 * Hyndman & Koehler 2006 (MASE).
 */

export interface IntervalForecast {
  low: number;
  high: number;
  /** 1 - level: 0.1 for a 90 % interval. */
  alpha: number;
}

/**
 * CRPS of equally weighted members at the outcome y.
 * @param members in any order, at least one; at least two for 'fair'
 * @param kind 'fair' corrects for the finite number of randomly drawn members
 */
export function ensembleCrps(
  members: ArrayLike<number>,
  y: number,
  kind: 'plain' | 'fair' = 'plain',
): number {
  const n = members.length;
  if (n < (kind === 'fair' ? 2 : 1)) throw new RangeError(`members must be more than ${n}`);
  const sorted = Float64Array.from(members).sort();
  const pairs = kind === 'fair' ? n * (n - 1) : n * n;
  let toOutcome = 0;
  let spread = 0;
  for (let i = 0; i < n; i++) {
    toOutcome += Math.abs(sorted[i] - y);
    // sum over pairs of sorted values: |x_i - x_j| counts x_i with weight 2i - n + 1
    spread += (2 * i - n + 1) * sorted[i];
  }
  return toOutcome / n - spread / pairs;
}

export function intervalScore({ low, high, alpha }: IntervalForecast, y: number): number {
  return high - low + (2 / alpha) * (Math.max(0, low - y) + Math.max(0, y - high));
}

export function weightedIntervalScore(
  median: number,
  intervals: readonly IntervalForecast[],
  y: number,
): number {
  const sum = intervals.reduce(
    (total, interval) => total + (interval.alpha / 2) * intervalScore(interval, y),
    Math.abs(y - median) / 2,
  );
  return sum / (intervals.length + 0.5);
}

/**
 * Mean absolute change over m months within the training months: the unit of MASE.
 * @param values null: not observed @returns null when no pair was observed or nothing changed
 */
export function naiveScale(values: readonly (number | null)[], m = 1): number | null {
  let sum = 0;
  let count = 0;
  for (let t = m; t < values.length; t++) {
    const [before, now] = [values[t - m], values[t]];
    if (before === null || now === null) continue;
    sum += Math.abs(now - before);
    count++;
  }
  return count > 0 && sum > 0 ? sum / count : null;
}

/** Mean absolute error in units of `naiveScale`. */
export function mase(actual: readonly number[], forecast: readonly number[], scale: number): number {
  return mean(actual.map((y, i) => Math.abs(y - forecast[i]) / scale));
}

/** Share of the outcomes within their intervals, ends included. */
export function coverage(
  intervals: readonly { low: number; high: number }[],
  actual: readonly number[],
): number {
  return mean(actual.map((y, i) => (y >= intervals[i].low && y <= intervals[i].high ? 1 : 0)));
}

/** @throws RangeError for no values */
export function mean(values: readonly number[]): number {
  if (values.length === 0) throw new RangeError('values must not be empty');
  return values.reduce((total, value) => total + value, 0) / values.length;
}
