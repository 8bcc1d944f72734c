/**
 * Futures of posterior draws: the level of both firms, and observations around it.
 *
 * Level: the competitive growth system from the state in the last month of the series; with process noise the state is shaken once
 * a month, ln level += noise z. Observation, with persistent errors: ln count(h) = ln level(h) + e(h), e(h) = phi e(h-1) +
 * s sqrt(1 - phi^2) z from the error in the last month; with process noise: e(h) = s z, plus the offset of the yearly cycle where the
 * draws have one. The same seed gives the same z whatever the
 * levels are, so scenarios are compared with common random numbers.
 */
import { createMonthFlow } from '../dynamics/month-flow';
import { readColumn } from '../estimate/draws';
import { seasonColumn } from '../estimate/state-posterior';
import type { DrawSet } from '../estimate/types';
import { createStream } from '../numeric/random';
import { readDrawTable } from './draw-table';

/** Users per future month, month-major: month h (1 .. months) of draw i is at (h - 1) * count + i. */
export interface Futures {
  months: number;
  count: number;
  focal: Float64Array;
  rival: Float64Array;
}

/** Streams of the seed for process noise, and for observation errors of firm 1 and 2. */
const PROCESS_STREAM = 100;
const ERROR_STREAM = 101;

/**
 * Standard normal shocks of the state, two per draw and month: month h (1 ..) of draw i at 2 ((h - 1) count + i), firm 1 then firm 2.
 * Null when the error model has no process noise.
 */
export function drawShocks(draws: DrawSet, months: number, seed: number): Float64Array | null {
  if (draws.errorModel !== 'process-noise') return null;
  const stream = createStream(seed, PROCESS_STREAM);
  return new Float64Array(2 * months * draws.count).map(() => stream.normal());
}

/** Levels of every draw without a push. A draw whose path cannot be followed stays where it is. */
export function simulateLevels(draws: DrawSet, months: number, seed: number): Futures {
  const { count, r1, r2, k1, k2, alpha, beta, n1, n2 } = readDrawTable(draws);
  const shocks = drawShocks(draws, months, seed);
  const noise = shocks && [readColumn(draws, 'noise1'), readColumn(draws, 'noise2')];
  const futures = emptyFutures(months, count);
  const flow = createMonthFlow(1);
  const { state } = flow;
  for (let i = 0; i < count; i++) {
    flow.setParameters(r1[i], r2[i], alpha[i], beta[i]);
    state[0] = n1[i] / k1[i];
    state[1] = n2[i] / k2[i];
    let isFollowed = true;
    for (let h = 0; h < months; h++) {
      const at = h * count + i;
      isFollowed = isFollowed && flow.advance(0);
      if (isFollowed && shocks && noise) {
        state[0] *= Math.exp(noise[0][i] * shocks[2 * at]);
        state[1] *= Math.exp(noise[1][i] * shocks[2 * at + 1]);
      }
      futures.focal[at] = isFollowed ? state[0] * k1[i] : n1[i];
      futures.rival[at] = isFollowed ? state[1] * k2[i] : n2[i];
    }
  }
  return futures;
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
  const futures = emptyFutures(months, total);
  for (const firm of [1, 2] as const) {
    const { size, persistence, residual } = readErrors(draws, firm);
    const season = readSeasonFactors(draws, firm, months);
    const stream = createStream(seed, ERROR_STREAM + firm);
    const from = firm === 1 ? levels.focal : levels.rival;
    const to = firm === 1 ? futures.focal : futures.rival;
    for (let i = 0; i < count; i++) {
      const phi = persistence[i];
      const fresh = size[i] * Math.sqrt(1 - phi * phi);
      for (let pair = 0; pair < replicates / 2; pair++) {
        let carried = residual[i];
        let error = 0;
        for (let h = 0; h < months; h++) {
          carried *= phi;
          error = phi * error + fresh * stream.normal();
          const level = from[h * count + i] * (season ? season[h * count + i] : 1);
          const at = h * total + i * replicates + 2 * pair;
          to[at] = level * Math.exp(carried + error);
          to[at + 1] = level * Math.exp(carried - error);
        }
      }
    }
  }
  return futures;
}

/**
 * Factors of the yearly cycle on future counts of one firm, month-major as `Futures`; null when the draws have none.
 */
export function readSeasonFactors(draws: DrawSet, firm: 1 | 2, months: number): Float64Array | null {
  if (!draws.columns.includes(seasonColumn(firm, 1))) return null;
  const factors = new Float64Array(months * draws.count);
  for (let h = 0; h < months; h++) {
    readColumn(draws, seasonColumn(firm, h + 1)).forEach((offset, i) => {
      factors[h * draws.count + i] = Math.exp(offset);
    });
  }
  return factors;
}

function readErrors(draws: DrawSet, firm: 1 | 2) {
  const size = readColumn(draws, `size${firm}`);
  if (draws.errorModel === 'process-noise') {
    return { size, persistence: new Float64Array(draws.count), residual: new Float64Array(draws.count) };
  }
  return {
    size,
    persistence: readColumn(draws, `persistence${firm}`),
    residual: readColumn(draws, `residual${firm}`),
  };
}

function emptyFutures(months: number, count: number): Futures {
  return { months, count, focal: new Float64Array(months * count), rival: new Float64Array(months * count) };
}
