/**
 * Where the fits begin: log parameters (8) from three sources.
 *
 *   gradient matching  growth per user of each month, ln N(t+1) - ln N(t), regressed on the interval means of both counts:
 *                      r_i - b_ii N_i - b_ij N_j; biased by about 1 % on exact paths
 *   Leslie (1958)      N_i(t)/N_i(t+1) = (1 + b N_i + c N_j) / L, L = e^r, b = (L-1)/K: linear in 1/L, b/L, c/L
 *   Latin hypercube    one draw per stratum of each prior (McKay, Beckman & Conover 1979)
 */
import { normalQuantile } from '../numeric/normal';
import type { RandomStream } from '../numeric/random';
import type { FirmObservations, Observations } from './observations';
import { INDEX, PARAMETERS } from './parameters';
import type { Priors } from './priors';

export interface Start {
  origin: 'gradient-matching' | 'leslie' | 'latin-hypercube';
  theta: Float64Array;
}

/** A start stays within so many prior sd of the prior mean: a regression on noise can land anywhere. */
const MAX_PRIOR_SDS = 2.5;

/** Weight of the ridge that keeps the regressions solvable, as a share of the mean square of each column. */
const RIDGE = 1e-8;

/** Both regressions where the data allow them, then `hypercube` draws. */
export function createStarts(
  observations: Observations,
  priors: Priors,
  hypercube: number,
  stream: RandomStream,
): Start[] {
  const starts: Start[] = [];
  for (const origin of ['gradient-matching', 'leslie'] as const) {
    const rows = observations.firms.map((_, i) => regressGrowth(observations, i, origin));
    if (rows[0] && rows[1]) starts.push({ origin, theta: toTheta(rows[0], rows[1], observations, priors) });
  }
  for (const theta of latinHypercube(priors, hypercube, stream))
    starts.push({ origin: 'latin-hypercube', theta });
  return starts;
}

/** r, b_own, b_other of one firm. */
type CrowdingRow = readonly [number, number, number];

function regressGrowth(
  observations: Observations,
  firm: number,
  origin: Start['origin'],
): CrowdingRow | null {
  const own = countsByMonth(observations.firms[firm], observations.months);
  const other = countsByMonth(observations.firms[1 - firm], observations.months);
  const otherEntry = observations.firms[1 - firm].entry;
  const normal = new Float64Array(9);
  const right = new Float64Array(3);
  let pairs = 0;
  for (let t = 0; t + 1 < observations.months; t++) {
    const otherNow = t < otherEntry ? 0 : other[t];
    const otherNext = t + 1 < otherEntry ? 0 : other[t + 1];
    if (!(own[t] > 0 && own[t + 1] > 0 && otherNow >= 0 && otherNext >= 0)) continue;
    const isLeslie = origin === 'leslie';
    const row = isLeslie
      ? [1, own[t], otherNow]
      : [1, -(own[t] + own[t + 1]) / 2, -(otherNow + otherNext) / 2];
    const value = isLeslie ? own[t] / own[t + 1] : Math.log(own[t + 1] / own[t]);
    for (let a = 0; a < 3; a++) {
      right[a] += row[a] * value;
      for (let b = 0; b < 3; b++) normal[3 * a + b] += row[a] * row[b];
    }
    pairs++;
  }
  if (pairs < 3) return null;
  const solution = solveThree(normal, right);
  if (!solution) return null;
  if (origin === 'gradient-matching') return solution;
  const [inverse, b, c] = solution;
  const multiplier = 1 / inverse;
  const r = Math.log(multiplier);
  // at saturation both forms stand still: b_own K = r with K = (L - 1)/b, and b/L is what was fitted
  const scale = (r * multiplier) / (multiplier - 1);
  return [r, b * scale, c * scale];
}

function countsByMonth(firm: FirmObservations, months: number): Float64Array {
  const counts = new Float64Array(months).fill(Number.NaN);
  firm.months.forEach((month, k) => {
    counts[month] = Math.exp(firm.logCounts[k]);
  });
  return counts;
}

/** Ridge solution of a symmetric 3 x 3 system scaled to unit diagonal; null when it is not finite. */
function solveThree(normal: Float64Array, right: Float64Array): CrowdingRow | null {
  const scale = [0, 4, 8].map((i) => Math.sqrt(normal[i]) || 1);
  const a = Array.from(normal, (value, i) => value / (scale[Math.floor(i / 3)] * scale[i % 3]));
  for (const i of [0, 4, 8]) a[i] += RIDGE;
  const b = Array.from(right, (value, i) => value / scale[i]);
  for (let k = 0; k < 3; k++) {
    for (let i = k + 1; i < 3; i++) {
      const factor = a[3 * i + k] / a[3 * k + k];
      for (let j = k; j < 3; j++) a[3 * i + j] -= factor * a[3 * k + j];
      b[i] -= factor * b[k];
    }
  }
  const x = [0, 0, 0];
  for (let k = 2; k >= 0; k--) {
    let sum = b[k];
    for (let j = k + 1; j < 3; j++) sum -= a[3 * k + j] * x[j];
    x[k] = sum / a[3 * k + k];
  }
  if (!x.every(Number.isFinite)) return null;
  return [x[0] / scale[0], x[1] / scale[1], x[2] / scale[2]];
}

/** Log parameters of two regression rows; what is not positive falls to the edge of the prior. */
function toTheta(
  focal: CrowdingRow,
  rival: CrowdingRow,
  observations: Observations,
  priors: Priors,
): Float64Array {
  const theta = new Float64Array(PARAMETERS.length);
  const [r1, b11, b12] = focal;
  const [r2, b22, b21] = rival;
  const within = (id: keyof typeof INDEX, value: number) => {
    const { meanLog, sdLog } = priors.parameters[id];
    const reach = MAX_PRIOR_SDS * sdLog;
    const logValue = value > 0 ? Math.log(value) : meanLog - reach;
    theta[INDEX[id]] = Math.min(Math.max(logValue, meanLog - reach), meanLog + reach);
  };
  within('r1', r1);
  within('r2', r2);
  // no crowding seen: the saturation level is far away
  within('k1', b11 > 0 ? r1 / b11 : Number.MAX_VALUE);
  within('k2', b22 > 0 ? r2 / b22 : Number.MAX_VALUE);
  within('alpha', (b12 / Math.exp(theta[INDEX.r1])) * Math.exp(theta[INDEX.k2]));
  within('beta', (b21 / Math.exp(theta[INDEX.r2])) * Math.exp(theta[INDEX.k1]));
  theta[INDEX.n1Start] = observations.firms[0].logCounts[0];
  theta[INDEX.n2Start] = observations.firms[1].logCounts[0];
  return theta;
}

function latinHypercube(priors: Priors, count: number, stream: RandomStream): Float64Array[] {
  const points = Array.from({ length: count }, () => new Float64Array(PARAMETERS.length));
  PARAMETERS.forEach(({ id }, j) => {
    const { meanLog, sdLog } = priors.parameters[id];
    shuffledStrata(count, stream).forEach((stratum, i) => {
      points[i][j] = meanLog + sdLog * normalQuantile((stratum + stream.uniform()) / count);
    });
  });
  return points;
}

/** 0 .. count - 1 in random order (Fisher & Yates). */
function shuffledStrata(count: number, stream: RandomStream): number[] {
  const strata = Array.from({ length: count }, (_, i) => i);
  for (let i = count - 1; i > 0; i--) {
    const j = stream.integer(i + 1);
    [strata[i], strata[j]] = [strata[j], strata[i]];
  }
  return strata;
}
