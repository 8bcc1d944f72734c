/** The simple methods on series whose answer is known, and on series they cannot forecast. */
import { describe, expect, it } from 'vitest';
import type { Baseline, LogForecast, LogSeries } from '@/lib/forecast/baselines/baseline';
import { membersAt, standardMembers } from '@/lib/forecast/baselines/baseline';
import { forecastDampedTrend } from '@/lib/forecast/baselines/damped-trend';
import { forecastIndependentLogistic } from '@/lib/forecast/baselines/independent-logistic';
import { forecastRandomWalk } from '@/lib/forecast/baselines/random-walk-drift';
import { forecastSeasonalNaive } from '@/lib/forecast/baselines/seasonal-naive';
import { createStream } from '@/lib/numeric/random';
import { studentTQuantile } from '@/lib/numeric/student-t';

const ALL: [string, Baseline][] = [
  ['random walk with drift', forecastRandomWalk],
  ['seasonal naive', forecastSeasonalNaive],
  ['independent logistic', forecastIndependentLogistic],
  ['damped trend', forecastDampedTrend],
];

function series(length: number, value: (t: number) => number | null): LogSeries {
  return Array.from({ length }, (_, t) => value(t));
}

function forecast(baseline: Baseline, input: LogSeries, months = 12): LogForecast {
  const end = baseline(input, months);
  if (!end.ok) throw new Error(end.code);
  return end.forecast;
}

/** ln of logistic growth from 100 to 5,000 with r = 0.2. */
const logistic = (t: number) => Math.log(5000 / (1 + 49 * Math.exp(-0.2 * t)));

describe.each(ALL)('%s', (_name, baseline) => {
  it('refuses a series that is too short, with a code', () => {
    for (const length of [0, 1, 3])
      expect(
        baseline(
          series(length, (t) => t),
          12,
        ),
      ).toEqual({ ok: false, code: 'too-short' });
  });

  it('gives finite bands that do not shrink below nothing, with gaps and a late start too', () => {
    const stream = createStream(5, 0);
    const noisy = series(36, (t) => (t % 7 === 3 ? null : logistic(t) + 0.05 * stream.normal()));
    const { centre, scale, df } = forecast(baseline, noisy, 24);
    expect([...centre, ...scale].every(Number.isFinite)).toBe(true);
    expect(scale.every((value) => value > 0)).toBe(true);
    expect(df).toBeGreaterThan(0);
  });

  it('shifts with the logarithm: other units give the same forecast in those units', () => {
    const stream = createStream(6, 0);
    const noisy = series(30, (t) => logistic(t) + 0.05 * stream.normal());
    const [here, there] = [noisy, noisy.map((value) => value! + Math.log(1000))].map((s) =>
      forecast(baseline, s),
    );
    here.centre.forEach((value, i) => {
      // The least-squares fit and the search end within their tolerances.
      expect(there.centre[i] - Math.log(1000)).toBeCloseTo(value, 4);
      expect(there.scale[i]).toBeCloseTo(here.scale[i], 4);
    });
  });
});

describe('random walk with drift', () => {
  it('is exact on a straight line of logarithms, without a band', () => {
    const { centre, scale } = forecast(
      forecastRandomWalk,
      series(20, (t) => 3 + 0.07 * t),
    );
    centre.forEach((value, i) => {
      expect(value).toBeCloseTo(3 + 0.07 * (20 + i), 10);
      expect(scale[i]).toBeCloseTo(0, 7);
    });
  });

  it('takes a gap as one step of its length, and counts on from the last count', () => {
    const withGaps = series(20, (t) => (t === 5 || t === 6 || t >= 18 ? null : 3 + 0.07 * t));
    expect(forecast(forecastRandomWalk, withGaps).centre[0]).toBeCloseTo(3 + 0.07 * 20, 10);
  });

  it('has the variance of the textbook, by hand', () => {
    // changes 1, -1, 1, -1, 1: drift 0.2; squares 0.64, 1.44, 0.64, 1.44, 0.64 sum to 4.8, / 4; at h = 2: x (2 + 4 / 5).
    const { centre, scale, df } = forecast(forecastRandomWalk, [0, 1, 0, 1, 0, 1], 2);
    expect(centre[1]).toBeCloseTo(1.4, 12);
    expect(scale[1]).toBeCloseTo(Math.sqrt(1.2 * 2.8), 12);
    expect(df).toBe(4);
  });

  it('holds about nine in ten outcomes of its own kind in its 90 % band', () => {
    const stream = createStream(11, 0);
    let held = 0;
    const runs = 600;
    for (let run = 0; run < runs; run++) {
      const path = [0];
      for (let t = 1; t < 30; t++) path.push(path[t - 1] + 0.03 + 0.1 * stream.normal());
      const { centre, scale, df } = forecast(forecastRandomWalk, path.slice(0, 18));
      if (Math.abs(path[29] - centre[11]) <= studentTQuantile(0.95, df) * scale[11]) held++;
    }
    // Binomial sd 0.012; the band is exact for this process.
    expect(Math.abs(held / runs - 0.9)).toBeLessThan(0.04);
  });
});

