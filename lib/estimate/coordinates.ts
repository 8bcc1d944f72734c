/**
 * Working coordinates u in which the posterior is close to a standard shape, so that a sampler with one fixed metric moves well.
 *
 * Growth per user is linear in the crowding form, r_i - b_ii N_i - b_ij N_j, so monthly counts pin down linear combinations of
 * (r, b_ii, b_ij): in those the likelihood is nearly normal, while in logarithms the same posterior is a set of bent, sharp ridges.
 * Near b = 0, where the logarithm has a prior and the data say little, the logarithm is the better scale. Hence, in the order
 * b12, b21, b11, b22, r1, r2, then all further coordinates:
 *
 *   v_j = value_j / unit_j = softplus(s_j)   for the first six (linear when large, exponential when small)
 *   v_j = q_j = s_j                          for the rest
 *   s_j = u_j + sum_{k<j} slope_jk v_k       a triangular map (Knothe-Rosenblatt) that takes the linear correlations out
 *
 * The density gains the log Jacobian sum_j ln |d ln v_j / d s_j| of the first six; the triangle and the map from logarithms of
 * (r, K, alpha, beta) to those of (b, r) have determinant +-1.
 */

import { choleskyOrNull } from '../numeric/cholesky';

/** Coordinates with a softplus. */
const BENT = 6;

export interface WorkingCoordinates {
  readonly dimension: number;
  /** Log density in u, Jacobian included, and its gradient (overwritten) unless null. */
  logDensity(u: Float64Array, gradient: Float64Array | null): number;
  toParameters(u: Float64Array, q: Float64Array): void;
  fromParameters(q: Float64Array, u: Float64Array): void;
  /** The scaled values v of q, in the order of u. */
  toValues(q: Float64Array, v: Float64Array): void;
  /** Sets the slopes so that u is uncorrelated to first order under this covariance of v (row-major). */
  decorrelate(covariance: Float64Array): void;
}

/** Logarithms of b12, b21, b11, b22, r1, r2 from the log parameters: b_ii = r_i/K_i, b12 = alpha r1/K2, b21 = beta r2/K1. */
function fillLogValues(q: ArrayLike<number>, out: Float64Array): void {
  out[0] = q[4] + q[0] - q[3];
  out[1] = q[5] + q[1] - q[2];
  out[2] = q[0] - q[2];
  out[3] = q[1] - q[3];
  out[4] = q[0];
  out[5] = q[1];
}

/** Rows of the linear map of `fillLogValues`, over the first six log parameters. */
const LOG_VALUE_ROWS = [
  [1, 0, 0, -1, 1, 0],
  [0, 1, -1, 0, 0, 1],
  [1, 0, -1, 0, 0, 0],
  [0, 1, 0, -1, 0, 0],
  [1, 0, 0, 0, 0, 0],
  [0, 1, 0, 0, 0, 0],
] as const;

/**
 * Covariance of v at q from a covariance of q (both row-major): first order, v_j = exp(log value_j) / unit_j.
 */
export function toValueCovariance(
  q: Float64Array,
  covariance: Float64Array,
  units: Float64Array,
): Float64Array {
  const n = q.length;
  const logValues = new Float64Array(BENT);
  fillLogValues(q, logValues);
  const jacobian = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    if (j >= BENT) jacobian[j * n + j] = 1;
    else
      for (let k = 0; k < BENT; k++)
        jacobian[j * n + k] = (LOG_VALUE_ROWS[j][k] * Math.exp(logValues[j])) / units[j];
  }
  return sandwich(jacobian, covariance, n);
}

/**
 * Units of the first six values: their sd at q under a covariance of q, so that softplus is linear where the data decide; never
 * more than the value itself, so that it is logarithmic where the prior does.
 */
export function chooseUnits(q: Float64Array, covariance: Float64Array): Float64Array {
  const logValues = new Float64Array(BENT);
  fillLogValues(q, logValues);
  const ones = new Float64Array(BENT).fill(1);
  const values = toValueCovariance(q, covariance, ones);
  return logValues.map((logValue, j) => {
    const value = Math.exp(logValue);
    return Math.min(Math.sqrt(values[j * q.length + j]), value);
  });
}

