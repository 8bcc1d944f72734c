/**
 * Likelihood of the state-space model by the extended Kalman filter, with the reverse sweep for its gradient.
 *
 *   z(t+1) = Phi_t(z(t)) + w(t), w ~ N(0, diag(process));   ln count_i(t) = z_i(t) + season_i(t mod 12) + v, v ~ N(0, observation_i)
 *
 * z ln users, Phi_t one month of the competitive growth system, its parameters those of the segment (before or after a break). Mean
 * through Phi, covariance through F = d Phi / d z (Jazwinski 1970; Kristensen, Madsen & Jorgensen 2004); the counts of a month update
 * one after the other; a month without a count is predicted and not updated, so gaps are exact. A flagged count has its variance
 * multiplied by FLAGGED_INFLATION. The start of a firm is a parameter, known exactly given theta.
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

/** Doubles kept per month: scaled state before and after the month (4), then per firm: covariance (3), innovation, its variance. */
const WIDTH = 14;
const UPDATE = 4;
const UPDATE_WIDTH = 5;
export const SEASON_MONTHS = 12;

export function createKalmanFilter(observations: Observations): KalmanFilter {
  const { months, firms } = observations;
  const flow = createMonthFlow(months);
  const { state, tangent, adjoint } = flow;
  const counts = firms.map((firm) => onGrid(firm, months));
  const entry1 = firms[0].entry;
  const entry2 = firms[1].entry;
  const kept = new Float64Array(months * WIDTH);
  const history = {
    states: new Float64Array(months * STATE_WIDTH),
    jacobians: new Float64Array(months * 4),
  };
  const flags = new Uint8Array(2 * months);
  const mean = new Float64Array(2);
  const covariance = new Float64Array(3);
  /** Adjoints of mean and covariance. */
  const pullMean = new Float64Array(2);
  const pull = new Float64Array(3);
  let season: Float64Array | null = null;
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

  const enter = (t: number, theta: Float64Array) => {
    if (t === entry1) {
      mean[0] = theta[6];
      covariance[0] = 0;
      covariance[1] = 0;
    }
    if (t === entry2) {
      mean[1] = theta[7];
      covariance[2] = 0;
      covariance[1] = 0;
    }
  };

  const varianceOf = (i: number, t: number, observation: Float64Array): number =>
    flags[i * months + t] === 1 ? observation[i] * FLAGGED_INFLATION : observation[i];

  /** Update by the count of firm i; returns its log likelihood. */
  const update = (i: number, t: number, observation: Float64Array): number => {
    const at = t * WIDTH + UPDATE + i * UPDATE_WIDTH;
    const variance = varianceOf(i, t, observation);
    const own = covariance[2 * i];
    const both = covariance[1];
    const offset = season ? season[i * SEASON_MONTHS + (t % SEASON_MONTHS)] : 0;
    const innovation = counts[i][t] - offset - mean[i];
    const total = own + variance;
    kept[at] = covariance[0];
    kept[at + 1] = both;
    kept[at + 2] = covariance[2];
    kept[at + 3] = innovation;
    kept[at + 4] = total;
    mean[i] += (own / total) * innovation;
    mean[1 - i] += (both / total) * innovation;
    covariance[2 * i] = (own * variance) / total;
    covariance[1] = (both * variance) / total;
    covariance[2 - 2 * i] -= (both * both) / total;
    return -0.5 * (Math.log(total) + (innovation * innovation) / total);
  };

  /** Prediction from month t to the next; false where the path cannot be followed. */
  const predict = (t: number, process: Float64Array): boolean => {
    const at = t * WIDTH;
    const has1 = t >= entry1;
    const has2 = t >= entry2;
    const x = has1 ? Math.exp(mean[0] - logK1) : 0;
    const y = has2 ? Math.exp(mean[1] - logK2) : 0;
    state[0] = x;
    state[1] = y;
    if (!flow.advance(t)) return false;
    const nextX = state[0];
    const nextY = state[1];
    if ((has1 && !(nextX > 0)) || (has2 && !(nextY > 0))) return false;
    tangent[8] = x;
    tangent[9] = 0;
    tangent[10] = 0;
    tangent[11] = y;
    flow.pushForward(t, 4);
    const f11 = has1 ? tangent[8] / nextX : 0;
    const f12 = has1 ? tangent[10] / nextX : 0;
    const f21 = has2 ? tangent[9] / nextY : 0;
    const f22 = has2 ? tangent[11] / nextY : 0;
    const { jacobians } = history;
    jacobians[4 * t] = f11;
    jacobians[4 * t + 1] = f12;
    jacobians[4 * t + 2] = f21;
    jacobians[4 * t + 3] = f22;
    kept[at] = x;
    kept[at + 1] = y;
    kept[at + 2] = nextX;
    kept[at + 3] = nextY;
    if (has1) mean[0] = logK1 + Math.log(nextX);
    if (has2) mean[1] = logK2 + Math.log(nextY);
    const p11 = covariance[0];
    const p12 = covariance[1];
    const p22 = covariance[2];
    covariance[0] = f11 * f11 * p11 + 2 * f11 * f12 * p12 + f12 * f12 * p22 + (has1 ? process[0] : 0);
    covariance[1] = f11 * f21 * p11 + (f11 * f22 + f12 * f21) * p12 + f12 * f22 * p22;
    covariance[2] = f21 * f21 * p11 + 2 * f21 * f22 * p12 + f22 * f22 * p22 + (has2 ? process[1] : 0);
    return true;
  };

  const keepState = (at: number) => {
    const { states } = history;
    states[at] = mean[0];
    states[at + 1] = mean[1];
    states[at + 2] = covariance[0];
    states[at + 3] = covariance[1];
    states[at + 4] = covariance[2];
  };

  const run = (input: FilterInput): number => {
    const { theta, after, breakMonth, observation, process } = input;
    season = input.season;
    takeSegment(theta);
    covariance.fill(0);
    mean.fill(0);
    let value = 0;
    for (let t = 0; t < months; t++) {
      if (after && t === breakMonth) takeSegment(after);
      enter(t, theta);
      keepState(t * STATE_WIDTH + 5);
      if (!Number.isNaN(counts[0][t])) value += update(0, t, observation);
      if (!Number.isNaN(counts[1][t])) value += update(1, t, observation);
      keepState(t * STATE_WIDTH);
      if (t < months - 1 && !predict(t, process)) return Number.NEGATIVE_INFINITY;
    }
    return orImpossible(value);
  };

  /** Reverse of `update`. */
  const pullUpdate = (i: number, t: number, observation: Float64Array, gradient: FilterGradient): void => {
    const at = t * WIDTH + UPDATE + i * UPDATE_WIDTH;
    const variance = varianceOf(i, t, observation);
    const own = kept[at + 2 * i];
    const both = kept[at + 1];
    const innovation = kept[at + 3];
    const inverse = 1 / kept[at + 4];
    const byOwn = pull[2 * i];
    const byBoth = pull[1];
    const byOther = pull[2 - 2 * i];
    const gains = own * pullMean[i] + both * pullMean[1 - i];
    const shrinks = own * byOwn + both * byBoth;
    const byTotal =
      -0.5 * inverse +
      (0.5 * innovation * innovation - gains * innovation - variance * shrinks + both * both * byOther) *
        inverse *
        inverse;
    gradient.observation[i] += (shrinks * inverse + byTotal) * (variance / observation[i]);
    gradient.season[i * SEASON_MONTHS + (t % SEASON_MONTHS)] += (innovation - gains) * inverse;
    pull[2 * i] = (pullMean[i] * innovation + byOwn * variance) * inverse + byTotal;
    pull[1] = (pullMean[1 - i] * innovation + byBoth * variance - 2 * both * byOther) * inverse;
    pullMean[i] += (innovation - gains) * inverse;
  };

  /** Reverse of `predict`, F held fixed; the slopes of K go to the gradient of the segment. */
  const pullPredict = (t: number, gradient: FilterGradient, segment: Float64Array): void => {
    const at = t * WIDTH;
    const has1 = t >= entry1;
    const has2 = t >= entry2;
    const { jacobians } = history;
    const f11 = jacobians[4 * t];
    const f12 = jacobians[4 * t + 1];
    const f21 = jacobians[4 * t + 2];
    const f22 = jacobians[4 * t + 3];
    const l11 = pull[0];
    const l12 = pull[1];
    const l22 = pull[2];
    if (has1) gradient.process[0] += l11;
    if (has2) gradient.process[1] += l22;
    pull[0] = f11 * f11 * l11 + f11 * f21 * l12 + f21 * f21 * l22;
    pull[1] = 2 * f11 * f12 * l11 + (f11 * f22 + f12 * f21) * l12 + 2 * f21 * f22 * l22;
    pull[2] = f12 * f12 * l11 + f12 * f22 * l12 + f22 * f22 * l22;
    adjoint[0] = has1 ? pullMean[0] / kept[at + 2] : 0;
    adjoint[1] = has2 ? pullMean[1] / kept[at + 3] : 0;
    flow.pullBack(t);
    const before1 = adjoint[0] * kept[at];
    const before2 = adjoint[1] * kept[at + 1];
    if (has1) segment[2] += pullMean[0] - before1;
    if (has2) segment[3] += pullMean[1] - before2;
    pullMean[0] = before1;
    pullMean[1] = before2;
  };

  /** Reverse of `enter`. */
  const leave = (t: number, gradient: FilterGradient) => {
    if (t === entry1) {
      gradient.theta[6] += pullMean[0];
      pullMean[0] = 0;
      pull[0] = 0;
      pull[1] = 0;
    }
    if (t === entry2) {
      gradient.theta[7] += pullMean[1];
      pullMean[1] = 0;
      pull[2] = 0;
      pull[1] = 0;
    }
  };

  /** Moves what the flow has gathered into the gradient of the segment. */
  const collect = (segment: Float64Array) => {
    segment[0] += flow.gradient[0];
    segment[1] += flow.gradient[1];
    segment[4] += flow.gradient[2];
    segment[5] += flow.gradient[3];
    flow.clearGradient();
  };

  const sweepBack = (input: FilterInput, gradient: FilterGradient): void => {
    const { theta, after, breakMonth, observation } = input;
    flow.clearGradient();
    pullMean.fill(0);
    pull.fill(0);
    let segment = after ? gradient.after : gradient.theta;
    for (let t = months - 1; t >= 0; t--) {
      if (after && t === breakMonth - 1) {
        collect(segment);
        segment = gradient.theta;
        takeSegment(theta);
      }
      if (t < months - 1) pullPredict(t, gradient, segment);
      if (!Number.isNaN(counts[1][t])) pullUpdate(1, t, observation, gradient);
      if (!Number.isNaN(counts[0][t])) pullUpdate(0, t, observation, gradient);
      leave(t, gradient);
    }
    collect(segment);
  };

  return { mean, covariance, history, flags, run, sweepBack };
}

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
