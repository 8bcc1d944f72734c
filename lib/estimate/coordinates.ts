/**
 * Working coordinates u in which the posterior is close to a standard shape, so that a sampler with one fixed metric moves well.
 *
 * Growth per user is linear in the crowding form, r_i - b_ii N_i - b_ij N_j, so monthly counts pin down linear combinations of
 * (r, b_ii, b_ij): in those the likelihood is nearly normal, while in logarithms the same posterior is a set of bent, sharp ridges.
 * Near b = 0, where the logarithm has a prior and the data say little, the logarithm is the better scale. Hence, with the six log
 * parameters of each segment replaced by b12, b21, b11, b22, r1, r2 (in that order, in the same places):
 *
 *   v_j = value_j / unit_j = softplus(s_j)   for those six (linear when large, exponential when small)
 *   v_j = q_j = s_j                          for the rest
 *   s_j = u_j + sum_{k<j} slope_jk v_k       a triangular map (Knothe-Rosenblatt) that takes the linear correlations out
 *
 * The density gains the log Jacobian sum_j ln |d ln v_j / d s_j| of the six; the triangle and the map from logarithms of
 * (r, K, alpha, beta) to those of (b, r) have determinant +-1.
 */
import { choleskyOrNull } from '../numeric/cholesky';

/** Coordinates with a softplus per segment. */
const BENT = 6;

export interface WorkingCoordinates {
  readonly dimension: number;
  /** Log density in u, Jacobian included, and its gradient (overwritten) unless null. */
  logDensity(u: Float64Array, gradient: Float64Array | null): number;
  toParameters(u: Float64Array, q: Float64Array): void;
  fromParameters(q: Float64Array, u: Float64Array): void;
}

/** Where the working coordinates are made to fit: a point, and a rough covariance there (row-major, in q). */
export interface Anchor {
  q: Float64Array;
  covariance: Float64Array;
  /** Where six log parameters begin in q. */
  segments: readonly number[];
}

/**
 * Coordinates fitted to an anchor, and the spread of each there.
 * @param density log density of q with its gradient
 */
export function createWorkingCoordinates(
  density: (q: Float64Array, gradient: Float64Array | null) => number,
  anchor: Anchor,
): { coordinates: WorkingCoordinates; spread: Float64Array } {
  const { q, segments } = anchor;
  const logUnits = chooseLogUnits(anchor);
  const covariance = toValueCovariance(anchor, logUnits);
  const lower = choleskyOrNull(covariance, q.length);
  return {
    coordinates: bendCoordinates(q.length, density, segments, logUnits, regressionSlopes(lower, q.length)),
    spread: Float64Array.from(q, (_, j) => (lower ? lower[j * q.length + j] : FALLBACK_SPREAD)),
  };
}

/** Spread of a coordinate when the covariance is of no use. */
const FALLBACK_SPREAD = 0.1;

/** Logarithms of b12, b21, b11, b22, r1, r2 of the segment at `at`: b_ii = r_i/K_i, b12 = alpha r1/K2, b21 = beta r2/K1. */
function fillLogValues(q: Float64Array, at: number, out: Float64Array): void {
  out[at] = q[at + 4] + q[at] - q[at + 3];
  out[at + 1] = q[at + 5] + q[at + 1] - q[at + 2];
  out[at + 2] = q[at] - q[at + 2];
  out[at + 3] = q[at + 1] - q[at + 3];
  out[at + 4] = q[at];
  out[at + 5] = q[at + 1];
}

/** Rows of the linear map of `fillLogValues`, over the six log parameters. */
const LOG_VALUE_ROWS = [
  [1, 0, 0, -1, 1, 0],
  [0, 1, -1, 0, 0, 1],
  [1, 0, -1, 0, 0, 0],
  [0, 1, 0, -1, 0, 0],
  [1, 0, 0, 0, 0, 0],
  [0, 1, 0, 0, 0, 0],
] as const;

/** Covariance of v at the anchor, first order: v_j = exp(log value_j - log unit_j). */
function toValueCovariance({ q, covariance, segments }: Anchor, logUnits: Float64Array): Float64Array {
  const n = q.length;
  const logValues = new Float64Array(n);
  const jacobian = new Float64Array(n * n);
  for (let j = 0; j < n; j++) jacobian[j * n + j] = 1;
  for (const at of segments) {
    fillLogValues(q, at, logValues);
    for (let j = 0; j < BENT; j++) {
      const value = Math.exp(logValues[at + j] - logUnits[at + j]);
      for (let k = 0; k < BENT; k++) jacobian[(at + j) * n + at + k] = LOG_VALUE_ROWS[j][k] * value;
    }
  }
  return sandwich(jacobian, covariance, n);
}

/**
 * Log units of the bent values: their sd under the anchor's covariance, so that softplus is linear where the data decide; never
 * more than the value itself, so that it is logarithmic where the prior does. 0 elsewhere.
 */