export function createWorkingCoordinates(
  dimension: number,
  density: (q: Float64Array, gradient: Float64Array | null) => number,
  units: Float64Array,
): WorkingCoordinates {
  const n = dimension;
  const logUnits = units.map(Math.log);
  const slopes = new Float64Array(n * n);
  const q = new Float64Array(n);
  const gradientQ = new Float64Array(n);
  const v = new Float64Array(n);
  const logValues = new Float64Array(BENT);
  const bend = new Float64Array(BENT);
  const bendSlope = new Float64Array(BENT);
  const pull = new Float64Array(n);

  /** Fills v, q and the bends; returns the log Jacobian. */
  const unfold = (u: Float64Array): number => {
    let logJacobian = 0;
    for (let j = 0; j < n; j++) {
      let s = u[j];
      const row = j * n;
      for (let k = 0; k < j; k++) s += slopes[row + k] * v[k];
      if (j >= BENT) {
        v[j] = s;
        q[j] = s;
        continue;
      }
      const tail = Math.exp(-Math.abs(s));
      const value = Math.max(s, 0) + Math.log1p(tail);
      const sigmoid = s > 0 ? 1 / (1 + tail) : tail / (1 + tail);
      v[j] = value;
      bend[j] = sigmoid;
      bendSlope[j] = sigmoid / value;
      logValues[j] = logUnits[j] + Math.log(value);
      logJacobian += Math.log(bendSlope[j]);
    }
    q[0] = logValues[4];
    q[1] = logValues[5];
    q[2] = logValues[4] - logValues[2];
    q[3] = logValues[5] - logValues[3];
    q[4] = logValues[0] - logValues[4] + q[3];
    q[5] = logValues[1] - logValues[5] + q[2];
    return logJacobian;
  };

  const logDensity = (u: Float64Array, gradient: Float64Array | null): number => {
    const logJacobian = unfold(u);
    if (!Number.isFinite(logJacobian)) return Number.NEGATIVE_INFINITY;
    const value = density(q, gradient ? gradientQ : null);
    if (!(value > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
    if (gradient) foldGradient(gradient);
    return value + logJacobian;
  };

  /** Chain rule backwards through the logarithms, the bends and the triangle. */
  const foldGradient = (gradient: Float64Array): void => {
    const [g0, g1, g2, g3, g4, g5] = gradientQ;
    pull.fill(0);
    for (let j = n - 1; j >= 0; j--) {
      let slope = pull[j];
      if (j >= BENT) slope += gradientQ[j];
      else {
        let byLog = 0;
        if (j === 0) byLog = g4;
        else if (j === 1) byLog = g5;
        else if (j === 2) byLog = -g2 - g5;
        else if (j === 3) byLog = -g3 - g4;
        else if (j === 4) byLog = g0 + g2 - g4 + g5;
        else byLog = g1 + g3 + g4 - g5;
        slope = slope * bend[j] + (byLog - 1) * bendSlope[j] + 1 - bend[j];
      }
      gradient[j] = slope;
      const row = j * n;
      for (let k = 0; k < j; k++) pull[k] += slope * slopes[row + k];
    }
  };

  const toValues = (from: Float64Array, out: Float64Array): void => {
    fillLogValues(from, logValues);
    for (let j = 0; j < n; j++) out[j] = j < BENT ? Math.exp(logValues[j] - logUnits[j]) : from[j];
  };

  return {
    dimension,
    logDensity,
    toValues,
    toParameters(u, out) {
      unfold(u);
      out.set(q);
    },
    fromParameters(from, u) {
      toValues(from, v);
      for (let j = 0; j < n; j++) {
        let s = j < BENT ? inverseSoftplus(v[j]) : v[j];
        for (let k = 0; k < j; k++) s -= slopes[j * n + k] * v[k];
        u[j] = s;
      }
    },
    decorrelate(covariance) {
      fillRegressionSlopes(covariance, n, slopes);
    },
  };
}

/** Above this softplus(s) equals s to the last digit. */
const LINEAR_FROM = 37;

function inverseSoftplus(v: number): number {
  return v > LINEAR_FROM ? v : v + Math.log(-Math.expm1(-v));
}

/** A C A' for row-major n x n matrices. */
function sandwich(a: Float64Array, c: Float64Array, n: number): Float64Array {
  const ac = new Float64Array(n * n);
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++)
    for (let k = 0; k < n; k++) {
      if (a[i * n + k] === 0) continue;
      for (let j = 0; j < n; j++) ac[i * n + j] += a[i * n + k] * c[k * n + j];
    }
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += ac[i * n + k] * a[j * n + k];
      out[i * n + j] = sum;
    }
  return out;
}

/** Coefficients of the regression of each coordinate on all before it, from L of the covariance = L L': slopes = I - D L^-1. */
function fillRegressionSlopes(covariance: Float64Array, n: number, slopes: Float64Array): void {
  const lower = choleskyOrNull(covariance, n);
  slopes.fill(0);
  if (!lower) return;
  // row j of D L^-1 is (-slope_j0, ..., -slope_j,j-1, 1): solve it from the right
  for (let j = 1; j < n; j++) {
    for (let k = j - 1; k >= 0; k--) {
      let sum = lower[j * n + k];
      for (let m = k + 1; m < j; m++) sum -= slopes[j * n + m] * lower[m * n + k];
      slopes[j * n + k] = sum / lower[k * n + k];
    }
  }
}
