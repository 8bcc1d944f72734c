/**
 * The 27 NIST StRD nonlinear-regression sets through the project's own least-squares code, from each published start on its own.
 *
 * Source of data and certified values: `test/reference/data/README.md`.
 */
import { describe, expect, it } from 'vitest';
import { fitLeastSquares, type LeastSquaresFit } from '@/lib/numeric/least-squares';
import { isUsableTermination } from '@/lib/numeric/termination';
import { createNistProblem, type NistSet, readNistSets } from './read-nist';

/** Certified values carry 11 digits; six is far finer than any standard error of these fits. */
const PARAMETER_DIGITS = 6;
const STANDARD_ERROR_DIGITS = 4;
/** NIST prints the sum of squares to 11 digits. */
const RSS_TOLERANCE = 2e-10;
/** Its certified sum of squares, 1.4e-25, is the rounding of the data: below what doubles can reproduce, and so are its standard errors. */
const BELOW_DOUBLE_PRECISION = 'Lanczos1';
/** Central differences at 6e-6 relative: truncation and rounding both near 1e-10 of the largest column entry. */
const DIFFERENCE_STEP = 6e-6;
const DIFFERENCE_TOLERANCE = 1e-6;

const sets = readNistSets();
const starts = ['start1', 'start2'] as const;

describe('NIST StRD sets', () => {
  it('are all 27 there', () => {
    expect(sets).toHaveLength(27);
  });

  it.each(sets)('$name: the model at the certified values has the certified sum of squares', (set) => {
    const problem = createNistProblem(set);
    const residuals = new Float64Array(problem.residualCount);
    expect(problem.evaluate(certifiedValues(set), residuals, null)).toBe(true);
    const rss = residuals.reduce((sum, r) => sum + r * r, 0);
    if (set.name === BELOW_DOUBLE_PRECISION) expect(rss).toBeLessThan(1e-18);
    else expect(Math.abs(rss / set.residualSumOfSquares - 1)).toBeLessThan(RSS_TOLERANCE);
  });

  it.each(sets)('$name: the analytic gradient agrees with central differences', (set) => {
    expect(largestGradientError(set)).toBeLessThan(DIFFERENCE_TOLERANCE);
  });

  describe.each(starts)('from %s', (start) => {
    it.each(sets)('$name: certified parameters and standard errors', (set) => {
      const fit = fitFrom(set, start);
      expect(isUsableTermination(fit.status), `stopped for: ${fit.status}`).toBe(true);
      expect(digits(fit.theta, certifiedValues(set))).toBeGreaterThan(PARAMETER_DIGITS);
      if (set.name === BELOW_DOUBLE_PRECISION) return;
      expect(Math.abs((2 * fit.cost) / set.residualSumOfSquares - 1)).toBeLessThan(RSS_TOLERANCE);
      const certified = Float64Array.from(set.params, (param) => param.sd);
      expect(digits(standardErrors(fit), certified)).toBeGreaterThan(STANDARD_ERROR_DIGITS);
    });
  });
});

function fitFrom(set: NistSet, start: (typeof starts)[number]): LeastSquaresFit {
  const from = set.params.map((param) => param[start]);
  return fitLeastSquares(createNistProblem(set), from, { noise: 'estimated' });
}

function certifiedValues(set: NistSet): Float64Array {
  return Float64Array.from(set.params, (param) => param.certified);
}

function standardErrors(fit: LeastSquaresFit): Float64Array {
  const n = fit.theta.length;
  return fit.theta.map((_, j) => Math.sqrt(fit.covariance![j * n + j]));
}

/** Correct digits of the worst entry: -log10 of the relative error. */
function digits(found: Float64Array, wanted: Float64Array): number {
  return Math.min(...found.map((value, j) => -Math.log10(Math.abs(value / wanted[j] - 1))));
}

/** Largest difference between a column of the Jacobian and its central difference, relative to the largest entry of the column. */
function largestGradientError(set: NistSet): number {
  const problem = createNistProblem(set);
  const { parameterCount: n, residualCount: m } = problem;
  const theta = certifiedValues(set);
  const jacobian = new Float64Array(m * n);
  const [up, down] = [new Float64Array(m), new Float64Array(m)];
  problem.evaluate(theta, up, jacobian);
  let worst = 0;
  for (let j = 0; j < n; j++) {
    const step = DIFFERENCE_STEP * Math.abs(theta[j]);
    problem.evaluate(
      Float64Array.from(theta, (value, k) => value + (k === j ? step : 0)),
      up,
      null,
    );
    problem.evaluate(
      Float64Array.from(theta, (value, k) => value - (k === j ? step : 0)),
      down,
      null,
    );
    const column = Float64Array.from(up, (_, i) => jacobian[i * n + j]);
    const size = Math.max(...column.map(Math.abs));
    for (let i = 0; i < m; i++) {
      worst = Math.max(worst, Math.abs((up[i] - down[i]) / (2 * step) - column[i]) / size);
    }
  }
  return worst;
}
