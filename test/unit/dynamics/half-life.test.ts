import { describe, expect, it } from 'vitest';
import { findEquilibria } from '@/lib/dynamics/equilibria';
import { halfLifeOfReturn } from '@/lib/dynamics/half-life';
import { integrate } from '@/lib/dynamics/integrate';
import { type CompetitionSystem, fillGrowth } from '@/lib/dynamics/system';

const SYSTEM: CompetitionSystem = { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha: 0.4, beta: 0.5 };

describe('halfLifeOfReturn', () => {
  it('is ln 2 over the slowest rate of a sink', () => {
    const [, , , shared] = findEquilibria(SYSTEM);
    expect(halfLifeOfReturn(shared)).toBeCloseTo(Math.LN2 / Math.abs(shared.eigenvalues[1]), 14);
  });

  it('is null where nothing returns', () => {
    const [empty, firstAlone] = findEquilibria(SYSTEM);
    expect(halfLifeOfReturn(empty)).toBeNull();
    expect(halfLifeOfReturn(firstAlone)).toBeNull();
  });

  it('is the time in which a small late disturbance halves', () => {
    const [, , , shared] = findEquilibria(SYSTEM);
    const halfLife = halfLifeOfReturn(shared)!;
    const distanceAt = (months: number) => {
      const run = integrate(
        (_, y, out) => fillGrowth(SYSTEM, y, out),
        0,
        [shared.point[0] * 1.01, shared.point[1] * 0.99],
        months,
        { relativeTolerance: 1e-13 },
      );
      return Math.hypot(run.y[0] - shared.point[0], run.y[1] - shared.point[1]);
    };
    // After 8 half-lives the fast direction is gone and the disturbance is 2^-8 of 1 %: the nonlinear rest is below 1e-3.
    expect(distanceAt(9 * halfLife) / distanceAt(8 * halfLife)).toBeCloseTo(0.5, 3);
  });
});
