/**
 * Likelihood of the process-noise model by the extended Kalman filter, with the reverse sweep for its gradient.
 *
 *   z(t+1) = Phi(z(t); theta) + w(t), w ~ N(0, diag(noise1^2, noise2^2));   ln count_i(t) = z_i(t) + v, v ~ N(0, s_i^2)
 *
 * z ln users, Phi one month of the competitive growth system. Mean through Phi, covariance through F = d Phi / d z (Jazwinski 1970;
 * Kristensen, Madsen & Jorgensen 2004); the counts of a month update one after the other; a month without a count is predicted and
 * not updated, so gaps are exact. The start of a firm is a parameter, known exactly given theta.
 */
import { createMonthFlow } from '../dynamics/month-flow';
import type { FirmObservations, Observations } from './observations';

/** Variances per firm: of one observation (ln users squared) and of one month of process noise. */
export interface FilterVariances {
  observation: Float64Array;
  process: Float64Array;
}

export interface FilterGradient {
  /** With respect to the eight log parameters. */
  theta: Float64Array;
  observation: Float64Array;
  process: Float64Array;
}

export interface KalmanFilter {
  /** Filtered state in the last month after `run`: mean of ln users, and covariance (11, 12, 22). */
  readonly mean: Float64Array;
  readonly covariance: Float64Array;
  /** Log likelihood up to a constant; -Infinity where the path cannot be followed. */
  run(theta: ArrayLike<number>, variances: FilterVariances): number;
  /**
   * Adds the gradient along the last `run`, with F held fixed: d F / d theta is left out. A Hamiltonian chain stays exact under any
   * smooth force, since the accept step uses the true density; this force costs a third of the exact one.
   */
  sweepBack(variances: FilterVariances, gradient: FilterGradient): void;
}

/** Doubles kept per month: F (4), scaled state before and after the month (4), then per firm: covariance (3), innovation, its variance. */
const WIDTH = 18;
const SCALED = 4;
const UPDATE = 8;
const UPDATE_WIDTH = 5;

export function createKalmanFilter(observations: Observations): KalmanFilter {
  const { months, firms } = observations;
  const flow = createMonthFlow(months);
  const { state, tangent, adjoint } = flow;
  const counts = firms.map((firm) => onGrid(firm, months));
  const entry1 = firms[0].entry;
  const entry2 = firms[1].entry;
  const kept = new Float64Array(months * WIDTH);
  const mean = new Float64Array(2);
  const covariance = new Float64Array(3);
  /** Adjoints of mean and covariance. */
  const pullMean = new Float64Array(2);
  const pull = new Float64Array(3);
  let logK1 = 0;
  let logK2 = 0;

  const enter = (t: number, theta: ArrayLike<number>) => {
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

  /** Update by the count of firm i; returns its log likelihood. */
  const update = (i: number, t: number, variance: number): number => {
    const at = t * WIDTH + UPDATE + i * UPDATE_WIDTH;
    const own = covariance[2 * i];
    const both = covariance[1];
    const innovation = counts[i][t] - mean[i];
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
    kept[at] = f11;
    kept[at + 1] = f12;
    kept[at + 2] = f21;
    kept[at + 3] = f22;
    kept[at + SCALED] = x;
    kept[at + SCALED + 1] = y;
    kept[at + SCALED + 2] = nextX;
    kept[at + SCALED + 3] = nextY;
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

  const run = (theta: ArrayLike<number>, { observation, process }: FilterVariances): number => {
    logK1 = theta[2];
    logK2 = theta[3];
    flow.setParameters(Math.exp(theta[0]), Math.exp(theta[1]), Math.exp(theta[4]), Math.exp(theta[5]));
    covariance.fill(0);
    let value = 0;
    for (let t = 0; t < months; t++) {
      enter(t, theta);
      if (!Number.isNaN(counts[0][t])) value += update(0, t, observation[0]);
      if (!Number.isNaN(counts[1][t])) value += update(1, t, observation[1]);
      if (t < months - 1 && !predict(t, process)) return Number.NEGATIVE_INFINITY;
    }
    return orImpossible(value);
  };

  /** Reverse of `update`. */
  const pullUpdate = (i: number, t: number, variance: number, slope: Float64Array): void => {
    const at = t * WIDTH + UPDATE + i * UPDATE_WIDTH;
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
    slope[i] += shrinks * inverse + byTotal;
    pull[2 * i] = (pullMean[i] * innovation + byOwn * variance) * inverse + byTotal;
    pull[1] = (pullMean[1 - i] * innovation + byBoth * variance - 2 * both * byOther) * inverse;
    pullMean[i] += (innovation - gains) * inverse;
  };

  /** Reverse of `predict`, F held fixed. */
  const pullPredict = (t: number, gradient: FilterGradient): void => {
    const at = t * WIDTH;
    const has1 = t >= entry1;
    const has2 = t >= entry2;
    const f11 = kept[at];
    const f12 = kept[at + 1];
    const f21 = kept[at + 2];
    const f22 = kept[at + 3];
    const l11 = pull[0];
    const l12 = pull[1];
    const l22 = pull[2];
    if (has1) gradient.process[0] += l11;
    if (has2) gradient.process[1] += l22;
    pull[0] = f11 * f11 * l11 + f11 * f21 * l12 + f21 * f21 * l22;
    pull[1] = 2 * f11 * f12 * l11 + (f11 * f22 + f12 * f21) * l12 + 2 * f21 * f22 * l22;
    pull[2] = f12 * f12 * l11 + f12 * f22 * l12 + f22 * f22 * l22;
    adjoint[0] = has1 ? pullMean[0] / kept[at + SCALED + 2] : 0;
    adjoint[1] = has2 ? pullMean[1] / kept[at + SCALED + 3] : 0;
    flow.pullBack(t);
    const before1 = adjoint[0] * kept[at + SCALED];
    const before2 = adjoint[1] * kept[at + SCALED + 1];
    if (has1) gradient.theta[2] += pullMean[0] - before1;
    if (has2) gradient.theta[3] += pullMean[1] - before2;
    pullMean[0] = before1;
    pullMean[1] = before2;
  };

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

  const sweepBack = ({ observation }: FilterVariances, gradient: FilterGradient): void => {
    flow.clearGradient();
    pullMean.fill(0);
    pull.fill(0);
    for (let t = months - 1; t >= 0; t--) {
      if (t < months - 1) pullPredict(t, gradient);
      if (!Number.isNaN(counts[1][t])) pullUpdate(1, t, observation[1], gradient.observation);
      if (!Number.isNaN(counts[0][t])) pullUpdate(0, t, observation[0], gradient.observation);
      leave(t, gradient);
    }
    gradient.theta[0] += flow.gradient[0];
    gradient.theta[1] += flow.gradient[1];
    gradient.theta[4] += flow.gradient[2];
    gradient.theta[5] += flow.gradient[3];
  };

  return { mean, covariance, run, sweepBack };
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
