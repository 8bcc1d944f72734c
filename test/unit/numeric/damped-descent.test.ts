import { describe, expect, it } from 'vitest';
import { descend } from '@/lib/numeric/damped-descent';
import { fitLeastSquares } from '@/lib/numeric/least-squares';
import { createDecay, ROSENBROCK } from './problems';

const OPTIONS = { gradientTolerance: 1e-8, maxEvaluations: 200 };

describe('descend', () => {
  it('comes down the bent valley of Rosenbrock', () => {
    const end = descend(ROSENBROCK, [-1.2, 1], OPTIONS);
    expect(end.cost).toBeLessThan(1e-15);
    expect(end.theta[0]).toBeCloseTo(1, 7);
  });

  it('ends where the slow and careful fit ends', () => {
    const end = descend(createDecay(0.7), [0.1], OPTIONS);
    expect(end.status).toBe('gradient');
    expect(end.theta[0]).toBeCloseTo(fitLeastSquares(createDecay(0.7), [0.1]).theta[0], 6);
  });

  it('stops at its limit of evaluations and says so', () => {
    const end = descend(ROSENBROCK, [-1.2, 1], { ...OPTIONS, maxEvaluations: 3 });
    expect(end.status).toBe('iteration-limit');
    expect(end.evaluations).toBe(3);
  });

  it('says so when the start is not finite', () => {
    expect(descend(ROSENBROCK, [Number.NaN, 0], OPTIONS).status).toBe('start-not-finite');
  });

  it('never takes a step that the problem refuses', () => {
    const walled = {
      ...ROSENBROCK,
      evaluate: (theta: Float64Array, r: Float64Array, j: Float64Array | null) =>
        theta[0] < 0.5 && ROSENBROCK.evaluate(theta, r, j),
    };
    const end = descend(walled, [-1.2, 1], OPTIONS);
    expect(end.theta[0]).toBeLessThan(0.5);
    expect(end.cost).toBeLessThan(0.2);
  });
});