describe('seasonal naive', () => {
  it('repeats a yearly pattern exactly, and steps back a year over a gap', () => {
    const wave = (t: number) => 5 + Math.sin((Math.PI * t) / 6);
    const { centre, scale } = forecast(
      forecastSeasonalNaive,
      series(36, (t) => (t === 27 ? null : wave(t))),
      18,
    );
    centre.forEach((value, i) => {
      expect(value).toBeCloseTo(wave(36 + i), 10);
      expect(scale[i]).toBeCloseTo(0, 7);
    });
  });

  it('widens with each year ahead', () => {
    const stream = createStream(2, 0);
    const { scale } = forecast(
      forecastSeasonalNaive,
      series(30, () => stream.normal()),
      24,
    );
    expect(scale[12]).toBeCloseTo(scale[0] * Math.SQRT2, 12);
  });
});

describe('independent logistic', () => {
  it('goes on along a logistic curve without noise', () => {
    const { centre } = forecast(forecastIndependentLogistic, series(24, logistic), 24);
    // The least-squares fit ends at a gradient of 1e-8.
    for (const [i, value] of centre.entries()) expect(value).toBeCloseTo(logistic(24 + i), 5);
  });

  it('follows a firm that only falls, and one that grows without bending', () => {
    for (const rate of [-0.05, 0.08]) {
      const { centre } = forecast(
        forecastIndependentLogistic,
        series(24, (t) => 4 + rate * t),
      );
      expect(centre[11]).toBeCloseTo(4 + rate * 35, 4);
    }
  });

  it('is less sure of the far future before the curve has bent than after', () => {
    const stream = createStream(8, 0);
    const noise = Array.from({ length: 48 }, () => 0.03 * stream.normal());
    const at = (length: number) =>
      forecast(
        forecastIndependentLogistic,
        series(length, (t) => logistic(t) + noise[t]),
      ).scale[11];
    expect(at(16)).toBeGreaterThan(3 * at(48));
  });
});

describe('damped trend', () => {
  it('goes on along a straight line', () => {
    const { centre } = forecast(
      forecastDampedTrend,
      series(30, (t) => 2 + 0.05 * t),
    );
    for (const [i, value] of centre.entries()) expect(value).toBeCloseTo(2 + 0.05 * (30 + i), 3);
  });

  it('recovers a trend that fades: its end is near where the trend leads, not on the straight line', () => {
    const damping = 0.9;
    const stream = createStream(4, 0);
    const path: number[] = [];
    let level = 3;
    for (let t = 0; t < 40; t++) {
      level += 0.2 * damping ** t;
      path.push(level + 0.005 * stream.normal());
    }
    const end = 3 + 0.2 / (1 - damping);
    const { centre, scale } = forecast(forecastDampedTrend, path);
    // Ends within 4 % of the level that the trend fades to; the last slope carried on would miss by more.
    expect(Math.abs(centre[11] - end)).toBeLessThan(0.04);
    expect(scale[11]).toBeLessThan(0.2);
  });

  it('holds about nine in ten outcomes of a random walk with a level trend in its 90 % band', () => {
    const stream = createStream(12, 0);
    let held = 0;
    const runs = 200;
    for (let run = 0; run < runs; run++) {
      const path = [0];
      for (let t = 1; t < 42; t++) path.push(path[t - 1] + 0.1 * stream.normal());
      const { centre, scale, df } = forecast(forecastDampedTrend, path.slice(0, 36), 6);
      if (Math.abs(path[41] - centre[5]) <= studentTQuantile(0.95, df) * scale[5]) held++;
    }
    // Estimated parameters are not in the band, so a little less than 0.9 is expected; sd 0.021.
    expect(held / runs).toBeGreaterThan(0.78);
    expect(held / runs).toBeLessThan(0.97);
  });
});

it('members are the quantiles of their distribution, ascending and around the centre', () => {
  const made: LogForecast = { centre: Float64Array.of(2), scale: Float64Array.of(0.5), df: 4 };
  const members = membersAt(made, 1, standardMembers(4, 100));
  expect(members[2]).toBeCloseTo(2 + 0.5 * studentTQuantile(0.025, 4), 10);
  expect(members[97]).toBeCloseTo(4 - members[2], 10);
  expect(members.every((value, i) => i === 0 || value > members[i - 1])).toBe(true);
});
