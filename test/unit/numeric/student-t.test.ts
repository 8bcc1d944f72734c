/** Student's t against values of scipy (1.17), which agree with R. */
import { describe, expect, it } from 'vitest';
import { normalCdf } from '@/lib/numeric/normal';
import { studentTCdf, studentTQuantile } from '@/lib/numeric/student-t';

describe("Student's t", () => {
  it.each([
    [0.975, 1, 12.706204736],
    [0.975, 2, 4.30265273],
    [0.975, 4, 2.776445105],
    [0.975, 5, 2.570581836],
    [0.975, 8, 2.306004135],
    [0.975, 10, 2.228138852],
    [0.975, 20, 2.085963447],
    [0.975, 38, 2.024394164],
    [0.975, 40, 2.02107539],
    [0.975, 100, 1.983971519],
    [0.9, 10, 1.372183641],
    [0.95, 10, 1.812461123],
    [0.995, 10, 3.169272673],
  ])('has its %f quantile with %i degrees of freedom at the reference value', (p, df, expected) => {
    // The references are printed to nine decimals.
    expect(studentTQuantile(p, df)).toBeCloseTo(expected, 8);
    expect(studentTCdf(expected, df)).toBeCloseTo(p, 9);
  });

  it('is symmetric, and Cauchy with one degree of freedom', () => {
    for (const t of [0, 0.3, 1, 2.5, 40]) {
      expect(studentTCdf(-t, 7)).toBeCloseTo(1 - studentTCdf(t, 7), 14);
      expect(studentTCdf(t, 1)).toBeCloseTo(0.5 + Math.atan(t) / Math.PI, 13);
    }
    expect(studentTQuantile(0.5, 3)).toBe(0);
  });

  it('nears the normal distribution with many degrees of freedom', () => {
    // The difference falls as 1 / df: about 2e-7 here.
    expect(studentTCdf(1.3, 1e6)).toBeCloseTo(normalCdf(1.3), 6);
  });

  it('refuses what is no distribution or no probability, and passes on what is no number', () => {
    expect(() => studentTCdf(1, 0)).toThrow('df');
    expect(() => studentTQuantile(1, 5)).toThrow('p must be');
    expect(studentTCdf(Number.NaN, 5)).toBeNaN();
  });
});
