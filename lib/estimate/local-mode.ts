/**
 * A mode of a posterior with the shape around it: climbed to in working coordinates, with the evidence of its model by Laplace's method,
 *
 *   ln Z = ln density(u*) + (n/2) ln 2 pi - (1/2) ln |H|,   H minus the Hessian at u*      (Tierney & Kadane 1986)
 *
 * Good because the working coordinates make the posterior nearly normal; checked against sampling in the tests.
 */
import { climb, negativeHessian, roughNegativeHessian } from '../numeric/bfgs';
import { choleskyOrNull, invertFromCholesky } from '../numeric/cholesky';
import type { WorkingCoordinates } from './coordinate-map';
import { createWorkingCoordinates } from './coordinates';
import { PARAMETERS } from './parameters';
import type { Posterior } from './posterior';

export interface LocalMode {
  coordinates: WorkingCoordinates;
  /** The mode in working coordinates and in the posterior's own. */
  u: Float64Array;
  q: Float64Array;
  /** Log density of q at the mode: comparable between climbs that ended in different coordinates. */
  density: number;
  logEvidence: number;
  /** Lower factor of the covariance of u near the mode, row-major. */
  metric: Float64Array;
  /** Covariance of q there, row-major; null when the curvature is of no use. */
  findCovariance(): Float64Array | null;
  /** The month of the break that it belongs to; null without one. */
  breakMonth: number | null;
}

/** Largest first spread of a working coordinate: beyond it the posterior is as flat as its prior. */
const MAX_SPREAD = 1.5;
/** Largest sd of a metric in any coordinate: a Hessian that is nearly flat at the mode says little about the tails. */
const MAX_METRIC_SD = 2.5;
/** Curvature added to a Hessian that is not positive definite, per round, in units of the spread; rounds before giving up on it. */
const RIDGE = 0.05;
const MAX_RIDGES = 30;

/** Rounds of climbing with coordinates fitted anew to what the round before found. */
const MAX_ROUNDS = 4;
/** The covariance that coordinates were fitted to holds when no spread turns out to be off by more than this factor. */
const SETTLED = 2.5;

/**
 * Climbs from q. `fitInformation`: J'J of the point fit over the log parameters (prior rows included), 8 x 8.
 * @returns null where the density does not exist at the start
 */
export function findLocalMode(
  posterior: Posterior,
  q: Float64Array,
  fitInformation: Float64Array,
  maxRounds: number = MAX_ROUNDS,
): LocalMode | null {
  return climbInRounds(posterior, q, roughCovariance(posterior, q, fitInformation), maxRounds);
}

/** Climbs from a mode that was found under nearly the same posterior: its shape is at hand. */
export function followMode(posterior: Posterior, near: LocalMode, maxRounds: number): LocalMode | null {
  return climbInRounds(posterior, near.q, near.findCovariance(), maxRounds);
}

function climbInRounds(
  posterior: Posterior,
  q: Float64Array,
  firstCovariance: Float64Array | null,
  maxRounds: number,
): LocalMode | null {
  let covariance = firstCovariance;
  if (!covariance || !(posterior.logDensity(q, null) > Number.NEGATIVE_INFINITY)) return null;
  let best: LocalMode | null = null;
  for (let round = 0; round < maxRounds; round++) {
    const rise: Rise | null = climbFrom(posterior, best?.q ?? q, covariance);
    if (!rise) break;
    best = rise.mode;
    if (rise.isSettled || round === maxRounds - 1) break;
    covariance = best.findCovariance();
    if (!covariance) break;
  }
  return best;
}

/**
 * The log evidence as the slope and curvature at q itself promise it: that of a normal posterior whose top is one Newton step away,
 *
 *   ln Z = ln density(u) + g' H^-1 g / 2 + (n/2) ln 2 pi - (1/2) ln |H|
 *
 * A tenth of the work of a climb; enough to tell whether a model is worth one. @returns -Infinity where there is none
 */
export function estimateEvidence(
  posterior: Posterior,
  q: Float64Array,
  fitInformation: Float64Array,
): number {
  const n = posterior.dimension;
  const covariance = roughCovariance(posterior, q, fitInformation);
  if (!covariance) return Number.NEGATIVE_INFINITY;
  const { coordinates, spread } = createWorkingCoordinates(posterior, { q, covariance });
  const scale = spread.map((sd) => Math.min(sd, MAX_SPREAD));
  const u = new Float64Array(n);
  coordinates.fromParameters(q, u);
  const slope = new Float64Array(n);
  const value = coordinates.logDensity(u, slope);
  if (!(value > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
  const lower = factorWithRidge(roughNegativeHessian(coordinates.logDensity, u, slope, scale), scale);
  if (!lower) return Number.NEGATIVE_INFINITY;
  let promise = 0;
  let logDeterminant = 0;
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) slope[i] -= lower[i * n + k] * slope[k];
    slope[i] /= lower[i * (n + 1)];
    promise += slope[i] ** 2 / 2;
    logDeterminant += Math.log(lower[i * (n + 1)]);
  }
  return value + promise + (n / 2) * Math.log(2 * Math.PI) - logDeterminant;
}

interface Rise {
  mode: LocalMode;
  isSettled: boolean;
}