function chooseLogUnits(anchor: Anchor): Float64Array {
  const { q, segments } = anchor;
  const logUnits = new Float64Array(q.length);
  for (const at of segments) fillLogValues(q, at, logUnits);
  // in units of the value itself the covariance of v is that of ln v
  const relative = toValueCovariance(anchor, logUnits);
  for (const at of segments) {
    for (let j = at; j < at + BENT; j++) {
      const sd = Math.sqrt(relative[j * (q.length + 1)]);
      if (sd < 1) logUnits[j] += Math.log(sd);
    }
  }
  return logUnits;
}

function bendCoordinates(
  n: number,
  density: (q: Float64Array, gradient: Float64Array | null) => number,
  segments: readonly number[],
  logUnits: Float64Array,
  slopes: Float64Array,
): WorkingCoordinates {
  const isBent = new Uint8Array(n);
  for (const at of segments) isBent.fill(1, at, at + BENT);
  const q = new Float64Array(n);
  const gradientQ = new Float64Array(n);
  const v = new Float64Array(n);
  const logValues = new Float64Array(n);
  const byLog = new Float64Array(n);
  const bend = new Float64Array(n);
  const bendSlope = new Float64Array(n);
  const pull = new Float64Array(n);

  /** Fills v, q and the bends; returns the log Jacobian. */
  const unfold = (u: Float64Array): number => {
    let logJacobian = 0;
    for (let j = 0; j < n; j++) {
      let s = u[j];
      const row = j * n;
      for (let k = 0; k < j; k++) s += slopes[row + k] * v[k];
      if (isBent[j] === 0) {
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
    for (let i = 0; i < segments.length; i++) {
      const at = segments[i];
      q[at] = logValues[at + 4];
      q[at + 1] = logValues[at + 5];
      q[at + 2] = logValues[at + 4] - logValues[at + 2];
      q[at + 3] = logValues[at + 5] - logValues[at + 3];
      q[at + 4] = logValues[at] - logValues[at + 4] + q[at + 3];
      q[at + 5] = logValues[at + 1] - logValues[at + 5] + q[at + 2];
    }
    return logJacobian;
  };

  /** Chain rule backwards through the logarithms, the bends and the triangle. */
  const foldGradient = (gradient: Float64Array): void => {
    for (let i = 0; i < segments.length; i++) {
      const at = segments[i];
      const r1 = gradientQ[at];
      const r2 = gradientQ[at + 1];
      const k1 = gradientQ[at + 2];
      const k2 = gradientQ[at + 3];
      const alpha = gradientQ[at + 4];
      const beta = gradientQ[at + 5];
      byLog[at] = alpha;
      byLog[at + 1] = beta;
      byLog[at + 2] = -k1 - beta;
      byLog[at + 3] = -k2 - alpha;
      byLog[at + 4] = r1 + k1 - alpha + beta;
      byLog[at + 5] = r2 + k2 + alpha - beta;
    }
    pull.fill(0);
    for (let j = n - 1; j >= 0; j--) {
      const slope =
        isBent[j] === 0
          ? pull[j] + gradientQ[j]
          : pull[j] * bend[j] + (byLog[j] - 1) * bendSlope[j] + 1 - bend[j];
      gradient[j] = slope;
      const row = j * n;
      for (let k = 0; k < j; k++) pull[k] += slope * slopes[row + k];
    }
  };

  const logDensity = (u: Float64Array, gradient: Float64Array | null): number => {
    const logJacobian = unfold(u);
    if (!Number.isFinite(logJacobian)) return Number.NEGATIVE_INFINITY;
    const value = density(q, gradient ? gradientQ : null);
    if (!(value > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
    if (gradient) foldGradient(gradient);
    return value + logJacobian;
  };

  return {
    dimension: n,
    logDensity,
    toParameters(u, out) {
      unfold(u);
      out.set(q);
    },
    fromParameters(from, u) {
      for (const at of segments) fillLogValues(from, at, logValues);
      for (let j = 0; j < n; j++) {
        v[j] = isBent[j] === 1 ? Math.exp(logValues[j] - logUnits[j]) : from[j];
        let s = isBent[j] === 1 ? inverseSoftplus(v[j]) : v[j];
        for (let k = 0; k < j; k++) s -= slopes[j * n + k] * v[k];
        u[j] = s;
      }
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
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      if (a[i * n + k] === 0) continue;
      for (let j = 0; j < n; j++) ac[i * n + j] += a[i * n + k] * c[k * n + j];
    }
  }
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += ac[i * n + k] * a[j * n + k];
      out[i * n + j] = sum;
    }
  }
  return out;
}

/** Coefficients of the regression of each coordinate on all before it, from the factor L of a covariance: slopes = I - D L^-1. */
function regressionSlopes(lower: Float64Array | null, n: number): Float64Array {
  const slopes = new Float64Array(n * n);
  if (!lower) return slopes;
  // row j of D L^-1 is (-slope_j0, ..., -slope_j,j-1, 1): solve it from the right
  for (let j = 1; j < n; j++) {
    for (let k = j - 1; k >= 0; k--) {
      let sum = lower[j * n + k];
      for (let m = k + 1; m < j; m++) sum -= slopes[j * n + m] * lower[m * n + k];
      slopes[j * n + k] = sum / lower[k * n + k];
    }
  }
  return slopes;
}
