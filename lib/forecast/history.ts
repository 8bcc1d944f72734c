/**
 * The fitted level in each month of the series: median and 90 % interval over draws, null before a firm's launch.
 */
import { createTrajectory } from '../dynamics/trajectory';
import { readColumn, thinDraws } from '../estimate/draws';
import type { Observations } from '../estimate/observations';
import type { DrawSet } from '../estimate/types';
import { intervalOf } from './interval';
import type { FitReport } from './report';

/** Draws that a month's interval is taken from. */
const HISTORY_DRAWS = 500;

const START_COLUMNS = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1Start', 'n2Start'];

export function computeHistory(draws: DrawSet, observations: Observations): FitReport['history'] {
  const thinned = thinDraws(draws, HISTORY_DRAWS);
  const columns = START_COLUMNS.map((column) => readColumn(thinned, column));
  const { months, skippedMonths, firms } = observations;
  const trajectory = createTrajectory({ months, entry1: firms[0].entry, entry2: firms[1].entry });
  const levels = firms.map(() => Array.from({ length: months }, () => [] as number[]));
  for (let i = 0; i < thinned.count; i++) {
    if (!trajectory.run(columns.map((column) => Math.log(column[i])))) continue;
    for (let t = 0; t < months; t++) {
      levels[0][t].push(Math.exp(trajectory.logLevel1[t]));
      levels[1][t].push(Math.exp(trajectory.logLevel2[t]));
    }
  }
  const rows = (firm: 0 | 1) => [
    ...Array.from({ length: skippedMonths }, () => null),
    ...levels[firm].map((values, t) =>
      t < firms[firm].entry || values.length === 0 ? null : intervalOf(values),
    ),
  ];
  return { focal: rows(0), rival: rows(1) };
}
