/**
 * Published textbook systems: every fixed point, its eigenvalues, its kind, the verdict. Sources in `test/reference/data/README.md`
 * and in the `source` of each case.
 */
import { describe, expect, it } from 'vitest';
import { type Equilibrium, findEquilibria } from '@/lib/dynamics/equilibria';
import { classifyOutcome } from '@/lib/dynamics/outcome';
import { toPerUserEffects } from '@/lib/dynamics/system';
import { findSystem, OUTCOME_OF_VERDICT, readReferenceFile, type TextbookCase, toSystem } from './read-cases';

const file = readReferenceFile();
/** The file is printed to 16 digits and both sides compute in doubles. */
const TOLERANCE = 1e-12;

function expectClose(found: number, wanted: number, scale: number): void {
  expect(Math.abs(found - wanted)).toBeLessThanOrEqual(TOLERANCE * scale);
}

function expectPoint(
  found: Equilibrium,
  wanted: { N: number[]; eigenvalues?: number[] },
  rate: number,
): void {
  wanted.N.forEach((users, i) => {
    expectClose(found.point[i], users, Math.max(...wanted.N, 1));
  });
  [...wanted.eigenvalues!]
    .sort((a, b) => a - b)
    .forEach((eigenvalue, i) => {
      expectClose(found.eigenvalues[i], eigenvalue, rate);
    });
}

function kindOf([low, high]: readonly [number, number]): Equilibrium['kind'] {
  if (Math.abs(low) < TOLERANCE || Math.abs(high) < TOLERANCE) return 'non-hyperbolic';
  if (low > 0) return 'source';
  return high < 0 ? 'sink' : 'saddle';
}

describe('textbook systems', () => {
  it('are sixteen', () => {
    expect(file.cases).toHaveLength(16);
  });

  it.each(file.cases)('$id: points, eigenvalues and kinds', (textbookCase) => {
    const system = toSystem(textbookCase.params);
    const rate = Math.max(system.r1, system.r2);
    const found = findEquilibria(system);
    const wanted = textbookCase.equilibria.concat(
      hasFeasibleInterior(textbookCase) ? [textbookCase.interior!] : [],
    );
    expect(found).toHaveLength(wanted.length);
    found.forEach((equilibrium, i) => {
      expectPoint(equilibrium, wanted[i], rate);
      expect(equilibrium.kind).toBe(kindOf(equilibrium.eigenvalues));
    });
  });

  it.each(file.cases)('$id: verdict and coefficients', (textbookCase) => {
    const { params, A12, A21, verdict } = textbookCase;
    const system = toSystem(params);
    expect(classifyOutcome(system)).toBe(OUTCOME_OF_VERDICT[verdict]);
    expectClose(system.alpha, A12, A12);
    expectClose(system.beta, A21, A21);
    expectClose(toPerUserEffects(system).a12, params.a12, params.a12);
    expectClose(toPerUserEffects(system).a21, params.a21, params.a21);
  });

  // The same eigenvalues in closed form, worked out by hand from the Jacobian at the integer points.
  it.each([
    ['strogatz_6_4', [1, 1], -1, Math.SQRT2],
    ['strogatz_ex_6_4_2', [1, 1], -3 / 2, Math.sqrt(5) / 2],
    ['boyce_diprima_1', [0.5, 0.5], -1 / 2, Math.SQRT2 / 4],
    ['boyce_diprima_2', [0.5, 0.5], -5 / 16, Math.sqrt(57) / 16],
    ['edwards_penney_3', [12, 8], -5, Math.sqrt(97)],
    ['edwards_penney_4', [4, 6], -10, 2 * Math.sqrt(7)],
    ['manchester', [1, 2], -3 / 2, Math.sqrt(17) / 2],
  ] as const)('%s: the shared point has the eigenvalues of the closed form', (id, point, middle, half) => {
    const [, , , shared] = findEquilibria(findSystem(file, id));
    expectPoint(shared, { N: [...point], eigenvalues: [middle - half, middle + half] }, 16);
  });
});

function hasFeasibleInterior({ interior }: TextbookCase): boolean {
  return interior?.feasible === true;
}
