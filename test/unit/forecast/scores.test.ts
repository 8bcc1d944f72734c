/** Scores against worked examples of their definitions and closed forms (CRPS of the normal by scipy). */
import { describe, expect, it } from 'vitest';
import {
  coverage,
  ensembleCrps,
  intervalScore,
  mase,
  naiveScale,
  weightedIntervalScore,
} from '@/lib/forecast/scores';
import { createStream } from '@/lib/numeric/random';

describe('CRPS of an ensemble', () => {
  it.each([
    [2.5, 0.375, 1 / 6],
    [6, 2.875, 8 / 3],
  ])('of 1, 2, 3, 4 at %f is the worked value, plain and fair', (y, plain, fair) => {
    expect(ensembleCrps([3, 1, 4, 2], y)).toBeCloseTo(plain, 12);
    expect(ensembleCrps([3, 1, 4, 2], y, 'fair')).toBeCloseTo(fair, 12);
  });

  it('of one member is its distance', () => {
    expect(ensembleCrps([3], 5)).toBe(2);
    expect(() => ensembleCrps([], 5)).toThrow('members');
    expect(() => ensembleCrps([3], 5, 'fair')).toThrow('members');
  });

  it.each([
    [0, 0.233694977255],
    [1, 0.602441357628],
    [2, 1.452791821686],
  ])('of many normal draws at %f nears the closed form', (y, exact) => {
    const stream = createStream(3, 0);
    const draws = Float64Array.from({ length: 40_000 }, () => stream.normal());
    // Monte Carlo error of the mean of 40,000 values of sd below 1: 0.005.
    expect(Math.abs(ensembleCrps(draws, y, 'fair') - exact)).toBeLessThan(0.015);
  });
});

describe('interval scores', () => {
  it.each([
    [90, 110, 0.05, 100, 20],
    [90, 110, 0.05, 85, 220],
    [90, 110, 0.2, 112, 40],
  ])('of [%f, %f] with alpha %f at %f is the worked value', (low, high, alpha, y, expected) => {
    expect(intervalScore({ low, high, alpha }, y)).toBeCloseTo(expected, 10);
  });

  it('add up to the weighted one, which is twice the mean pinball loss', () => {
    const intervals = [
      { low: 95, high: 105, alpha: 0.5 },
      { low: 90, high: 112, alpha: 0.2 },
      { low: 84, high: 118, alpha: 0.05 },
    ];
    expect(weightedIntervalScore(100, intervals, 115)).toBeCloseTo(7.442857142857, 11);
    const quantiles = [
      [0.5, 100],
      ...intervals.flatMap(({ low, high, alpha }) => [
        [alpha / 2, low],
        [1 - alpha / 2, high],
      ]),
    ];
    const pinball = quantiles.map(([p, q]) => (115 >= q ? p * (115 - q) : (1 - p) * (q - 115)));
    expect(weightedIntervalScore(100, intervals, 115)).toBeCloseTo(
      (2 * pinball.reduce((sum, loss) => sum + loss, 0)) / 7,
      11,
    );
  });
});

describe('MASE', () => {
  const train = [100, 110, 105, 120, 130, 128];
  it.each([
    [1, 8.4, 0.357142857],
    [2, 12, 0.25],
  ])('with m = %i has the worked scale and value', (m, scale, expected) => {
    expect(naiveScale(train, m)).toBeCloseTo(scale, 12);
    expect(mase([135, 140, 150], [132, 141, 145], scale)).toBeCloseTo(expected, 9);
  });

  it('has no scale where nothing changes or no pair was observed; a gap is passed over', () => {
    expect(naiveScale([5, 5, 5])).toBeNull();
    expect(naiveScale([5, null, 7])).toBeNull();
    expect(naiveScale([5, 6, null, 7, 10])).toBe(2);
  });
});

it('coverage counts the ends as inside', () => {
  const interval = { low: 1, high: 2 };
  expect(coverage([interval, interval, interval, interval], [1, 2, 2.1, 0])).toBe(0.5);
});
