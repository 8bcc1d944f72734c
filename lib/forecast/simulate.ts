/**
 * Futures of posterior draws: the level of both firms, and observations around it.
 *
 * Level: the competitive growth system from the state in the last month of the series. Observation:
 * ln count(h) = ln level(h) + e(h),  e(h) = phi e(h-1) + s sqrt(1 - phi^2) z, from the error in the last month. The same seed gives the
 * same z whatever the levels are, so scenarios are compared with common random numbers.
 */
import { createTrajectory } from '../dynamics/trajectory';
import { readColumn } from '../estimate/draws';
import type { DrawSet } from '../estimate/types';
import { createStream } from '../numeric/random';
import { type DrawTable, fillTheta } from './draw-table';

/** Users per future month, month-major: month h (1 .. months) of draw i is at (h - 1) * count + i. */
export interface Futures {
  months: number;
  count: number;
  focal: Float64Array;
  rival: Float64Array;
}

/** Streams of the seed used for observation errors of firm 1 and 2. */
const ERROR_STREAM = 30;

/** Levels of every draw without a push. A draw whose path cannot be followed stays where it is. */
export function simulateLevels(table: DrawTable, months: number): Futures {
  const { count } = table;
  const focal = new Float64Array(months * count);
  const rival = new Float64Array(months * count);
  const trajectory = createTrajectory({ months: months + 1, entry1: 0, entry2: 0 });
  const theta = new Float64Array(8);
  for (let i = 0; i < count; i++) {
    fillTheta(table, i, theta);
    const isFollowed = trajectory.run(theta);
    for (let h = 1; h <= months; h++) {
      const at = (h - 1) * count + i;
      focal[at] = isFollowed ? Math.exp(trajectory.logLevel1[h]) : table.n1[i];
      rival[at] = isFollowed ? Math.exp(trajectory.logLevel2[h]) : table.n2[i];
    }
  }
  return { months, count, focal, rival };
}

/**
 * Observations around given levels: `replicates` of each draw, in antithetic pairs (z and -z), so that quantiles are smooth.
 * @param replicates an even number
 */
export function simulateObservations(
  draws: DrawSet,
  levels: Futures,
  seed: number,
  replicates: number,
): Futures {
  const { months, count } = levels;
  const total = count * replicates;
  const out: Futures = {
    months,
    count: total,
    focal: new Float64Array(months * total),
    rival: new Float64Array(months * total),
  };
  for (const firm of [1, 2] as const) {
    const size = readColumn(draws, `size${firm}`);
    const persistence = readColumn(draws, `persistence${firm}`);
    const residual = readColumn(draws, `residual${firm}`);
    const stream = createStream(seed, ERROR_STREAM + firm);
    const from = firm === 1 ? levels.focal : levels.rival;
    const to = firm === 1 ? out.focal : out.rival;
    for (let i = 0; i < count; i++) {
      const phi = persistence[i];
      const fresh = size[i] * Math.sqrt(1 - phi * phi);
      for (let pair = 0; pair < replicates / 2; pair++) {
        let carried = residual[i];
        let noise = 0;
        for (let h = 0; h < months; h++) {
          carried *= phi;
          noise = phi * noise + fresh * stream.normal();
          const level = from[h * count + i];
          const at = h * total + i * replicates + 2 * pair;
          to[at] = level * Math.exp(carried + noise);
          to[at + 1] = level * Math.exp(carried - noise);
        }
      }
    }
  }
  return out;
}
