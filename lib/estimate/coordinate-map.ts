/**
 * Working coordinates u in which the posterior is close to a standard shape, so that a sampler with one fixed metric moves well.
 *
 * Growth per user is linear in the crowding form, r_i - b_ii N_i - b_ij N_j, so monthly counts pin down linear combinations of
 * (r, b_ii, b_ij): in those the likelihood is nearly normal, while in logarithms the same posterior is a set of bent, sharp ridges.
 * Near b = 0, where the logarithm has a prior and the data say little, the logarithm is the better scale. And all of it is as wide as the
 * errors are large. Hence, with the six log parameters of each segment replaced by b12, b21, b11, b22, r1, r2 (in that order, in the same
 * places) and the coordinates of the error model taken first:
 *
 *   v_j = value_j / unit_j = softplus(s_j)   for those six (linear when large, exponential when small)
 *   v_j = q_j = s_j                          for the rest
 *   s_j = middle_j + e^(lean_j . w) u_j + sum_{k before j} slope_jk v_k       a triangular map (Knothe-Rosenblatt)
 *   w_e = 2 tanh(z_e / 2),  z_e the standardised error coordinate e; lean = 0 for the error coordinates themselves
 *
 * The density gains the log Jacobian sum_j ln |d ln v_j / d s_j| of the six and sum_j lean_j . w; the map from logarithms of
 * (r, K, alpha, beta) to those of (b, r) has determinant +-1.
 */
import { fillLogValues, markBent } from './crowding-values';
import type { Posterior } from './posterior';

export interface WorkingCoordinates {
  readonly dimension: number;
  /** Log density in u, Jacobian included, and its gradient (overwritten) unless null. */
  logDensity(u: Float64Array, gradient: Float64Array | null): number;
  toParameters(u: Float64Array, q: Float64Array): void;
  fromParameters(q: Float64Array, u: Float64Array): void;
}

/** What coordinates are made for. */
export type Target = Pick<Posterior, 'logDensity' | 'segments' | 'errors'>;

/** How wide each coordinate is for given errors: the fields of the map above. */
export interface Width {
  middles: Float64Array;
  /** n x errors, row-major. */
  leans: Float64Array;
  centres: Float64Array;
  spreads: Float64Array;
}

/** The triangular map; slopes in the order of `order`, n x n row-major. */
export interface CoordinateMap {
  order: Int32Array;
  logUnits: Float64Array;
  slopes: Float64Array;
  /** null: as wide everywhere. */
  width: Width | null;
}

/** The map as coordinates of a density. */
export function bendCoordinates(target: Target, map: CoordinateMap): WorkingCoordinates {
  const { logDensity: density, segments, errors } = target;
  const { order, logUnits, slopes, width } = map;
  const n = order.length;
  const isBent = markBent(segments, n);
  const q = new Float64Array(n);
  const gradientQ = new Float64Array(n);
  /** v and what is pulled back to it, in the order of `order`. */
  const v = new Float64Array(n);
  const pull = new Float64Array(n);
  const logValues = new Float64Array(n);
  const byLog = new Float64Array(n);
  const bend = new Float64Array(n);
  const bendSlope = new Float64Array(n);
  const errorCount = errors.length;
  const weights = new Float64Array(errorCount);
  const byWeight = new Float64Array(errorCount);
  const scales = new Float64Array(n).fill(1);
  const shifts = new Float64Array(n);

  /** Sets the weight of error e from its value, and later the scale of every other coordinate. */
  const setWeight = (e: number) => {
    const { centres, spreads } = width!;
    weights[e] = 2 * Math.tanh((v[e] - centres[e]) / spreads[e] / 2);
  };
  /** @returns lean . w of a coordinate */
  const setScale = (j: number): number => {
    const { leans } = width!;
    let exponent = 0;
    for (let e = 0; e < errorCount; e++) exponent += leans[j * errorCount + e] * weights[e];
    scales[j] = Math.exp(exponent);
    return exponent;
  };

  /** Fills v, q, bends and scales; returns the log Jacobian. */
  const unfold = (u: Float64Array): number => {
    let logJacobian = 0;
    let product = 1;
    for (let p = 0; p < n; p++) {
      const j = order[p];
      let s = u[j];
      if (width && p >= errorCount) {
        logJacobian += setScale(j);
        s = width.middles[j] + scales[j] * s;
        shifts[j] = scales[j] * u[j];
      }
      const row = p * n;
      for (let k = 0; k < p; k++) s += slopes[row + k] * v[k];
      if (isBent[j] === 0) {
        v[p] = s;
        q[j] = s;
        if (width && p < errorCount) setWeight(p);
        continue;
      }
      const tail = Math.exp(-Math.abs(s));
      const value = Math.max(s, 0) + Math.log1p(tail);
      const sigmoid = s > 0 ? 1 / (1 + tail) : tail / (1 + tail);
      v[p] = value;
      bend[j] = sigmoid;
      bendSlope[j] = sigmoid / value;
      logValues[j] = logUnits[j] + Math.log(value);
      product *= bendSlope[j];
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
    return logJacobian + Math.log(product);
  };

  /** Chain rule backwards through the logarithms, the bends, the widths and the triangle. */
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
    byWeight.fill(0);
    for (let p = n - 1; p >= 0; p--) {
      const j = order[p];
      if (width && p < errorCount)
        pull[p] += (byWeight[p] * (1 - 0.25 * weights[p] * weights[p])) / width.spreads[p];
      const slope =
        isBent[j] === 0
          ? pull[p] + gradientQ[j]
          : pull[p] * bend[j] + (byLog[j] - 1) * bendSlope[j] + 1 - bend[j];
      gradient[j] = slope * scales[j];
      if (width && p >= errorCount) {
        const byExponent = slope * shifts[j] + 1;
        const at = j * errorCount;
        for (let e = 0; e < errorCount; e++) byWeight[e] += width.leans[at + e] * byExponent;
      }
      const row = p * n;
      for (let k = 0; k < p; k++) pull[k] += slope * slopes[row + k];
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
      for (let p = 0; p < n; p++) {
        const j = order[p];
        v[p] = isBent[j] === 1 ? Math.exp(logValues[j] - logUnits[j]) : from[j];
        let s = isBent[j] === 1 ? inverseSoftplus(v[p]) : v[p];
        for (let k = 0; k < p; k++) s -= slopes[p * n + k] * v[k];
        if (width && p < errorCount) setWeight(p);
        if (width && p >= errorCount) {
          setScale(j);
          s = (s - width.middles[j]) / scales[j];
        }
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

/** Error coordinates first, then the others as they come. */
export function orderCoordinates({ errors }: Target, n: number): Int32Array {
  const others = Array.from({ length: n }, (_, j) => j).filter((j) => !errors.includes(j));
  return Int32Array.from([...errors, ...others]);
}

/** Rows and columns of a square matrix in another order. */
export function reorder(matrix: Float64Array, order: Int32Array): Float64Array {
  const n = order.length;
  const out = new Float64Array(n * n);
  for (let p = 0; p < n; p++) for (let k = 0; k < n; k++) out[p * n + k] = matrix[order[p] * n + order[k]];
  return out;
}

/** Coefficients of the regression of each coordinate on all before it, from the factor L of a covariance: slopes = I - D L^-1. */
export function regressionSlopes(lower: Float64Array | null, n: number): Float64Array {
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
