/**
 * Likelihood of the state-space model by the extended Kalman filter, with the reverse sweep for its gradient.
 *
 *   z(t+1) = Phi_t(z(t)) + w(t), w ~ N(0, diag(process));   ln count_i(t) = z_i(t) + season_i(t mod 12) + v, v ~ N(0, observation_i)
 *
 * z ln users, Phi_t one month of the competitive growth system, its parameters those of the segment (before or after a break). Mean
 * through Phi, covariance through F = d Phi / d z (Jazwinski 1970; Kristensen, Madsen & Jorgensen 2004); the counts of a month update
 * one after the other; a month without a count is predicted and not updated, so gaps are exact. A flagged count has its variance
 * multiplied by FLAGGED_INFLATION. The start of a firm is a parameter, known exactly given theta; so is that it has left.
 */
import { createMonthFlow } from '../dynamics/month-flow';
import type { FirmObservations, Observations } from './observations';

/** A flagged count is believed this much less (variance): next to nothing. */
export const FLAGGED_INFLATION = 1e4;

/** What the filter runs on. */
export interface FilterInput {
  /** Eight log parameters. */
  theta: Float64Array;
  /** Six log parameters (r, K, alpha, beta) in force from `breakMonth` on; null: no break. */
  after: Float64Array | null;
  breakMonth: number;
  /** Variance of one observation (ln users squared), per firm. */
  observation: Float64Array;
  /** Variance of one month of process noise, per firm. */
  process: Float64Array;
  /** Seasonal offsets of ln counts, firm-major, one per month of the cycle that begins with month 0 of the grid; null: none. */
  season: Float64Array | null;
}

/** Gradients with respect to the fields of `FilterInput`. */
export interface FilterGradient {
  theta: Float64Array;
  after: Float64Array;
  observation: Float64Array;
  process: Float64Array;
  season: Float64Array;
}

/** What `sampleStatePath` needs to know of the last run. */
export interface FilterHistory {
  /** Per month: filtered mean (2) and covariance (3), predicted mean (2) and covariance (3). */
  states: Float64Array;
  /** Per month: F of the step to the next month, row-major. */
  jacobians: Float64Array;
}

export interface KalmanFilter {
  /** Filtered state in the last month after `run`: mean of ln users, and covariance (11, 12, 22). */
  readonly mean: Float64Array;
  readonly covariance: Float64Array;
  readonly history: FilterHistory;
  /** Integration steps taken since creation. */
  readonly steps: number;
  /** 1 where the count of a month is flagged, firm-major; may be changed between runs. */
  readonly flags: Uint8Array;
  /** Log likelihood up to a constant; -Infinity where the path cannot be followed. */
  run(input: FilterInput): number;
  /**
   * Adds the gradient along the last `run` with F held fixed: how F itself changes is left out, which vanishes with the process noise.
   * A Hamiltonian chain stays exact under any smooth force, since the accept step uses the true density; this one costs a third of the
   * exact one.
   */
  sweepBack(input: FilterInput, gradient: FilterGradient): void;
}

/** Doubles kept per month of `FilterHistory.states`. */
export const STATE_WIDTH = 10;

/** Doubles kept per month: scaled state before and after the month (4), then per firm: covariance (3), innovation, 1 / its variance. */
const WIDTH = 14;
export const SEASON_MONTHS = 12;

