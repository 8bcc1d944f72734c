import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { createKalmanFilter, type FilterGradient, type FilterInput } from '@/lib/estimate/kalman-filter';
import { sampleStatePath } from '@/lib/estimate/state-path';
import { createStream } from '@/lib/numeric/random';
import { COEXISTING, FIRST_MONTH, observe, simulateWandering, toTheta } from './simulated-market';

const series = simulateWandering(COEXISTING, 36, 0.03, 0.02, 3);
const gappy = { ...series, focal: series.focal.map((count, t) => (t % 7 === 3 ? null : count)) };

function inputOf(process: number, change: Partial<FilterInput> = {}): FilterInput {
  return {
    theta: toTheta(COEXISTING),
    after: null,
    breakMonth: 36,
    observation: Float64Array.of(0.03 ** 2, 0.04 ** 2),
    process: Float64Array.of(process ** 2, (1.3 * process) ** 2),
    season: null,
    ...change,
  };
}

const emptyGradient = (): FilterGradient => ({
  theta: new Float64Array(8),
  after: new Float64Array(6),
  observation: new Float64Array(2),
  process: new Float64Array(2),
  season: new Float64Array(24),
});

describe('the filter', () => {
  it('without process noise is the sum of independent normal errors around the path, gaps left out', () => {
    const observations = observe(gappy);
    const trajectory = createTrajectory({ months: 36, entry1: 0, entry2: 0 });
    trajectory.run(toTheta(COEXISTING));
    let expected = 0;
    observations.firms.forEach((firm, i) => {
      const variance = i === 0 ? 0.03 ** 2 : 0.04 ** 2;
      firm.months.forEach((month, k) => {
        const error = firm.logCounts[k] - (i === 0 ? trajectory.logLevel1 : trajectory.logLevel2)[month];
        expected -= 0.5 * (Math.log(variance) + error ** 2 / variance);
      });
    });
    expect(createKalmanFilter(observations).run(inputOf(0))).toBeCloseTo(expected, 8);
  });

  it('with vanishing growth is a random walk observed with noise', () => {
    const counts = [100, 104, 99, 108, 111, 103, 109, 118, 115, 121, 119, 125];
    const flat = { firstMonth: FIRST_MONTH, focal: counts, rival: counts.map((count) => 2 * count) };
    const theta = Float64Array.of(1e-12, 1e-12, 1e6, 1e6, 1, 1, 100, 200).map(Math.log);
    const [observation, process] = [0.04 ** 2, 0.03 ** 2];
    let [mean, variance, expected] = [Math.log(100), 0, 0];
    for (const count of counts) {
      const total = variance + observation;
      const error = Math.log(count) - mean;
      expected -= 0.5 * (Math.log(total) + error ** 2 / total);
      mean += (variance / total) * error;
      variance = (variance * observation) / total + process;
    }
    const value = createKalmanFilter(observe(flat)).run({
      ...inputOf(0, { theta }),
      observation: Float64Array.of(observation, observation),
      process: Float64Array.of(process, process),
    });
    // the rival is the focal firm doubled: the same likelihood twice
    expect(value).toBeCloseTo(2 * expected, 6);
  });

  it('hardly hears a flagged count', () => {
    const spoiled = { ...series, focal: series.focal.map((count, t) => (t === 20 ? 5 * count! : count)) };
    const clean = createKalmanFilter(
      observe({ ...series, focal: series.focal.map((c, t) => (t === 20 ? null : c)) }),
    );
    const flagged = createKalmanFilter(observe(spoiled));
    flagged.flags[20] = 1;
    clean.run(inputOf(0.02));
    flagged.run(inputOf(0.02));
    // the count is 1.6 off, its sd a hundred times 0.03
    expect(Math.abs(clean.mean[0] - flagged.mean[0])).toBeLessThan(1e-3);
  });
});

