import { describe, expect, it } from 'vitest';
import type { LeastSquaresProblem } from '@/lib/numeric/least-squares-problem';
import { halfSumOfSquares } from '@/lib/numeric/linear';
import { runBursts } from '@/lib/numeric/marquardt-burst';
import { runToEnd } from '@/lib/numeric/run-to-end';
import { createDecay, LINE, ROSENBROCK } from './problems';

const OPTIONS = { bursts: 4, stepsPerBurst: 5 };

function costOf(problem: LeastSquaresProblem, theta: ArrayLike<number>): number {
  const residuals = new Float64Array(problem.residualCount);
  return problem.evaluate(Float64Array.from(theta), residuals, null)
    ? halfSumOfSquares(residuals)
    : Number.POSITIVE_INFINITY;
}

describe('runBursts', () => {
  it.each([
    ['a curved valley', ROSENBROCK, [-1.2, 1]],
    ['a line', LINE, [10, -10]],
    ['a decay', createDecay(0.7), [3]],
  ] as const)('comes down on %s and never ends above its start', (_, problem, start) => {
    const end = runToEnd(runBursts(problem, Float64Array.from(start), OPTIONS));
    expect(end.steps).toBeGreaterThan(0);
    expect(costOf(problem, end.theta)).toBeLessThan(0.2 * costOf(problem, start));
  });

  it('gives back the start when every step away from it is worse', () => {
    const wrong: LeastSquaresProblem = {
      ...LINE,
      evaluate(theta, residuals, jacobian) {
        LINE.evaluate(theta, residuals, null);
        jacobian?.set([-1, -1, -1, -2, -1, -3]);
        return true;
      },
    };
    expect(Array.from(runToEnd(runBursts(wrong, Float64Array.of(0, 0), OPTIONS)).theta)).toEqual([0, 0]);
  });

  it('survives a model that is not a number a step away', () => {
    const walled: LeastSquaresProblem = {
      parameterCount: 1,
      residualCount: 2,
      evaluate(theta, residuals, jacobian) {
        residuals[0] = Math.log(theta[0]) + 4;
        residuals[1] = 0;
        jacobian?.set([1 / theta[0], 0]);
        return Number.isFinite(residuals[0]);
      },
    };
    const end = runToEnd(runBursts(walled, Float64Array.of(5), OPTIONS));
    expect(costOf(walled, end.theta)).toBeLessThanOrEqual(costOf(walled, [5]));
  });

  it('reaches values beyond the default bounds of the package, 2^53', () => {
    const far: LeastSquaresProblem = {
      parameterCount: 1,
      residualCount: 2,
      evaluate(theta, residuals, jacobian) {
        residuals[0] = theta[0] / 1e17 - 3;
        residuals[1] = theta[0] / 1e17 - 5;
        jacobian?.set([1e-17, 1e-17]);
        return true;
      },
    };
    expect(runToEnd(runBursts(far, Float64Array.of(1e15), OPTIONS)).theta[0] / 4e17).toBeCloseTo(1, 2);
  });

  it('leaves a single residual to the polish', () => {
    const single: LeastSquaresProblem = {
      parameterCount: 1,
      residualCount: 1,
      evaluate(theta, residuals, jacobian) {
        residuals[0] = theta[0];
        jacobian?.set([1]);
        return true;
      },
    };
    expect(runToEnd(runBursts(single, Float64Array.of(3), OPTIONS))).toEqual({
      theta: Float64Array.of(3),
      steps: 0,
    });
  });
});
