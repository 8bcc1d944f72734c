import { describe, expect, it } from 'vitest';
import {
  columnNorms,
  conditionNumber,
  factorise,
  halfSumOfSquares,
  inverseNormalMatrix,
} from '@/lib/numeric/linear';

const ONES = Float64Array.of(1, 1);

describe('columnNorms', () => {
  it('are Euclidean', () => {
    expect(Array.from(columnNorms(Float64Array.of(3, 1, 4, 1), 2, 2))).toEqual([5, Math.SQRT2]);
  });

  it('do not overflow where the squares would', () => {
    expect(columnNorms(Float64Array.of(3e200, 4e200), 2, 1)[0]).toBeCloseTo(5e200, -190);
  });

  it('are zero for a column of zeros', () => {
    expect(columnNorms(new Float64Array(3), 3, 1)[0]).toBe(0);
  });
});

describe('factorise', () => {
  // A = [[1, 1], [1, 2], [1, 3]], b = [1, 2, 2]: least squares of a line, worked by hand: intercept 2/3, slope 1/2.
  const jacobian = Float64Array.of(1, 1, 1, 2, 1, 3);
  const residuals = Float64Array.of(-1, -2, -2);

  it('solves a straight line as by hand', () => {
    const { singularValues: s, rightVectors: v, projected: c } = factorise(jacobian, residuals, ONES);
    const solution = [0, 1].map((j) => -(v[2 * j] * c[0]) / s[0] - (v[2 * j + 1] * c[1]) / s[1]);
    expect(solution[0]).toBeCloseTo(2 / 3, 14);
    expect(solution[1]).toBeCloseTo(1 / 2, 14);
  });

  it('gives the inverse of the normal matrix as by hand, whatever the column scale', () => {
    // (A'A)^-1 = [[14, -6], [-6, 3]] / 6
    for (const scale of [ONES, Float64Array.of(1e-3, 1e5)]) {
      const inverse = inverseNormalMatrix(factorise(jacobian, residuals, scale));
      [14 / 6, -1, -1, 1 / 2].forEach((value, i) => {
        expect(inverse[i]).toBeCloseTo(value, 12);
      });
    }
  });

  it('has rank below n and an infinite condition number when two columns are parallel', () => {
    const factor = factorise(Float64Array.of(1, 2, 1, 2, 1, 2), residuals, ONES);
    expect(factor.rank).toBe(1);
    expect(conditionNumber(factor)).toBe(Number.POSITIVE_INFINITY);
  });

  it('handles as many residuals as parameters, and fewer', () => {
    expect(factorise(Float64Array.of(2, 0, 0, 3), Float64Array.of(1, 1), ONES).rank).toBe(2);
    expect(factorise(Float64Array.of(2, 3), Float64Array.of(1), ONES).rank).toBe(1);
  });
});

describe('halfSumOfSquares', () => {
  it('is half the sum of squares', () => {
    expect(halfSumOfSquares(Float64Array.of(3, -4))).toBe(12.5);
  });
});
