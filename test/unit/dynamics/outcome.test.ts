import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BOUNDARY_TOLERANCE, classifyOutcome } from '@/lib/dynamics/outcome';
import { type CompetitionSystem, swapFirms } from '@/lib/dynamics/system';
import { anySystem } from './arbitrary';

function systemWith(alpha: number, beta: number): CompetitionSystem {
  return { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha, beta };
}

describe('classifyOutcome', () => {
  it.each([
    [0.5, 0.7, 'coexistence'],
    [0, 0, 'coexistence'],
    [0.5, 1.7, 'exclusionByFirst'],
    [1.5, 0.7, 'exclusionBySecond'],
    [1.5, 1.7, 'headStartDecides'],
  ] as const)('alpha %d, beta %d: %s', (alpha, beta, outcome) => {
    expect(classifyOutcome(systemWith(alpha, beta))).toBe(outcome);
  });

  it.each([
    [1, 0.5],
    [1, 1.5],
    [0.5, 1],
    [1.5, 1],
    [1, 1],
    [1 + BOUNDARY_TOLERANCE / 2, 0.5],
    [0.5, 1 - BOUNDARY_TOLERANCE / 2],
  ])('says boundary, and nothing else, at alpha %d, beta %d', (alpha, beta) => {
    expect(classifyOutcome(systemWith(alpha, beta))).toBe('boundary');
  });

  it('classifies again just outside the tolerance', () => {
    expect(classifyOutcome(systemWith(1 + 2 * BOUNDARY_TOLERANCE, 0.5))).toBe('exclusionBySecond');
    expect(classifyOutcome(systemWith(1 - 2 * BOUNDARY_TOLERANCE, 0.5))).toBe('coexistence');
  });

  it('never depends on the growth rates or the saturation levels', () => {
    fc.assert(
      fc.property(anySystem, anySystem, (system, other) => {
        const changed = { ...other, alpha: system.alpha, beta: system.beta };
        expect(classifyOutcome(changed)).toBe(classifyOutcome(system));
      }),
    );
  });

  it('exchanges the winner with the firms', () => {
    const swapped = {
      coexistence: 'coexistence',
      exclusionByFirst: 'exclusionBySecond',
      exclusionBySecond: 'exclusionByFirst',
      headStartDecides: 'headStartDecides',
      boundary: 'boundary',
    } as const;
    fc.assert(
      fc.property(anySystem, (system) => {
        expect(classifyOutcome(swapFirms(system))).toBe(swapped[classifyOutcome(system)]);
      }),
    );
  });

  it('refuses a coefficient that is not a number', () => {
    expect(() => classifyOutcome(systemWith(Number.NaN, 0.5))).toThrow('system.alpha');
  });
});