export function createKalmanFilter(observations: Observations): KalmanFilter {
  const { months, firms } = observations;
  const flow = createMonthFlow(months);
  const { state, adjoint } = flow;
  const counts = firms.map((firm) => onGrid(firm, months));
  const entry1 = firms[0].entry;
  const entry2 = firms[1].entry;
  const exit1 = firms[0].exit ?? months;
  const exit2 = firms[1].exit ?? months;
  const kept = new Float64Array(months * WIDTH);
  const history = {
    states: new Float64Array(months * STATE_WIDTH),
    jacobians: new Float64Array(months * 4),
  };
  const flags = new Uint8Array(2 * months);
  const mean = new Float64Array(2);
  const covariance = new Float64Array(3);
  let logK1 = 0;
  let logK2 = 0;

  const takeSegment = (parameters: Float64Array) => {
    logK1 = parameters[2];
    logK2 = parameters[3];
    flow.setParameters(
      Math.exp(parameters[0]),
      Math.exp(parameters[1]),
      Math.exp(parameters[4]),
      Math.exp(parameters[5]),
    );
  };

  /** The hot loop: written out over local numbers, because calls and array traffic here cost more than the arithmetic. */
  const run = (input: FilterInput): number => {
    const { theta, after, breakMonth, observation, process } = input;
    const { states, jacobians } = history;
    const [counts1, counts2] = counts;
    const { season } = input;
    const [variance1, variance2] = observation;
    const [process1, process2] = process;
    takeSegment(theta);
    let logLevel1 = 0;
    let logLevel2 = 0;
    let level1 = 0;
    let level2 = 0;
    let p11 = 0;
    let p12 = 0;
    let p22 = 0;
    let squares = 0;
    let logs = 0;
    let product = 1;
    for (let t = 0; t < months; t++) {
      const has1 = t >= entry1 && t < exit1;
      const has2 = t >= entry2 && t < exit2;
      if (after && t === breakMonth) {
        takeSegment(after);
        level1 = t > entry1 && has1 ? Math.exp(logLevel1 - logK1) : 0;
        level2 = t > entry2 && has2 ? Math.exp(logLevel2 - logK2) : 0;
      }
      if (t === entry1) {
        logLevel1 = theta[6];
        level1 = Math.exp(logLevel1 - logK1);
        p11 = 0;
        p12 = 0;
      }
      if (t === entry2) {
        logLevel2 = theta[7];
        level2 = Math.exp(logLevel2 - logK2);
        p22 = 0;
        p12 = 0;
      }
      // a firm that has left stays at no users, its logarithm where it was
      if (t === exit1) {
        level1 = 0;
        p11 = 0;
        p12 = 0;
      }
      if (t === exit2) {
        level2 = 0;
        p22 = 0;
        p12 = 0;
      }
      const state0 = t * STATE_WIDTH;
      states[state0 + 5] = logLevel1;
      states[state0 + 6] = logLevel2;
      states[state0 + 7] = p11;
      states[state0 + 8] = p12;
      states[state0 + 9] = p22;

      const at = t * WIDTH;
      let move1 = 0;
      let move2 = 0;
      const count1 = counts1[t];
      if (!Number.isNaN(count1)) {
        const variance = flags[t] === 1 ? variance1 * FLAGGED_INFLATION : variance1;
        const innovation = count1 - logLevel1 - (season ? season[t % SEASON_MONTHS] : 0);
        const total = p11 + variance;
        const inverse = 1 / total;
        kept[at + 4] = p11;
        kept[at + 5] = p12;
        kept[at + 6] = p22;
        kept[at + 7] = innovation;
        kept[at + 8] = inverse;
        const gain2 = p12 * inverse;
        move1 = p11 * inverse * innovation;
        move2 = gain2 * innovation;
        p22 -= p12 * gain2;
        p11 *= variance * inverse;
        p12 *= variance * inverse;
        squares += innovation * innovation * inverse;
        product *= total;
      }
      const count2 = counts2[t];
      if (!Number.isNaN(count2)) {
        const variance = flags[months + t] === 1 ? variance2 * FLAGGED_INFLATION : variance2;
        const offset = season ? season[SEASON_MONTHS + (t % SEASON_MONTHS)] : 0;
        const innovation = count2 - offset - logLevel2 - move2;
        const total = p22 + variance;
        const inverse = 1 / total;
        kept[at + 9] = p11;
        kept[at + 10] = p12;
        kept[at + 11] = p22;
        kept[at + 12] = innovation;
        kept[at + 13] = inverse;
        const gain1 = p12 * inverse;
        move1 += gain1 * innovation;
        move2 += p22 * inverse * innovation;
        p11 -= p12 * gain1;
        p22 *= variance * inverse;
        p12 *= variance * inverse;
        squares += innovation * innovation * inverse;
        product *= total;
      }
      // variances stay far from both ends of the range over this many months
      if (t % MONTHS_PER_LOG === MONTHS_PER_LOG - 1) {
        logs += Math.log(product);
        product = 1;
      }
      logLevel1 += move1;
      logLevel2 += move2;
      states[state0] = logLevel1;
      states[state0 + 1] = logLevel2;
      states[state0 + 2] = p11;
      states[state0 + 3] = p12;
      states[state0 + 4] = p22;
      if (t === months - 1) break;

      const x = level1 * exponential(move1);
      const y = level2 * exponential(move2);
      state[0] = x;
      state[1] = y;
      const to = 4 * t;
      if (!flow.advanceWithPropagator(t, jacobians, to)) return Number.NEGATIVE_INFINITY;
      level1 = state[0];
      level2 = state[1];
      if ((has1 && !(level1 > 0)) || (has2 && !(level2 > 0))) return Number.NEGATIVE_INFINITY;
      // from the scaled state to its logarithm: d ln x' / d ln x = (d x' / d x) x / x'
      const inverse1 = has1 ? 1 / level1 : 0;
      const inverse2 = has2 ? 1 / level2 : 0;
      const f11 = jacobians[to] * x * inverse1;
      const f12 = jacobians[to + 1] * y * inverse1;
      const f21 = jacobians[to + 2] * x * inverse2;
      const f22 = jacobians[to + 3] * y * inverse2;
      jacobians[to] = f11;
      jacobians[to + 1] = f12;
      jacobians[to + 2] = f21;
      jacobians[to + 3] = f22;
      kept[at] = x;
      kept[at + 1] = y;
      kept[at + 2] = level1;
      kept[at + 3] = level2;
      if (has1) logLevel1 += logRatio(level1, x);
      if (has2) logLevel2 += logRatio(level2, y);
      const q11 = f11 * p11 + f12 * p12;
      const q12 = f11 * p12 + f12 * p22;
      const q21 = f21 * p11 + f22 * p12;
      const q22 = f21 * p12 + f22 * p22;
      p11 = q11 * f11 + q12 * f12 + (has1 ? process1 : 0);
      p12 = q11 * f21 + q12 * f22;
      p22 = q21 * f21 + q22 * f22 + (has2 ? process2 : 0);
    }
    mean[0] = logLevel1;
    mean[1] = logLevel2;
    covariance[0] = p11;
    covariance[1] = p12;
    covariance[2] = p22;
    return orImpossible(-0.5 * (squares + logs + Math.log(product)));
  };

  /** Moves what the flow has gathered into the gradient of a segment. */
  const collect = (segment: Float64Array) => {
    segment[0] += flow.gradient[0];
    segment[1] += flow.gradient[1];
    segment[4] += flow.gradient[2];
    segment[5] += flow.gradient[3];
    flow.clearGradient();
  };

  /** The loop of `run` in reverse; written out for the same reason. `by..`: adjoints of mean (1, 2) and covariance (11, 12, 22). */
  const sweepBack = (input: FilterInput, gradient: FilterGradient): void => {
    const { theta, after, breakMonth, observation } = input;
    const { jacobians } = history;
    const [counts1, counts2] = counts;
    const { season } = gradient;
    const [variance1, variance2] = observation;
    flow.clearGradient();
    let segment = after ? gradient.after : gradient.theta;
    let by1 = 0;
    let by2 = 0;
    let by11 = 0;
    let by12 = 0;
    let by22 = 0;
    let byVariance1 = 0;
    let byVariance2 = 0;
    let byProcess1 = 0;
    let byProcess2 = 0;
    for (let t = months - 1; t >= 0; t--) {
      if (after && t === breakMonth - 1) {
        collect(segment);
        segment = gradient.theta;
        takeSegment(theta);
      }
      const at = t * WIDTH;
      const has1 = t >= entry1 && t < exit1;
      const has2 = t >= entry2 && t < exit2;
      if (t < months - 1) {
        const f11 = jacobians[4 * t];
        const f12 = jacobians[4 * t + 1];
        const f21 = jacobians[4 * t + 2];
        const f22 = jacobians[4 * t + 3];
        if (has1) byProcess1 += by11;
        if (has2) byProcess2 += by22;
        const next11 = f11 * f11 * by11 + f11 * f21 * by12 + f21 * f21 * by22;
        const next12 = 2 * f11 * f12 * by11 + (f11 * f22 + f12 * f21) * by12 + 2 * f21 * f22 * by22;
        by22 = f12 * f12 * by11 + f12 * f22 * by12 + f22 * f22 * by22;
        by11 = next11;
        by12 = next12;
        adjoint[0] = has1 ? by1 / kept[at + 2] : 0;
        adjoint[1] = has2 ? by2 / kept[at + 3] : 0;
        flow.pullBack(t);
        const before1 = adjoint[0] * kept[at];
        const before2 = adjoint[1] * kept[at + 1];
        if (has1) segment[2] += by1 - before1;
        if (has2) segment[3] += by2 - before2;
        by1 = before1;
        by2 = before2;
      }
      if (!Number.isNaN(counts2[t])) {
        const inflation = flags[months + t] === 1 ? FLAGGED_INFLATION : 1;
        const variance = variance2 * inflation;
        const both = kept[at + 10];
        const own = kept[at + 11];
        const innovation = kept[at + 12];
        const inverse = kept[at + 13];
        const gains = own * by2 + both * by1;
        const shrinks = own * by22 + both * by12;
        const byTotal =
          inverse *
          ((0.5 * innovation * innovation - gains * innovation - variance * shrinks + both * both * by11) *
            inverse -
            0.5);
        byVariance2 += (shrinks * inverse + byTotal) * inflation;
        season[SEASON_MONTHS + (t % SEASON_MONTHS)] += (innovation - gains) * inverse;
        by22 = (by2 * innovation + by22 * variance) * inverse + byTotal;
        by12 = (by1 * innovation + by12 * variance - 2 * both * by11) * inverse;
        by2 += (innovation - gains) * inverse;
      }
      if (!Number.isNaN(counts1[t])) {
        const inflation = flags[t] === 1 ? FLAGGED_INFLATION : 1;
        const variance = variance1 * inflation;
        const own = kept[at + 4];
        const both = kept[at + 5];
        const innovation = kept[at + 7];
        const inverse = kept[at + 8];
        const gains = own * by1 + both * by2;
        const shrinks = own * by11 + both * by12;
        const byTotal =
          inverse *
          ((0.5 * innovation * innovation - gains * innovation - variance * shrinks + both * both * by22) *
            inverse -
            0.5);
        byVariance1 += (shrinks * inverse + byTotal) * inflation;
        season[t % SEASON_MONTHS] += (innovation - gains) * inverse;
        by11 = (by1 * innovation + by11 * variance) * inverse + byTotal;
        by12 = (by2 * innovation + by12 * variance - 2 * both * by22) * inverse;
        by1 += (innovation - gains) * inverse;
      }
      if (t === entry1) {
        gradient.theta[6] += by1;
        by1 = 0;
        by11 = 0;
        by12 = 0;
      }
      if (t === entry2) {
        gradient.theta[7] += by2;
        by2 = 0;
        by22 = 0;
        by12 = 0;
      }
      if (t === exit1) {
        by1 = 0;
        by11 = 0;
        by12 = 0;
      }
      if (t === exit2) {
        by2 = 0;
        by22 = 0;
        by12 = 0;
      }
    }
    collect(segment);
    gradient.observation[0] += byVariance1;
    gradient.observation[1] += byVariance2;
    gradient.process[0] += byProcess1;
    gradient.process[1] += byProcess2;
  };

  return {
    mean,
    covariance,
    history,
    flags,
    get steps() {
      return flow.steps;
    },
    run,
    sweepBack,
  };
}

