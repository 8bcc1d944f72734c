/**
 * Sample quantiles, type 7 of Hyndman & Fan (1996): linear interpolation between order statistics, h = (n - 1) p.
 */

/**
 * Quantile of values already in ascending order.
 * @param sorted at least one value, ascending; infinite values are allowed
 * @param p probability in [0, 1]
 * @throws RangeError for no values or p outside [0, 1]
 */
export function quantileSorted(sorted: ArrayLike<number>, p: number): number {
  if (sorted.length === 0) throw new RangeError('sorted must hold at least one value, got none');
  if (!(p >= 0 && p <= 1)) throw new RangeError(`p must be between 0 and 1, got ${p}`);
  const position = (sorted.length - 1) * p;
  const below = Math.floor(position);
  const low = sorted[below];
  const high = sorted[Math.min(below + 1, sorted.length - 1)];
  const fraction = position - below;
  // equal neighbours first: infinity minus infinity would be NaN
  return low === high || fraction === 0 ? low : low + (high - low) * fraction;
}

/**
 * Quantiles of unsorted values, one per probability; the values are left as they are.
 * @throws RangeError as `quantileSorted`
 */
export function quantiles(values: ArrayLike<number>, ps: readonly number[]): number[] {
  const sorted = Float64Array.from(values).sort();
  return ps.map((p) => quantileSorted(sorted, p));
}
