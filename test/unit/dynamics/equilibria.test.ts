import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Equilibrium, findEquilibria, findSharedEquilibrium } from '@/lib/dynamics/equilibria';
import { classifyOutcome } from '@/lib/dynamics/outcome';
import { type CompetitionSystem, fillGrowth, fillJacobian, swapFirms } from '@/lib/dynamics/system';
import { anySystem, coexistingSystem, headStartSystem } from './arbitrary';

/** Sums and products of a few terms of similar size. */
const ROUNDING = 1e-12;

function systemWith(alpha: number, beta: number): CompetitionSystem {
  return { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha, beta };
}

function kindsOf(system: CompetitionSystem): Record<string, string> {
  return Object.fromEntries(findEquilibria(system).map(({ place, kind }) => [place, kind]));
}

function kindFromEigenvalues({ eigenvalues: [low, high] }: Equilibrium): string {
  if (low > 0) return 'source';
  return high < 0 ? 'sink' : 'saddle';
}

describe('findEquilibria', () => {
  it.each([
    [0.5, 0.7, { empty: 'source', firstAlone: 'saddle', secondAlone: 'saddle', shared: 'sink' }],
    [0.5, 1.7, { empty: 'source', firstAlone: 'sink', secondAlone: 'saddle' }],
    [1.5, 0.7, { empty: 'source', firstAlone: 'saddle', secondAlone: 'sink' }],
    [1.5, 1.7, { empty: 'source', firstAlone: 'sink', secondAlone: 'sink', shared: 'saddle' }],
    [1, 0.7, { empty: 'source', firstAlone: 'saddle', secondAlone: 'non-hyperbolic' }],
    [1.5, 1, { empty: 'source', firstAlone: 'non-hyperbolic', secondAlone: 'sink' }],
    [1, 1, { empty: 'source', firstAlone: 'non-hyperbolic', secondAlone: 'non-hyperbolic' }],
  ])('alpha %d, beta %d: the right kinds', (alpha, beta, kinds) => {
    expect(kindsOf(systemWith(alpha, beta))).toEqual(kinds);
  });

  it('lists points at which neither firm grows, none with negative users', () => {
    fc.assert(
      fc.property(anySystem, (system) => {
        const growth = new Float64Array(2);
        for (const { point } of findEquilibria(system)) {
          fillGrowth(system, point, growth);
          // 1/(1 - alpha beta) is the condition of the two lines that cross in the point.
          const condition = 1 / Math.min(1, Math.abs(1 - system.alpha * system.beta));
          expect(Math.abs(growth[0])).toBeLessThanOrEqual(ROUNDING * condition * system.r1 * system.k1);
          expect(Math.abs(growth[1])).toBeLessThanOrEqual(ROUNDING * condition * system.r2 * system.k2);
          expect(Math.min(...point)).toBeGreaterThanOrEqual(0);
        }
      }),
    );
  });

  it('gives eigenvalues with the trace and the determinant of the Jacobian, and the kind they imply', () => {
    fc.assert(
      fc.property(anySystem, (system) => {
        const jacobian = new Float64Array(4);
        for (const equilibrium of findEquilibria(system)) {
          fillJacobian(system, equilibrium.point, jacobian);
          const [a, b, c, d] = jacobian;
          const [low, high] = equilibrium.eigenvalues;
          const size = Math.abs(a) + Math.abs(b * c) / (Math.abs(a) + Math.abs(d)) + Math.abs(d);
          const condition = 1 / Math.min(1, Math.abs(1 - system.alpha * system.beta));
          expect(low).toBeLessThanOrEqual(high);
          expect(Math.abs(low + high - (a + d))).toBeLessThanOrEqual(ROUNDING * condition * size);
          expect(Math.abs(low * high - (a * d - b * c))).toBeLessThanOrEqual(
            ROUNDING * condition * size * size,
          );
          expect(equilibrium.kind).toBe(kindFromEigenvalues(equilibrium));
        }
      }),
    );
  });

  it('exchanges the points with the firms', () => {
    fc.assert(
      fc.property(anySystem, (system) => {
        const [empty, first, second, shared] = findEquilibria(system);
        const [emptySwapped, firstSwapped, secondSwapped, sharedSwapped] = findEquilibria(swapFirms(system));
        expect(emptySwapped.eigenvalues).toEqual(empty.eigenvalues);
        expect(firstSwapped.eigenvalues).toEqual(second.eigenvalues);
        expect(secondSwapped.eigenvalues).toEqual(first.eigenvalues);
        expect(firstSwapped.kind).toBe(second.kind);
        expect(sharedSwapped?.point).toEqual(shared && [shared.point[1], shared.point[0]]);
      }),
    );
  });

  it('refuses a saturation level of zero', () => {
    expect(() => findEquilibria({ ...systemWith(0.5, 0.5), k1: 0 })).toThrow('system.k1');
  });
});

describe('findSharedEquilibrium', () => {
  it('exists exactly when the market coexists or the head start decides', () => {
    fc.assert(
      fc.property(anySystem, (system) => {
        const isExpected = ['coexistence', 'headStartDecides'].includes(classifyOutcome(system));
        expect(findSharedEquilibrium(system) !== null).toBe(isExpected);
      }),
    );
  });

  it('is a sink in coexistence and a saddle when the head start decides', () => {
    fc.assert(
      fc.property(coexistingSystem, headStartSystem, (coexisting, racing) => {
        expect(findSharedEquilibrium(coexisting)?.kind).toBe('sink');
        expect(findSharedEquilibrium(racing)?.kind).toBe('saddle');
      }),
    );
  });

  it('is at K1, K2 with rates -r1, -r2 when the firms do not compete', () => {
    const independent = findSharedEquilibrium(systemWith(0, 0))!;
    expect(independent.point).toEqual([1000, 800]);
    expect(independent.eigenvalues).toEqual([-0.25, -0.2]);
  });
});
