import { describe, expect, it } from 'vitest';
import { quantileSorted, quantiles, quantilesInPlace } from '@/lib/numeric/quantile';
import { createStream } from '@/lib/numeric/random';

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

  it('by selection are those of the sorted values, ties and all', () => {
    const stream = createStream(3, 0);
    const ps = [0, 0.05, 0.25, 0.5, 0.75, 0.95, 1];
    for (const size of [1, 2, 3, 10, 500, 4001]) {
      const values = Float64Array.from(
        { length: size },
        // half a step off, so that no value is -0, which sorts before 0
        () => (Math.round(20 * stream.normal()) + 0.5) / (1 + (size % 3)),
      );
      const sorted = values.slice().sort();
      expect(quantilesInPlace(values, ps)).toEqual(ps.map((p) => quantileSorted(sorted, p)));
      // nothing is lost or made up
      expect(values.sort()).toEqual(sorted);
    }
  });

  it('of values with one that is no number are no numbers', () => {
    expect(quantiles([1, Number.NaN, 3], [0.5])).toEqual([Number.NaN]);
  });

  it('allow infinite values without NaN', () => {
    expect(quantiles([1, Infinity, Infinity, Infinity], [0.5, 0.9])).toEqual([Infinity, Infinity]);
  });

  it('refuse no values and probabilities outside 0 to 1', () => {
    expect(() => quantileSorted([], 0.5)).toThrow('sorted must hold at least one value');
    expect(() => quantileSorted([1], 1.5)).toThrow('p must be between 0 and 1, got 1.5');
  });
});
