/**
 * The columns of a draw set that a forecast reads, taken out once: natural units, one value per draw.
 */
import { readColumn } from '../estimate/draws';
import type { DrawSet } from '../estimate/types';

export interface DrawTable {
  count: number;
  r1: Float64Array;
  r2: Float64Array;
  k1: Float64Array;
  k2: Float64Array;
  alpha: Float64Array;
  beta: Float64Array;
  /** Users in the last month of the series. */
  n1: Float64Array;
  n2: Float64Array;
}

const COLUMNS = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1', 'n2'] as const;

export function readDrawTable(draws: DrawSet): DrawTable {
  const columns = Object.fromEntries(COLUMNS.map((column) => [column, readColumn(draws, column)]));
  return { count: draws.count, ...(columns as Record<(typeof COLUMNS)[number], Float64Array>) };
}

/** Fills `theta` (8) with the log parameters of draw i, its path starting at the last month of the series. */
export function fillTheta(table: DrawTable, i: number, theta: Float64Array): void {
  COLUMNS.forEach((column, j) => {
    theta[j] = Math.log(table[column][i]);
  });
}
