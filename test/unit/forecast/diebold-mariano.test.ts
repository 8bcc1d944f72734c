import { describe, expect, it } from 'vitest';
import { testDieboldMariano } from '@/lib/forecast/diebold-mariano';

describe('the test of Diebold and Mariano', () => {
  it('without overlap is the t test of the mean, by hand', () => {
    // d = 1, 2, 3, 4: mean 2.5, g0 = 1.25, DM = 2.5 / sqrt(1.25 / 4) = 4.472136; corrected by sqrt(3 / 4): 3.872983,
    // which is mean / (s / sqrt(n)) with s^2 = 5 / 3; two-sided p of t with 3 df: 0.030466 (scipy ttest_1samp).
    const test = testDieboldMariano([1, 2, 3, 4], 1);
    expect(test.meanDifference).toBe(2.5);
    expect(test.statistic).toBeCloseTo(2.5 / Math.sqrt(5 / 3 / 4), 12);
    expect(test.pValue).toBeCloseTo(0.030466291662170977, 10);
  });

  it('with an overlap of two takes the first autocovariance in, by hand', () => {
    // d = 0, 1, 2, 3, 4: mean 2, g0 = 2, g1 = (2 + 0 + 0 + 2) / 5 = 0.8, variance 3.6; DM = 2 / sqrt(3.6 / 5);
    // correction (5 + 1 - 4 + 2 / 5) / 5 = 0.48.
    const test = testDieboldMariano([0, 1, 2, 3, 4], 2);
    expect(test.statistic).toBeCloseTo(Math.sqrt(0.48) * (2 / Math.sqrt(3.6 / 5)), 12);
  });

  it('changes sign with the roles, not its p-value', () => {
    const forward = testDieboldMariano([0.3, -0.1, 0.4, 0.2, 0.1], 1);
    const back = testDieboldMariano([-0.3, 0.1, -0.4, -0.2, -0.1], 1);
    expect(back.statistic).toBeCloseTo(-forward.statistic!, 12);
    expect(back.pValue).toBeCloseTo(forward.pValue!, 12);
  });

  it('says nothing where the variance is not positive or too few origins are left', () => {
    expect(testDieboldMariano([1, 1, 1], 1)).toEqual({ meanDifference: 1, statistic: null, pValue: null });
    expect(testDieboldMariano([1, -1, 1, -1], 2)).toMatchObject({ statistic: null, pValue: null });
    expect(testDieboldMariano([2], 1)).toMatchObject({ meanDifference: 2, pValue: null });
    expect(() => testDieboldMariano([1, 2], 0)).toThrow('overlap');
  });
});
