import { describe, expect, it } from 'vitest';
import { DEFAULT_LEAST_SQUARES_OPTIONS, fitLeastSquares } from '@/lib/numeric/least-squares';
import type { LeastSquaresProblem } from '@/lib/numeric/least-squares-problem';
import { isUsableTermination } from '@/lib/numeric/termination';
import { BLIND_BELOW_FOUR, createDecay, LINE, ROSENBROCK } from './problems';

describe('fitLeastSquares', () => {
  it.each([0, 4])('finds the bottom of a curved valley with %d bursts', (bursts) => {
    const fit = fitLeastSquares(ROSENBROCK, [-1.2, 1], { bursts });
    expect(isUsableTermination(fit.status)).toBe(true);
    expect(fit.theta[0]).toBeCloseTo(1, 10);
    expect(fit.theta[1]).toBeCloseTo(1, 10);
  });

  it('fits a straight line as by hand, with the covariance of a known and of an estimated noise', () => {
    const known = fitLeastSquares(LINE, [0, 0], { noise: 'known' });
    const estimated = fitLeastSquares(LINE, [0, 0], { noise: 'estimated' });
    expect(known.status).toBe('gradient');
    expect(known.theta[0]).toBeCloseTo(2 / 3, 12);
    expect(known.theta[1]).toBeCloseTo(1 / 2, 12);
    expect(2 * known.cost).toBeCloseTo(1 / 6, 12);
    // (A'A)^-1 = [[14, -6], [-6, 3]]/6, and the noise variance is (1/6)/(3 - 2).
    [14 / 6, -1, -1, 1 / 2].forEach((value, i) => {
      expect(known.covariance![i]).toBeCloseTo(value, 12);
      expect(estimated.covariance![i]).toBeCloseTo(value / 6, 12);
    });
  });

  it('does not change its standard errors, in units, when a parameter is rescaled', () => {
    const scaled: LeastSquaresProblem = {
      ...LINE,
      evaluate(theta, residuals, jacobian) {
        const ok = LINE.evaluate(Float64Array.of(theta[0], theta[1] * 1e8), residuals, jacobian);
        if (jacobian) for (const i of [1, 3, 5]) jacobian[i] *= 1e8;
        return ok;
      },
    };
    const fit = fitLeastSquares(scaled, [0, 0]);
    expect(Math.sqrt(fit.covariance![3]) * 1e8).toBeCloseTo(Math.SQRT1_2, 10);
    expect(fit.gradientNorm).toBeLessThan(DEFAULT_LEAST_SQUARES_OPTIONS.gradientTolerance);
  });

  it('says zero-residual when the model passes through every value', () => {
    const fit = fitLeastSquares(createDecay(0.7), [0.1]);
    expect(['zero-residual', 'gradient']).toContain(fit.status);
    expect(fit.theta[0]).toBeCloseTo(0.7, 10);
  });

  it('starting at the minimum stays there and says converged', () => {
    const fit = fitLeastSquares(LINE, [2 / 3, 1 / 2]);
    expect(fit.status).toBe('gradient');
    expect(fit.theta[0]).toBeCloseTo(2 / 3, 14);
  });

  it('says flat-direction, not usable, when a parameter has no effect', () => {
    const flat: LeastSquaresProblem = {
      parameterCount: 3,
      residualCount: 3,
      evaluate(theta, residuals, jacobian) {
        LINE.evaluate(theta, residuals, null);
        jacobian?.set([1, 1, 0, 1, 2, 0, 1, 3, 0]);
        return true;
      },
    };
    const fit = fitLeastSquares(flat, [0, 0, 5]);
    expect(fit.status).toBe('flat-direction');
    expect(fit.theta[2]).toBe(5);
    expect(fit.covariance).toBeNull();
    expect(fit.covarianceReason).toBe('flat-direction');
    expect(fit.conditionNumber).toBe(Number.POSITIVE_INFINITY);
  });

  it('says start-not-finite and changes nothing when the start has no value', () => {
    const fit = fitLeastSquares(LINE, [Number.NaN, 0]);
    expect(fit.status).toBe('start-not-finite');
    expect(fit.cost).toBe(Number.POSITIVE_INFINITY);
    expect(fit.covarianceReason).toBe('not-converged');
    expect(fit.evaluations).toBe(1);
  });

  it('says iteration-limit and keeps the best point', () => {
    const fit = fitLeastSquares(ROSENBROCK, [-1.2, 1], { bursts: 0, maxIterations: 3 });
    expect(fit.status).toBe('iteration-limit');
    expect(fit.cost).toBeLessThan((4.4 ** 2 + 2.2 ** 2) / 2);
    expect(fit.covarianceReason).toBe('not-converged');
  });

  it('says never-moved when the derivatives point the wrong way', () => {
    const wrong: LeastSquaresProblem = {
      ...LINE,
      evaluate(theta, residuals, jacobian) {
        LINE.evaluate(theta, residuals, null);
        jacobian?.set([-1, -1, -1, -2, -1, -3]);
        return true;
      },
    };
    const fit = fitLeastSquares(wrong, [0, 0]);
    expect(fit.status).toBe('never-moved');
    expect(Array.from(fit.theta)).toEqual([0, 0]);
  });

  it('says no-degrees-of-freedom when there is nothing left to estimate the noise from', () => {
    const fit = fitLeastSquares(
      {
        parameterCount: 1,
        residualCount: 1,
        evaluate(theta, residuals, jacobian) {
          residuals[0] = theta[0] - 3;
          jacobian?.set([1]);
          return true;
        },
      },
      [0],
      { noise: 'estimated' },
    );
    expect(fit.status).toBe('zero-residual');
    expect(fit.covariance).toBeNull();
    expect(fit.covarianceReason).toBe('no-degrees-of-freedom');
  });

  it('walks around a region where the model is not finite', () => {
    const walled: LeastSquaresProblem = {
      parameterCount: 1,
      residualCount: 2,
      evaluate(theta, residuals, jacobian) {
        residuals[0] = Math.log(theta[0]) - Math.log(0.01);
        residuals[1] = 0.1 * (theta[0] - 0.01);
        jacobian?.set([1 / theta[0], 0.1]);
        return Number.isFinite(residuals[0]);
      },
    };
    // From 5 the full Gauss-Newton step goes far below zero, where the logarithm is not a number.
    const fit = fitLeastSquares(walled, [5]);
    expect(isUsableTermination(fit.status)).toBe(true);
    expect(fit.theta[0]).toBeCloseTo(0.01, 10);
  });

  it('counts every call of the model', () => {
    let calls = 0;
    const counted: LeastSquaresProblem = {
      ...ROSENBROCK,
      evaluate(theta, residuals, jacobian) {
        calls++;
        return ROSENBROCK.evaluate(theta, residuals, jacobian);
      },
    };
    expect(fitLeastSquares(counted, [-1.2, 1]).evaluations).toBe(calls);
  });

  it('gives the same digits every time', () => {
    const first = fitLeastSquares(ROSENBROCK, [-1.2, 1]);
    expect(fitLeastSquares(ROSENBROCK, [-1.2, 1]).theta).toEqual(first.theta);
  });

  it('takes no step to where the derivatives are not finite, and ends', () => {
    const fit = fitLeastSquares(BLIND_BELOW_FOUR, [9], { bursts: 0 });
    expect(fit.theta[0]).toBeGreaterThanOrEqual(4);
    expect(fit.theta[0]).toBeLessThan(4.01);
  });

  it('throws on a wrong call, naming what is wrong', () => {
    expect(() => fitLeastSquares(LINE, [0])).toThrow('start must have 2');
    expect(() => fitLeastSquares({ ...LINE, parameterCount: 0 }, [])).toThrow('parameterCount');
    expect(() => fitLeastSquares({ ...LINE, residualCount: 0 }, [0, 0])).toThrow('residualCount');
  });
});
