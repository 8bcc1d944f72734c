/**
 * Odds of the outcomes after re-weighting draws with log likelihoods l_j: weighted shares, as long as enough draws carry them.
 *
 * Few effective draws, (sum w)^2 / sum w^2 < MIN_EFFECTIVE, are no odds. The likelihood is then taken to the power t at which that many
 * are left, and the rest of the way is gone as if prior and likelihood of z = (ln alpha, ln beta) were normal: with mean m0 and covariance P0
 * of the draws as they are, m and P after power t,
 *
 *   precision L = P0^-1 + (P^-1 - P0^-1)/t,   natural mean h = P0^-1 m0 + (P^-1 m - P0^-1 m0)/t,   z ~ N(L^-1 h, L^-1)
 *
 * and the odds are the quarters of that normal. Where L is not positive definite the odds at power t stand (they lean to "not decided").
 */
import { normalCdf, normalQuantile } from '../../numeric/normal';
import { outcomeOf } from '../odds';
import type { Odds } from '../report';

/** Effective draws below which shares of draws are too rough to judge a threshold by. */
export const MIN_EFFECTIVE = 60;
/** Halvings in the search of the power. */
const POWER_STEPS = 30;
/** Strips of equal chance in which the normal is cut along ln alpha. */
const STRIPS = 200;

export interface ReweightedOdds {
  odds: Odds;
  /** Effective draws of the full weights. */
  effective: number;
}

export interface Reweighter {
  /** @param logLikelihood log likelihood per draw; -Infinity leaves a draw out. At least one must be finite. */
  odds(logLikelihood: Float64Array): ReweightedOdds;
}

/** Mean and covariance of (ln alpha, ln beta): m1, m2, p11, p12, p22. */
type Moments = readonly [number, number, number, number, number];

export function createReweighter(alpha: Float64Array, beta: Float64Array): Reweighter {
  const z1 = alpha.map(Math.log);
  const z2 = beta.map(Math.log);
  const outcomes = Array.from(alpha, (value, i) => outcomeOf(value, beta[i]));
  const weights = new Float64Array(alpha.length);
  const before = momentsOf(z1, z2, weights.fill(1));

  const shares = (): Odds => {
    const odds: Odds = { coexistence: 0, exclusionByFocal: 0, exclusionByRival: 0, headStartDecides: 0 };
    let sum = 0;
    for (let i = 0; i < weights.length; i++) {
      odds[outcomes[i]] += weights[i];
      sum += weights[i];
    }
    for (const outcome of Object.keys(odds) as (keyof Odds)[]) odds[outcome] /= sum;
    return odds;
  };

  return {
    odds(logLikelihood) {
      const effective = fillWeights(logLikelihood, 1, weights);
      if (effective >= MIN_EFFECTIVE) return { odds: shares(), effective };
      const power = findPower(logLikelihood, weights);
      fillWeights(logLikelihood, power, weights);
      const extrapolated = extrapolate(before, momentsOf(z1, z2, weights), power);
      return { odds: extrapolated ? quartersOf(extrapolated) : shares(), effective };
    },
  };
}

/** Fills exp(power (l - max l)). @returns their effective number */
function fillWeights(logLikelihood: Float64Array, power: number, weights: Float64Array): number {
  let largest = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < logLikelihood.length; i++) largest = Math.max(largest, logLikelihood[i]);
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < weights.length; i++) {
    weights[i] = Math.exp(power * (logLikelihood[i] - largest));
    sum += weights[i];
    squares += weights[i] * weights[i];
  }
  return (sum * sum) / squares;
}

/** The largest power at which MIN_EFFECTIVE draws are left; the effective number falls as the power rises. */
function findPower(logLikelihood: Float64Array, scratch: Float64Array): number {
  let low = 0;
  let high = 1;
  for (let step = 0; step < POWER_STEPS; step++) {
    const middle = (low + high) / 2;
    if (fillWeights(logLikelihood, middle, scratch) >= MIN_EFFECTIVE) low = middle;
    else high = middle;
  }
  return low;
}

function momentsOf(z1: Float64Array, z2: Float64Array, weights: Float64Array): Moments {
  let sum = 0;
  let m1 = 0;
  let m2 = 0;
  for (let i = 0; i < weights.length; i++) {
    sum += weights[i];
    m1 += weights[i] * z1[i];
    m2 += weights[i] * z2[i];
  }
  m1 /= sum;
  m2 /= sum;
  let p11 = 0;
  let p12 = 0;
  let p22 = 0;
  for (let i = 0; i < weights.length; i++) {
    const d1 = z1[i] - m1;
    const d2 = z2[i] - m2;
    p11 += weights[i] * d1 * d1;
    p12 += weights[i] * d1 * d2;
    p22 += weights[i] * d2 * d2;
  }
  return [m1, m2, p11 / sum, p12 / sum, p22 / sum];
}

/** Moments at power 1 from those at power 0 and at `power`; null when no covariance comes out. */
function extrapolate(before: Moments, tempered: Moments, power: number): Moments | null {
  const from = toNatural(before);
  const to = toNatural(tempered);
  if (!(power > 0) || !from || !to) return null;
  const at = (k: number) => from[k] + (to[k] - from[k]) / power;
  return toNatural([at(0), at(1), at(2), at(3), at(4)]);
}

/** [m, P] to [P^-1 m, P^-1], which is its own inverse; null when the matrix is not positive definite. */
function toNatural([a, b, p11, p12, p22]: Moments): Moments | null {
  const determinant = p11 * p22 - p12 * p12;
  if (!(p11 > 0 && determinant > 0)) return null;
  const [i11, i12, i22] = [p22 / determinant, -p12 / determinant, p11 / determinant];
  return [i11 * a + i12 * b, i12 * a + i22 * b, i11, i12, i22];
}

/** Chances of the four quarters of a normal in (ln alpha, ln beta). */
function quartersOf([m1, m2, p11, p12, p22]: Moments): Odds {
  const odds: Odds = { coexistence: 0, exclusionByFocal: 0, exclusionByRival: 0, headStartDecides: 0 };
  const slope = p12 / p11;
  const rest = Math.sqrt(Math.max(p22 - slope * p12, 0));
  for (let strip = 0; strip < STRIPS; strip++) {
    const d1 = Math.sqrt(p11) * normalQuantile((strip + 0.5) / STRIPS);
    const below = normalCdf(-(m2 + slope * d1) / rest);
    const isFirstBelow = m1 + d1 < 0;
    odds[isFirstBelow ? 'coexistence' : 'exclusionByRival'] += below / STRIPS;
    odds[isFirstBelow ? 'exclusionByFocal' : 'headStartDecides'] += (1 - below) / STRIPS;
  }
  return odds;
}
