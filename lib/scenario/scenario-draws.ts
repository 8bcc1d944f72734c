/**
 * Posterior draws made ready for scenarios: one system and start per draw, the month of the push counted from the last observed one, and
 * the measurement errors of future counts, drawn once so that every scenario meets the same luck (common random numbers).
 *
 *   count(h) = level(h) exp(e(h)),   e(h) = phi e(h-1) + s sqrt(1 - phi^2) z(h),   e(0) the error in the last observed month
 *
 * With process noise the level itself is shaken once a month, by exp(noise z), and e(h) = s z(h) has no memory; where the draws have a
 * yearly cycle its offset is part of e(h).
 * Each draw has REPLICATES errors in antithetic pairs (z and -z), so that the quantiles of counts are smooth.
 */
import type { CompetitionSystem, State } from '../dynamics/system';
import { readColumn } from '../estimate/draws';
import type { DrawSet } from '../estimate/types';
import { readDrawTable } from '../forecast/draw-table';
import { drawShocks, readSeasonFactors } from '../forecast/simulate';
import { createStream } from '../numeric/random';

/** Errors per draw; even. */
export const REPLICATES = 2;
/** Stream of the seed for the errors of firm 1; firm 2 has the next. */
const ERROR_STREAM = 40;

export interface ScenarioDraws {
  count: number;
  systems: CompetitionSystem[];
  /** Users in the last observed month. */
  starts: State[];
}

export function readScenarioDraws(draws: DrawSet): ScenarioDraws {
  const table = readDrawTable(draws);
  const systems: CompetitionSystem[] = [];
  const starts: State[] = [];
  for (let i = 0; i < table.count; i++) {
    systems.push({
      r1: table.r1[i]!,
      r2: table.r2[i]!,
      k1: table.k1[i]!,
      k2: table.k2[i]!,
      alpha: table.alpha[i]!,
      beta: table.beta[i]!,
    });
    starts.push([table.n1[i]!, table.n2[i]!]);
  }
  return { count: table.count, systems, starts };
}

/**
 * Factors exp(e(h)) of one firm's counts, month-major: month h (1 .. months), draw i, replicate k is at
 * ((h - 1) count + i) REPLICATES + k.
 */
export function drawErrorFactors(draws: DrawSet, firm: 1 | 2, months: number, seed: number): Float64Array {
  const size = readColumn(draws, `size${firm}`);
  const hasMemory = draws.errorModel === 'ar1';
  const persistence = hasMemory ? readColumn(draws, `persistence${firm}`) : new Float64Array(draws.count);
  const residual = hasMemory ? readColumn(draws, `residual${firm}`) : new Float64Array(draws.count);
  const season = readSeasonFactors(draws, firm, months);
  const stream = createStream(seed, ERROR_STREAM + firm - 1);
  const factors = new Float64Array(months * draws.count * REPLICATES);
  for (let i = 0; i < draws.count; i++) {
    const phi = persistence[i]!;
    const fresh = size[i]! * Math.sqrt(1 - phi * phi);
    for (let pair = 0; pair < REPLICATES; pair += 2) {
      let carried = residual[i]!;
      let noise = 0;
      for (let h = 0; h < months; h++) {
        carried *= phi;
        noise = phi * noise + fresh * stream.normal();
        const cycle = season ? season[h * draws.count + i]! : 1;
        const at = (h * draws.count + i) * REPLICATES + pair;
        factors[at] = cycle * Math.exp(carried + noise);
        factors[at + 1] = cycle * Math.exp(carried - noise);
      }
    }
  }
  return factors;
}

/**
 * Factors by which the level is shaken at the end of each month, firm 1 then firm 2: month h (1 .. months) of draw i is at
 * 2 ((h - 1) count + i). Null when the error model has no process noise.
 */
export function drawShockFactors(draws: DrawSet, months: number, seed: number): Float64Array | null {
  const shocks = drawShocks(draws, months, seed);
  if (!shocks) return null;
  const noise = [readColumn(draws, 'noise1'), readColumn(draws, 'noise2')] as const;
  return shocks.map((z, at) => Math.exp(noise[at & 1]![(at >> 1) % draws.count]! * z));
}
