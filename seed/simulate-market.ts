/**
 * Monthly counts of a market whose truth is known: the competitive growth system, observed with lognormal error.
 *   count_i(t) = round(N_i(t) exp(noise_i z_i(t))),  z standard normal, one seeded stream per firm
 * The rival's counts are rounded to tens, as estimates are given.
 */

import { fillForcedTrajectory } from '../lib/dynamics/forced-trajectory';
import { createForcing } from '../lib/dynamics/forcing';
import type { CompetitionSystem, State } from '../lib/dynamics/system';
import { createStream } from '../lib/numeric/random';
import { parseMonth } from '../lib/series/month';
import type { MonthlySeries } from '../lib/series/types';

export interface SimulatedTruth {
  system: CompetitionSystem;
  /** Users in the first month. */
  start: State;
  /** "2024-03". */
  firstMonth: string;
  months: number;
  /** Measurement error, sd of ln users. */
  noise: { focal: number; rival: number };
  seed: number;
}

const RIVAL_ROUNDED_TO = 10;

/** @throws when the truth is no system or its path is not finite: a mistake in the list of markets */
export function simulateMarket(truth: SimulatedTruth): MonthlySeries {
  const firstMonth = parseMonth(truth.firstMonth);
  if (firstMonth === null) throw new RangeError(`firstMonth ${truth.firstMonth}`);
  const levels = new Float64Array(2 * truth.months);
  const status = fillForcedTrajectory(truth.system, truth.start, createForcing([]), truth.months - 1, levels);
  if (status !== 'complete') throw new RangeError(`the simulated path ended as ${status}`);

  const observe = (firm: number, noise: number, roundedTo: number) => {
    const stream = createStream(truth.seed, firm);
    return Array.from({ length: truth.months }, (_, month) => {
      const count = levels[2 * month + firm] * Math.exp(noise * stream.normal());
      return roundedTo * Math.round(count / roundedTo);
    });
  };
  return {
    firstMonth,
    focal: observe(0, truth.noise.focal, 1),
    rival: observe(1, truth.noise.rival, RIVAL_ROUNDED_TO),
  };
}
