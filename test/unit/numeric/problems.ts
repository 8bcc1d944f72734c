/** Small least-squares problems with known minima. */
import type { LeastSquaresProblem } from '@/lib/numeric/least-squares-problem';

/** y = exp(-k t) with noise-free data: minimum at the true k with zero residuals. */
export function createDecay(k: number): LeastSquaresProblem {
  const times = [0.5, 1, 2, 3, 5];
  return {
    parameterCount: 1,
    residualCount: times.length,
    evaluate(theta, residuals, jacobian) {
      times.forEach((t, i) => {
        residuals[i] = Math.exp(-theta[0] * t) - Math.exp(-k * t);
        if (jacobian) jacobian[i] = -t * Math.exp(-theta[0] * t);
      });
      return Number.isFinite(residuals.reduce((sum, r) => sum + r, 0));
    },
  };
}

/** Rosenbrock's valley as least squares, (10 (y - x^2), 1 - x): minimum 0 at (1, 1). */
export const ROSENBROCK: LeastSquaresProblem = {
  parameterCount: 2,
  residualCount: 2,
  evaluate(theta, residuals, jacobian) {
    residuals[0] = 10 * (theta[1] - theta[0] * theta[0]);
    residuals[1] = 1 - theta[0];
    jacobian?.set([-20 * theta[0], 10, -1, 0]);
    return Number.isFinite(residuals[0] + residuals[1]);
  },
};

/** A straight line through (1, 1), (2, 2), (3, 2): intercept 2/3, slope 1/2, sum of squares 1/6, all by hand. */
export const LINE: LeastSquaresProblem = {
  parameterCount: 2,
  residualCount: 3,
  evaluate(theta, residuals, jacobian) {
    [1, 2, 2].forEach((y, i) => {
      residuals[i] = theta[0] + theta[1] * (i + 1) - y;
    });
    jacobian?.set([1, 1, 1, 2, 1, 3]);
    return Number.isFinite(residuals[0]);
  },
};

/** x^2 around 3, whose derivative overflows below 4 although the value does not: no step may be taken there. */
export const BLIND_BELOW_FOUR: LeastSquaresProblem = {
  parameterCount: 1,
  residualCount: 1,
  evaluate(theta, residuals, jacobian) {
    residuals[0] = theta[0] - 3;
    jacobian?.fill(1);
    return jacobian === null || theta[0] >= 4;
  },
};
