import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitLeastSquares } from '@/lib/numeric/least-squares';
import type { LeastSquaresProblem } from '@/lib/numeric/least-squares-problem';
import { fitNonNegative } from '@/lib/numeric/non-negative-fit';
import { LINE } from './problems';

/** Residuals A theta - b: the constrained minimum is worked out by hand in each test. */
function createLinear(rows: number[][], b: number[]): LeastSquaresProblem {
  const n = rows[0].length;
  return {
    parameterCount: n,
    residualCount: rows.length,
    evaluate(theta, residuals, jacobian) {
      rows.forEach((row, i) => {
        residuals[i] = row.reduce((sum, a, j) => sum + a * theta[j], -b[i]);
        jacobian?.set(row, i * n);
      });
      return true;
    },
  };
}

/** Least cost over every choice of parameters at zero whose free fit has no negative one: the answer by trying all. */
function leastCostByTrying(rows: number[][], b: number[]): number {
  const n = rows[0].length;
  let least = b.reduce((sum, value) => sum + value * value, 0) / 2;
  for (let choice = 1; choice < 2 ** n; choice++) {
    const columns = Array.from({ length: n }, (_, j) => j).filter((j) => choice & (1 << j));
    const problem = createLinear(
      rows.map((row) => columns.map((j) => row[j])),
      b,
    );
    const fit = fitLeastSquares(
      problem,
      columns.map(() => 0),
    );
    if (Math.min(...fit.theta) >= 0) least = Math.min(least, fit.cost);
  }
  return least;
}

describe('fitNonNegative', () => {
  it('is the free fit when no bound is met', () => {
    const end = fitNonNegative(LINE, [0.1, 0.1], [true, true]);
    expect(end.theta[0]).toBeCloseTo(2 / 3, 10);
    expect(end.theta[1]).toBeCloseTo(1 / 2, 10);
    expect(end.atZero).toEqual([]);
    expect(end.fit.status).toBe('gradient');
  });

  it('fixes a parameter that would be negative and fits the rest without it', () => {
    // min (x - 2)^2 + (x + y - 1)^2 + (y + 0.5)^2 has y = -2/3 when free; at y = 0 it is x = 3/2.
    const problem = createLinear(
      [
        [1, 0],
        [1, 1],
        [0, 1],
      ],
      [2, 1, -0.5],
    );
    const end = fitNonNegative(problem, [1, 1], [true, true]);
    expect(end.theta[0]).toBeCloseTo(1.5, 10);
    expect(end.theta[1]).toBe(0);
    expect(end.atZero).toEqual([1]);
    expect(end.free).toEqual([0]);
    expect(end.fit.covariance).toHaveLength(1);
  });

  it('finds the least cost of all choices of parameters at zero, from any start', () => {
    const entry = fc.integer({ min: -9, max: 9 });
    const vector = (length: number) => fc.array(entry, { minLength: length, maxLength: length });
    const anyRows = fc.array(vector(4), { minLength: 6, maxLength: 6 });
    fc.assert(
      fc.property(anyRows, vector(6), vector(4), (rows, b, start) => {
        const least = leastCostByTrying(rows, b);
        const end = fitNonNegative(createLinear(rows, b), start, [true, true, true, true]);
        // The gradient tolerance of 1e-8 leaves 1e-16 of the cost; exact fits end at rounding.
        expect(end.fit.cost).toBeLessThanOrEqual(least * (1 + 1e-9) + 1e-9);
        expect(Math.min(...end.theta)).toBeGreaterThanOrEqual(0);
      }),
      { seed: 1974, numRuns: 300, endOnFailure: true },
    );
  });

  it('frees a parameter that starts at zero but does not belong there', () => {
    const end = fitNonNegative(LINE, [0, 0], [true, true]);
    expect(end.theta[0]).toBeCloseTo(2 / 3, 8);
    expect(end.theta[1]).toBeCloseTo(1 / 2, 8);
    expect(end.atZero).toEqual([]);
  });

  it('leaves a parameter without a bound negative', () => {
    const problem = createLinear([[1], [1]], [-3, -1]);
    expect(fitNonNegative(problem, [5], [false]).theta[0]).toBeCloseTo(-2, 7);
  });

  it('ends at the same point from either side of the bound', () => {
    const problem = createLinear(
      [
        [1, 1],
        [1, -1],
        [0, 1],
      ],
      [1, 3, 0.2],
    );
    // Free: y < 0. At y = 0: x = 2.
    for (const start of [
      [0, 0],
      [5, 5],
      [0, 7],
    ]) {
      const end = fitNonNegative(problem, start, [true, true]);
      expect(end.theta[0]).toBeCloseTo(2, 8);
      expect(end.theta[1]).toBe(0);
    }
  });

  it('ends with everything at zero when that is the best there is', () => {
    const end = fitNonNegative(createLinear([[1], [2]], [-1, -3]), [4], [true]);
    expect(end.atZero).toEqual([0]);
    expect(end.fit.status).toBe('gradient');
    expect(end.fit.cost).toBe(5);
  });

  it('takes a negative start of a bounded parameter as zero', () => {
    expect(fitNonNegative(LINE, [-4, 0.5], [true, true]).theta[0]).toBeCloseTo(2 / 3, 8);
  });

  it('refuses bounds for another number of parameters', () => {
    expect(() => fitNonNegative(LINE, [0, 0], [true])).toThrow('isBounded');
  });
});
