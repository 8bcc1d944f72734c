/**
 * Minimum of a function of a few variables in a box, without derivatives: the best point of a grid, then a pattern search along the axes
 * (Hooke & Jeeves 1961, exploratory moves only) that halves its steps until they are small. Deterministic.
 */

/** Steps end at this share of each side. */
const SMALLEST_STEP = 1e-6;

/**
 * @param low, high ends of the box, one entry a variable
 * @param grid points of the first grid along each axis, at least 2
 * @returns the best point seen; values that are not finite never win
 */
export function minimiseInBox(
  value: (point: Float64Array) => number,
  low: readonly number[],
  high: readonly number[],
  grid: number,
): { point: Float64Array; value: number } {
  const best = searchGrid(value, low, high, grid);
  const trial = Float64Array.from(best.point);
  for (let share = 0.5 / (grid - 1); share > SMALLEST_STEP; ) {
    let hasMoved = false;
    for (let j = 0; j < low.length; j++) {
      for (const sign of [1, -1]) {
        trial.set(best.point);
        trial[j] = Math.min(high[j], Math.max(low[j], trial[j] + sign * share * (high[j] - low[j])));
        const here = value(trial);
        if (!(here < best.value)) continue;
        best.value = here;
        best.point.set(trial);
        hasMoved = true;
      }
    }
    if (!hasMoved) share /= 2;
  }
  return best;
}

function searchGrid(
  value: (point: Float64Array) => number,
  low: readonly number[],
  high: readonly number[],
  grid: number,
): { point: Float64Array; value: number } {
  const n = low.length;
  const point = new Float64Array(n);
  const best = { point: Float64Array.from(low), value: Number.POSITIVE_INFINITY };
  for (let index = 0; index < grid ** n; index++) {
    for (let j = 0, rest = index; j < n; j++, rest = Math.floor(rest / grid)) {
      point[j] = low[j] + ((rest % grid) / (grid - 1)) * (high[j] - low[j]);
    }
    const here = value(point);
    if (!(here < best.value)) continue;
    best.value = here;
    best.point.set(point);
  }
  return best;
}
