/**
 * Posterior draws as one table of numbers: built by the sampler, thinned for storage, read by column name.
 *
 * Columns of a set: AR1_COLUMNS in ar1-posterior.ts, STATE_COLUMNS in state-posterior.ts. Natural units: r per month, k, n and n..Start
 * in users (n: level in the last month of the series), alpha, beta and persistence without unit, size as sd of ln users, residual as ln count minus ln level in the last month, noise as
 * sd of ln users per root month, breakMonth as month of the grid or -1. r to beta are those in force in the last month. With a yearly cycle
 * come its offsets of ln users, see `seasonColumn`.
 */
import type { DrawSet } from './types';

/**
 * At most `count` rows, evenly spaced over the whole set (which holds the chains interleaved, so every chain keeps its share).
 * @throws RangeError when count is not a positive integer
 */
export function thinDraws(draws: DrawSet, count: number): DrawSet {
  if (!(Number.isInteger(count) && count >= 1))
    throw new RangeError(`count must be a positive integer, got ${count}`);
  if (draws.count <= count) return draws;
  const width = draws.columns.length;
  const values = new Float64Array(count * width);
  for (let i = 0; i < count; i++) {
    const from = Math.floor((i * draws.count) / count) * width;
    for (let c = 0; c < width; c++) values[i * width + c] = draws.values[from + c];
  }
  return { ...draws, count, values };
}

/**
 * Position of a column.
 * @throws RangeError for a column that the set does not have
 */
export function columnIndex(draws: DrawSet, column: string): number {
  const index = draws.columns.indexOf(column);
  if (index < 0) throw new RangeError(`column must be one of ${draws.columns.join(', ')}, got ${column}`);
  return index;
}

/** One column as an array of `draws.count` values. */
export function readColumn(draws: DrawSet, column: string): Float64Array {
  const index = columnIndex(draws, column);
  const width = draws.columns.length;
  return Float64Array.from({ length: draws.count }, (_, i) => draws.values[i * width + index]);
}
