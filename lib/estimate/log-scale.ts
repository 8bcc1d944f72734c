/**
 * A normal sample whose spread depends on covariates: x_i ~ N(middle, exp(2 (base + slopes . w_i))), by maximum likelihood with Fisher
 * scoring (Harvey 1976, Estimating regression models with multiplicative heteroscedasticity).
 */
import { choleskyOrNull, invertFromCholesky } from '../numeric/cholesky';

const ROUNDS = 4;
/** Squared standardised values above this count as this: a long tail is not a wide one. */
const LARGEST_SQUARE = 9;
/** sd of a slope before the sample is seen. */
const SLOPE_SD = 0.3;
/** Largest slope either way: widths differ by this factor in logs per sd of a covariate. */
const LARGEST_SLOPE = 0.6;
/** Independent points that a point of a Markov chain is worth. */
const WORTH = 0.3;

/** @param weights one row of covariates per value, each of them bounded */
export function fitLogScale(
  values: Float64Array,
  weights: readonly Float64Array[],
): { middle: number; slopes: Float64Array } {
  const count = weights[0].length;
  const size = count + 1;
  const middle = values.reduce((sum, value) => sum + value, 0) / values.length;
  let variance = 0;
  for (const value of values) variance += (value - middle) ** 2 / values.length;
  if (!(variance > 0)) return { middle, slopes: new Float64Array(count) };
  const parameters = new Float64Array(size);
  parameters[count] = Math.log(variance) / 2;
  const information = new Float64Array(size * size);
  const covariates = (i: number, a: number) => (a < count ? weights[i][a] : 1);
  for (let a = 0; a < size; a++) {
    for (let b = 0; b < size; b++)
      for (let i = 0; i < values.length; i++)
        information[a * size + b] += 2 * WORTH * covariates(i, a) * covariates(i, b);
    information[a * (size + 1)] += SLOPE_SD ** -2;
  }
  const lower = choleskyOrNull(information, size);
  const inverse = lower && invertFromCholesky(lower, size);
  for (let round = 0; inverse && round < ROUNDS; round++) {
    const score = new Float64Array(size);
    for (let i = 0; i < values.length; i++) {
      let logScale = 0;
      for (let a = 0; a < size; a++) logScale += parameters[a] * covariates(i, a);
      const square = Math.min(((values[i] - middle) * Math.exp(-logScale)) ** 2, LARGEST_SQUARE);
      for (let a = 0; a < size; a++) score[a] += WORTH * (square - 1) * covariates(i, a);
    }
    for (let a = 0; a < count; a++) score[a] -= parameters[a] / SLOPE_SD ** 2;
    for (let a = 0; a < size; a++)
      for (let b = 0; b < size; b++) parameters[a] += inverse[a * size + b] * score[b];
  }
  const slopes = parameters
    .subarray(0, count)
    .map((slope) => Math.min(Math.max(slope, -LARGEST_SLOPE), LARGEST_SLOPE));
  return { middle, slopes: slopes.every(Number.isFinite) ? slopes : new Float64Array(count) };
}
