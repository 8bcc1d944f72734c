/**
 * Working coordinates (`coordinate-map.ts`) made to fit a point and a rough covariance there, before anything has been visited.
 */
import { choleskyOrNull } from '../numeric/cholesky';
import {
  bendCoordinates,
  orderCoordinates,
  regressionSlopes,
  reorder,
  type Target,
  type WorkingCoordinates,
} from './coordinate-map';
import { BENT, fillLogValues, LOG_VALUE_ROWS } from './crowding-values';

/** Where the working coordinates are made to fit: a point, and a rough covariance there (row-major, in q). */
export interface Anchor {
  q: Float64Array;
  covariance: Float64Array;
}

/** Coordinates fitted to an anchor, and the spread of each there. */
export function createWorkingCoordinates(
  target: Target,
  anchor: Anchor,
): { coordinates: WorkingCoordinates; spread: Float64Array } {
  const { segments } = target;
  const n = anchor.q.length;
  const order = orderCoordinates(target, n);
  const logUnits = chooseLogUnits(anchor, segments);
  const covariance = reorder(toValueCovariance(anchor, segments, logUnits), order);
  const lower = choleskyOrNull(covariance, n);
  const spread = new Float64Array(n).fill(FALLBACK_SPREAD);
  if (lower) for (let p = 0; p < n; p++) spread[order[p]] = lower[p * (n + 1)];
  const slopes = regressionSlopes(lower, n);
  return { coordinates: bendCoordinates(target, { order, logUnits, slopes, width: null }), spread };
}

/** Spread of a coordinate when the covariance is of no use. */
const FALLBACK_SPREAD = 0.1;

/** Covariance of v at the anchor, first order: v_j = exp(log value_j - log unit_j). */
function toValueCovariance(
  { q, covariance }: Anchor,
  segments: readonly number[],
  logUnits: Float64Array,
): Float64Array {
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
function chooseLogUnits(anchor: Anchor, segments: readonly number[]): Float64Array {
  const { q } = anchor;
  const logUnits = new Float64Array(q.length);
  for (const at of segments) fillLogValues(q, at, logUnits);
  // in units of the value itself the covariance of v is that of ln v
  const relative = toValueCovariance(anchor, segments, logUnits);
  for (const at of segments) {
    for (let j = at; j < at + BENT; j++) {
      const sd = Math.sqrt(relative[j * (q.length + 1)]);
      if (sd < 1) logUnits[j] += Math.log(sd);
    }
  }
  return logUnits;
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