/** exp for the small moves of a filter: a polynomial within 2e-13 of it up to SMALL_MOVE, where Math.exp takes over. */
function exponential(move: number): number {
  if (!(Math.abs(move) < SMALL_MOVE)) return Math.exp(move);
  return (
    1 + move * (1 + (move / 2) * (1 + (move / 3) * (1 + (move / 4) * (1 + (move / 5) * (1 + move / 6)))))
  );
}
const SMALL_MOVE = 0.05;

/** Months whose variances are multiplied before the logarithm is taken: above 1e-18 each, so never 0. */
const MONTHS_PER_LOG = 8;

/** ln(a / b) for neighbours: 2 artanh((a - b) / (a + b)) as a series within 2e-14 up to NEAR_RATIO, where Math.log takes over. */
function logRatio(a: number, b: number): number {
  const s = (a - b) / (a + b);
  if (!(Math.abs(s) < NEAR_RATIO)) return Math.log(a / b);
  const q = s * s;
  return 2 * s * (1 + q * (1 / 3 + q * (1 / 5 + q * (1 / 7 + q * (1 / 9 + q * (1 / 11))))));
}
const NEAR_RATIO = 0.1;

/** -Infinity in place of NaN. */
export function orImpossible(value: number): number {
  return Number.isNaN(value) ? Number.NEGATIVE_INFINITY : value;
}

/** ln counts per month of the grid, NaN where not observed. */
function onGrid(firm: FirmObservations, months: number): Float64Array {
  const grid = new Float64Array(months).fill(Number.NaN);
  firm.months.forEach((month, k) => {
    grid[month] = firm.logCounts[k];
  });
  return grid;
}
