/** Markets with known truth: paths of the system with seeded errors, for tests of fits. */
import { createMonthFlow } from '@/lib/dynamics/month-flow';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import type { Observations } from '@/lib/estimate/observations';
import { readObservations } from '@/lib/estimate/observations';
import { createStream } from '@/lib/numeric/random';
import type { MonthlySeries } from '@/lib/series/types';

export interface Truth {
  r1: number;
  r2: number;
  k1: number;
  k2: number;
  alpha: number;
  beta: number;
  n1: number;
  n2: number;
}

export const COEXISTING: Truth = {
  r1: 0.15,
  r2: 0.19,
  k1: 9e5,
  k2: 7e5,
  alpha: 0.5,
  beta: 0.4,
  n1: 5e4,
  n2: 3e4,
};
export const RIVAL_LOSES: Truth = {
  r1: 0.19,
  r2: 0.18,
  k1: 9e5,
  k2: 7e5,
  alpha: 0.4,
  beta: 1.6,
  n1: 5e4,
  n2: 9e4,
};

export const FIRST_MONTH = 2020 * 12;

/** Log parameters in the order of the estimation. */
export function toTheta({ r1, r2, k1, k2, alpha, beta, n1, n2 }: Truth): Float64Array {
  return Float64Array.of(r1, r2, k1, k2, alpha, beta, n1, n2).map(Math.log);
}

/** Path with independent log errors; `futureMonths` more months follow, split off by the caller. */
export function simulateSeries(truth: Truth, months: number, error: number, seed: number): MonthlySeries {
  const trajectory = createTrajectory({ months, entry1: 0, entry2: 0 });
  trajectory.run(toTheta(truth));
  const stream = createStream(seed, 0);
  const observe = (logLevel: Float64Array) =>
    Array.from(logLevel, (value) => Math.round(Math.exp(value + error * stream.normal())));
  return {
    firstMonth: FIRST_MONTH,
    focal: observe(trajectory.logLevel1),
    rival: observe(trajectory.logLevel2),
  };
}

/** Like `simulateSeries`, the level shaken once a month. */
export function simulateWandering(
  truth: Truth,
  months: number,
  error: number,
  noise: number,
  seed: number,
): MonthlySeries {
  const flow = createMonthFlow(1);
  const stream = createStream(seed, 0);
  flow.setParameters(truth.r1, truth.r2, truth.alpha, truth.beta);
  flow.state[0] = truth.n1 / truth.k1;
  flow.state[1] = truth.n2 / truth.k2;
  const focal: number[] = [];
  const rival: number[] = [];
  for (let t = 0; t < months; t++) {
    focal.push(Math.round(flow.state[0] * truth.k1 * Math.exp(error * stream.normal())));
    rival.push(Math.round(flow.state[1] * truth.k2 * Math.exp(error * stream.normal())));
    flow.advance(0);
    flow.state[0] *= Math.exp(noise * stream.normal());
    flow.state[1] *= Math.exp(noise * stream.normal());
  }
  return { firstMonth: FIRST_MONTH, focal, rival };
}

/** Observations of a series that must be usable. */
export function observe(series: MonthlySeries): Observations {
  const reading = readObservations(series);
  if (!reading.ok) throw new Error(`series not usable: ${reading.status}`);
  return reading.observations;
}
