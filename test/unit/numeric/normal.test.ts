import { describe, expect, it } from 'vitest';
import { normalCdf, normalQuantile } from '@/lib/numeric/normal';

describe('standard normal quantile', () => {
  it('agrees with scipy.stats.norm.ppf in the centre, the shoulders and the far tail', () => {
    // scipy 1.17.1
    const reference: [number, number][] = [
      [0.9, 1.2815515655446004],
      [0.95, 1.6448536269514722],
      [0.975, 1.959963984540054],
      [0.995, 2.5758293035489004],
      [0.3, -0.5244005127080409],
      [1e-10, -6.361340902404056],
      [1e-20, -9.262340089798409],
    ];
    for (const [p, z] of reference) expect(Math.abs(normalQuantile(p) / z - 1)).toBeLessThan(1e-14);
  });

  it('is antisymmetric about one half', () => {
    expect(normalQuantile(0.5)).toBe(0);
    expect(normalQuantile(0.2)).toBeCloseTo(-normalQuantile(0.8), 14);
  });

  it('runs to infinity at the ends and has no value outside', () => {
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
    expect(normalQuantile(1.1)).toBeNaN();
    expect(normalQuantile(Number.NaN)).toBeNaN();
  });
});

describe('standard normal distribution function', () => {
  it('undoes the quantile', () => {
    for (const p of [1e-20, 1e-6, 0.0013, 0.3, 0.5, 0.9, 0.9999]) {
      expect(Math.abs(normalCdf(normalQuantile(p)) / p - 1)).toBeLessThan(1e-12);
    }
  });

  it('has no value for no number', () => {
    expect(normalCdf(Number.NaN)).toBeNaN();
    expect(normalCdf(Number.NEGATIVE_INFINITY)).toBe(0);
    expect(normalCdf(Number.POSITIVE_INFINITY)).toBe(1);
  });
});