describe('the reverse sweep', () => {
  const season = Float64Array.from({ length: 24 }, (_, k) => 0.02 * Math.sin(k));
  const after = toTheta(COEXISTING)
    .slice(0, 6)
    .map((value, j) => value + 0.1 * Math.cos(j));
  const change = { season, after, breakMonth: 17 };
  const filter = createKalmanFilter(observe(gappy));
  const slope = (move: (input: FilterInput, step: number) => void, process: number) => {
    const at = (step: number) => {
      const input = inputOf(process, { season: season.slice(), after: after.slice(), breakMonth: 17 });
      move(input, step);
      return filter.run(input);
    };
    return (at(1e-5) - at(-1e-5)) / 2e-5;
  };

  const gradientAt = (process: number) => {
    const gradient = emptyGradient();
    filter.run(inputOf(process, change));
    filter.sweepBack(inputOf(process, change), gradient);
    return gradient;
  };

  it('is exact for every input when there is no process noise', () => {
    const gradient = gradientAt(1e-9);
    for (const part of ['theta', 'after', 'season'] as const) {
      gradient[part].forEach((value, j) => {
        const expected = slope((input, step) => {
          input[part]![j] += step;
        }, 1e-9);
        expect(Math.abs(value - expected)).toBeLessThan(1e-4 * (1 + Math.abs(expected)));
      });
    }
    gradient.observation.forEach((value, i) => {
      const relative = slope((input, step) => {
        input.observation[i] *= 1 + step;
      }, 1e-9);
      expect(Math.abs(value * inputOf(0).observation[i] - relative)).toBeLessThan(1e-4);
    });
  });

  it('is exact also once a firm has left', () => {
    const rival = series.rival.map((count, t) => (t < 26 ? count : 0));
    const leaving = createKalmanFilter(observe({ ...series, rival }));
    const gradient = emptyGradient();
    const input = inputOf(1e-9, change);
    leaving.run(input);
    leaving.sweepBack(input, gradient);
    for (const part of ['theta', 'after'] as const) {
      gradient[part].forEach((value, j) => {
        const at = (step: number) => {
          const moved = inputOf(1e-9, { season, after: after.slice(), breakMonth: 17 });
          moved[part]![j] += step;
          return leaving.run(moved);
        };
        const expected = (at(1e-5) - at(-1e-5)) / 2e-5;
        expect(Math.abs(value - expected)).toBeLessThan(1e-4 * (1 + Math.abs(expected)));
      });
    }
  });

  it('with process noise points the same way as the exact gradient', () => {
    const gradient = gradientAt(0.02);
    for (const part of ['theta', 'after', 'season', 'observation', 'process'] as const) {
      let dot = 0;
      let own = 0;
      let exact = 0;
      gradient[part].forEach((value, j) => {
        const unit = part === 'observation' || part === 'process' ? inputOf(0.02)[part][j] : 1;
        const expected = slope((input, step) => {
          input[part]![j] += step * unit;
        }, 0.02);
        dot += value * unit * expected;
        own += (value * unit) ** 2;
        exact += expected ** 2;
      });
      // the change of F is left out: an angle of a few degrees
      expect(dot / Math.sqrt(own * exact)).toBeGreaterThan(0.98);
    }
  });
});

describe('sampled paths', () => {
  it('have the mean and spread of the random walk smoother, worked out by the full normal distribution', () => {
    // two months, vanishing growth: z0 known, z1 = z0 + w; count of month 1 pulls z1 by q^2 / (q^2 + s^2)
    const counts = new Array(12).fill(100) as (number | null)[];
    counts.fill(null, 1);
    counts[11] = 150;
    const rival = counts.map((_, t) => 100 + t);
    const theta = Float64Array.of(1e-12, 1e-12, 1e6, 1e6, 1, 1, 100, 100).map(Math.log);
    const filter = createKalmanFilter({
      ...observe({ firstMonth: FIRST_MONTH, focal: rival, rival }),
      firms: [
        { entry: 0, months: Int32Array.of(0, 11), logCounts: Float64Array.of(Math.log(100), Math.log(150)) },
        { entry: 0, months: Int32Array.of(0), logCounts: Float64Array.of(Math.log(100)) },
      ],
    });
    const [q, s] = [0.1, 0.05];
    filter.run({
      ...inputOf(0, { theta }),
      observation: Float64Array.of(s * s, s * s),
      process: Float64Array.of(q * q, q * q),
    });
    const stream = createStream(5, 0);
    const path = new Float64Array(24);
    const draws = 4000;
    let sum = 0;
    let squares = 0;
    for (let i = 0; i < draws; i++) {
      sampleStatePath(filter.history, 12, stream, path);
      const deviation = path[5] - Math.log(100);
      sum += deviation / draws;
      squares += deviation ** 2 / draws;
    }
    // z5 given y11: mean 5 q^2 / (11 q^2 + s^2) x (ln 1.5), variance 5 q^2 - (5 q^2)^2 / (11 q^2 + s^2)
    const total = 11 * q * q + s * s;
    const mean = ((5 * q * q) / total) * Math.log(1.5);
    const variance = 5 * q * q - (5 * q * q) ** 2 / total;
    expect(Math.abs(sum - mean)).toBeLessThan(4 * Math.sqrt(variance / draws));
    expect(Math.abs((squares - sum ** 2) / variance - 1)).toBeLessThan(4 * Math.sqrt(2 / draws));
  });
});
