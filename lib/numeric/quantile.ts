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
  return quantilesInPlace(Float64Array.from(values), ps);
}

/**
 * Quantiles of values that may be put in another order: only the order statistics asked for are brought into place (Hoare's selection,
 * 1961), which for a few quantiles of thousands of values is several times faster than sorting.
 * @throws RangeError as `quantileSorted`
 */
export function quantilesInPlace(values: Float64Array, ps: readonly number[]): number[] {
  if (values.length === 0) throw new RangeError('values must hold at least one value, got none');
  // a NaN has no rank: the whole answer is unknown
  for (let i = 0; i < values.length; i++) if (Number.isNaN(values[i])) return ps.map(() => Number.NaN);
  const last = values.length - 1;
  const ranks = ps.flatMap((p) => {
    if (!(p >= 0 && p <= 1)) throw new RangeError(`p must be between 0 and 1, got ${p}`);
    const below = Math.floor(last * p);
    return [below, Math.min(below + 1, last)];
  });
  selectRanks(
    values,
    [...ranks].sort((a, b) => a - b),
    0,
    last,
  );
  return ps.map((p, k) => {
    const low = values[ranks[2 * k]];
    const high = values[ranks[2 * k + 1]];
    const fraction = last * p - ranks[2 * k];
    return low === high || fraction === 0 ? low : low + (high - low) * fraction;
  });
}

/** Brings ascending ranks within first .. last into place: the middle one, then those on either side within what is left to them. */
function selectRanks(values: Float64Array, ranks: readonly number[], first: number, last: number): void {
  if (ranks.length === 0 || first >= last) return;
  const middle = ranks.length >> 1;
  const rank = ranks[middle];
  selectRank(values, rank, first, last);
  selectRanks(
    values,
    ranks.slice(0, middle).filter((other) => other < rank),
    first,
    rank - 1,
  );
  selectRanks(
    values,
    ranks.slice(middle + 1).filter((other) => other > rank),
    rank + 1,
    last,
  );
}

/** Puts the value of a rank in its place, smaller ones before it and larger ones after it, within first .. last. */
function selectRank(values: Float64Array, rank: number, first: number, last: number): void {
  let low = first;
  let high = last;
  while (low < high) {
    const pivot = values[(low + high) >> 1];
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i] < pivot) i++;
      while (values[j] > pivot) j--;
      if (i > j) break;
      const kept = values[i];
      values[i++] = values[j];
      values[j--] = kept;
    }
    if (rank <= j) high = j;
    else if (rank >= i) low = i;
    else return;
  }
}
