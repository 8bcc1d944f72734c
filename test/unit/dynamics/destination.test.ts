import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findDestination } from '@/lib/dynamics/destination';
import { integrate } from '@/lib/dynamics/integrate';
import { type CompetitionSystem, fillGrowth } from '@/lib/dynamics/system';
import { anyShares, anySystem, stateOf } from './arbitrary';

const RACE: CompetitionSystem = { r1: 0.3, r2: 0.15, k1: 1000, k2: 800, alpha: 1.28, beta: 1.5 };

describe('findDestination', () => {
  it('is where the path is after a very long time', () => {
    fc.assert(
      fc.property(anySystem, anyShares, (system, shares) => {
        const start = stateOf(system, shares);
        const destination = findDestination(system, start);
        fc.pre(destination !== null);
        // The slowest rate in this range of systems is 0.02 x 0.02 per month: 40 000 months are 16 of its time constants.
        const run = integrate((_, y, out) => fillGrowth(system, y, out), 0, start, 40_000, {
          relativeTolerance: 1e-7,
          absoluteTolerance: [1e-7 * system.k1, 1e-7 * system.k2],
          maxSteps: 100_000,
        });
        expect(Math.abs(run.y[0] - destination!.point[0]) / system.k1).toBeLessThan(1e-3);
        expect(Math.abs(run.y[1] - destination!.point[1]) / system.k2).toBeLessThan(1e-3);
      }),
      { numRuns: 40 },
    );
  });

  it('leaves a firm without users where it is', () => {
    expect(findDestination(RACE, [0, 0])?.place).toBe('empty');
    expect(findDestination(RACE, [5, 0])?.place).toBe('firstAlone');
    expect(findDestination(RACE, [0, 5])?.place).toBe('secondAlone');
  });

  it('depends on the start when the head start decides', () => {
    expect(findDestination(RACE, [200, 340])?.place).toBe('firstAlone');
    expect(findDestination(RACE, [200, 350])?.place).toBe('secondAlone');
  });

  it('is null on the boundary between two outcomes', () => {
    expect(findDestination({ ...RACE, alpha: 1 }, [5, 5])).toBeNull();
  });

  it('refuses negative users', () => {
    expect(() => findDestination(RACE, [-1, 5])).toThrow('state');
  });
});
