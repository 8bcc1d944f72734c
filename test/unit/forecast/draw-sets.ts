/** Draw sets with chosen values, for tests of forecasts. */
import { AR1_COLUMNS } from '@/lib/estimate/ar1-posterior';
import { STATE_COLUMNS } from '@/lib/estimate/state-posterior';
import type { DrawSet } from '@/lib/estimate/types';

const BASE: Record<string, number> = {
  r1: 0.15,
  r2: 0.19,
  k1: 9e5,
  k2: 7e5,
  alpha: 0.5,
  beta: 0.4,
  n1Start: 5e4,
  n2Start: 3e4,
  n1: 4e5,
  n2: 3e5,
  size1: 0.05,
  size2: 0.02,
  persistence1: 0,
  persistence2: 0,
  residual1: 0,
  residual2: 0,
  noise1: 0.01,
  noise2: 0.01,
  breakMonth: -1,
};

export function drawSet(errorModel: DrawSet['errorModel'], rows: Record<string, number>[]): DrawSet {
  const columns = [...(errorModel === 'ar1' ? AR1_COLUMNS : STATE_COLUMNS)] as string[];
  const values = rows.flatMap((row) => columns.map((column) => row[column] ?? BASE[column]));
  return { errorModel, columns, count: rows.length, values: Float64Array.from(values) };
}

export const repeat = (count: number, row: Record<string, number> = {}) =>
  Array.from({ length: count }, () => row);