function climbFrom(posterior: Posterior, q: Float64Array, anchorCovariance: Float64Array): Rise | null {
  const n = posterior.dimension;
  const { coordinates, spread } = createWorkingCoordinates(posterior, {
    q,
    covariance: anchorCovariance,
  });
  const scale = spread.map((sd) => Math.min(sd, MAX_SPREAD));
  const start = new Float64Array(n);
  coordinates.fromParameters(q, start);
  if (!(coordinates.logDensity(start, null) > Number.NEGATIVE_INFINITY)) return null;
  const { point, value, hasEnded } = climb(coordinates.logDensity, start, scale);
  const lower = factorCurvature(coordinates, point, scale);
  let logDeterminant = 0;
  for (let j = 0; lower && j < n; j++) logDeterminant += Math.log(lower[j * (n + 1)]);
  const at = new Float64Array(n);
  coordinates.toParameters(point, at);
  const metric = toMetric(lower, scale);
  const sds = rowNorms(metric, n);
  return {
    mode: {
      coordinates,
      u: point,
      q: at,
      density: posterior.logDensity(at, null),
      logEvidence: lower
        ? value + (n / 2) * Math.log(2 * Math.PI) - logDeterminant
        : Number.NEGATIVE_INFINITY,
      metric,
      findCovariance: () => lower && covarianceOfParameters(coordinates, point, metric, sds),
      breakMonth: posterior.breakMonth,
    },
    isSettled: hasEnded && sds.every((sd, j) => sd < SETTLED * scale[j] && scale[j] < SETTLED * sd),
  };
}

/** Share of the spread over which the map to q is differenced. */
const DIFFERENCE = 1e-4;

/** J M M' J' with J = d q / d u at the point (central differences of a map that costs next to nothing) and M the metric. */
function covarianceOfParameters(
  coordinates: WorkingCoordinates,
  point: Float64Array,
  metric: Float64Array,
  sds: Float64Array,
): Float64Array {
  const n = point.length;
  const shifted = point.slice();
  const above = new Float64Array(n);
  const below = new Float64Array(n);
  const columns: Float64Array[] = [];
  for (let j = 0; j < n; j++) {
    shifted[j] = point[j] + DIFFERENCE * sds[j];
    coordinates.toParameters(shifted, above);
    shifted[j] = point[j] - DIFFERENCE * sds[j];
    coordinates.toParameters(shifted, below);
    shifted[j] = point[j];
    columns.push(above.map((value, i) => (value - below[i]) / (2 * DIFFERENCE * sds[j])));
  }
  const factor = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++)
      for (let j = k; j < n; j++) factor[i * n + k] += columns[j][i] * metric[j * n + k];
  }
  const covariance = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++)
      for (let k = 0; k < n; k++) covariance[i * n + j] += factor[i * n + k] * factor[j * n + k];
  }
  return covariance;
}

/** Euclidean norm of each row of a square matrix. */
function rowNorms(matrix: Float64Array, n: number): Float64Array {
  return Float64Array.from({ length: n }, (_, i) => Math.hypot(...matrix.subarray(i * n, (i + 1) * n)));
}

function roughCovariance(
  posterior: Posterior,
  q: Float64Array,
  fitInformation: Float64Array,
): Float64Array | null {
  const n = posterior.dimension;
  const p = PARAMETERS.length;
  const information = new Float64Array(n * n);
  for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) information[i * n + j] = fitInformation[i * p + j];
  posterior.addInformation(q, information);
  const lower = choleskyOrNull(information, n);
  return lower && invertFromCholesky(lower, n);
}

/** A spread that is wrong by more than this factor makes the differences of the gradient too coarse or too fine. */
const MISJUDGED = 3;

/** Lower factor of minus the Hessian at a mode; differences are taken anew when the spread turns out to be far off. */
function factorCurvature(
  coordinates: WorkingCoordinates,
  point: Float64Array,
  scale: Float64Array,
): Float64Array | null {
  const n = point.length;
  const hessian = negativeHessian(coordinates.logDensity, point, scale);
  const better = scale.map((sd, j) => {
    const curvature = hessian[j * (n + 1)];
    return curvature > 0 ? Math.min(1 / Math.sqrt(curvature), MAX_SPREAD) : sd;
  });
  const isMisjudged = better.some((sd, j) => sd > MISJUDGED * scale[j] || scale[j] > MISJUDGED * sd);
  return factorWithRidge(
    isMisjudged ? negativeHessian(coordinates.logDensity, point, better) : hessian,
    better,
  );
}

function factorWithRidge(hessian: Float64Array, scale: Float64Array): Float64Array | null {
  const n = scale.length;
  for (let round = 0; round <= MAX_RIDGES; round++) {
    const lower = choleskyOrNull(hessian, n);
    if (lower) return lower;
    for (let j = 0; j < n; j++) hessian[j * (n + 1)] += (RIDGE * (round + 1)) / scale[j] ** 2;
  }
  return null;
}

function toMetric(lower: Float64Array | null, scale: Float64Array): Float64Array {
  const n = scale.length;
  const metric = lower && choleskyOrNull(invertFromCholesky(lower, n), n);
  if (!metric) {
    const diagonal = new Float64Array(n * n);
    scale.forEach((sd, j) => {
      diagonal[j * (n + 1)] = sd;
    });
    return diagonal;
  }
  rowNorms(metric, n).forEach((sd, j) => {
    const shrink = MAX_METRIC_SD / sd;
    if (shrink < 1) for (let k = 0; k <= j; k++) metric[j * n + k] *= shrink;
  });
  return metric;
}
