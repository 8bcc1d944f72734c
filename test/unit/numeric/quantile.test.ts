import { describe, expect, it } from 'vitest';
import { quantileSorted, quantiles } from '@/lib/numeric/quantile';

describe('quantiles of type R-7', () => {
  it('interpolate between order statistics', () => {
    // h = (n - 1) p = 3 x 0.25 = 0.75 between 1 and 2
    expect(quantileSorted([1, 2, 3, 4], 0.25)).toBeCloseTo(1.75, 12);
    expect(quantileSorted([1, 2, 3, 4], 0.5)).toBeCloseTo(2.5, 12);
    expect(quantileSorted([1, 2, 3, 4], 1)).toBe(4);
    expect(quantileSorted([6], 0.3)).toBe(6);
  });

  it('leave the input unsorted as it was', () => {
    const values = [3, 1, 2];
    expect(quantiles(values, [0, 0.5, 1])).toEqual([1, 2, 3]);
    expect(values).toEqual([3, 1, 2]);
  });

  it('allow infinite values without NaN', () => {
    expect(quantiles([1, Infinity, Infinity, Infinity], [0.5, 0.9])).toEqual([Infinity, Infinity]);
  });

  it('refuse no values and probabilities outside 0 to 1', () => {
    expect(() => quantileSorted([], 0.5)).toThrow('sorted must hold at least one value');
    expect(() => quantileSorted([1], 1.5)).toThrow('p must be between 0 and 1, got 1.5');
  });
});
