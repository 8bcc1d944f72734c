import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { simulateLevels, simulateObservations } from '@/lib/forecast/simulate';
import { drawSet, repeat } from './draw-sets';

const logs = (values: Float64Array) => values.map(Math.log);
const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length;
const sd = (values: Float64Array) => Math.sqrt(mean(values.map((value) => (value - mean(values)) ** 2)));

describe('future levels', () => {
  it('follow the system from the last month, without noise under persistent errors', () => {
    const draws = drawSet('ar1', repeat(2));
    const { focal, rival, count } = simulateLevels(draws, 24, 1);
    const trajectory = createTrajectory({ months: 25, entry1: 0, entry2: 0 });
    trajectory.run([0.15, 0.19, 9e5, 7e5, 0.5, 0.4, 4e5, 3e5].map(Math.log));
    for (const h of [1, 12, 24]) {
      expect(focal[(h - 1) * count + 1]).toBeCloseTo(Math.exp(trajectory.logLevel1[h]), 6);
      expect(rival[(h - 1) * count]).toBeCloseTo(Math.exp(trajectory.logLevel2[h]), 6);
    }
  });

  it('are shaken by process noise with its size, and pulled back by the system', () => {
    const draws = drawSet('process-noise', repeat(4000, { noise1: 0.05 }));
    const { focal, count } = simulateLevels(draws, 60, 1);
    const spread = (h: number) => sd(logs(focal.slice((h - 1) * count, h * count)));
    // 4,000 draws give a spread to 1.1 %
    expect(Math.abs(spread(1) / 0.05 - 1)).toBeLessThan(0.05);
    expect(spread(12)).toBeGreaterThan(0.1);
    // a free random walk would reach 0.05 sqrt(60) = 0.39
    expect(spread(60)).toBeLessThan(0.3);
  });

  it('are the same for the same seed', () => {
    const draws = drawSet('process-noise', repeat(50));
    expect(simulateLevels(draws, 12, 4).focal).toEqual(simulateLevels(draws, 12, 4).focal);
    expect(simulateLevels(draws, 12, 4).focal).not.toEqual(simulateLevels(draws, 12, 5).focal);
  });

  it('stay where they are when a path cannot be followed', () => {
    const draws = drawSet('ar1', [{ r1: 1e6, n1: 123 }]);
    expect(Array.from(simulateLevels(draws, 3, 1).focal)).toEqual([123, 123, 123]);
  });
});

describe('future observations', () => {
  it('carry the last error on, and spread to its stationary size', () => {
    const draws = drawSet('ar1', repeat(4000, { persistence1: 0.8, residual1: 0.2, size1: 0.05 }));
    const levels = simulateLevels(draws, 24, 1);
    const { focal, count } = simulateObservations(draws, levels, 1, 2);
    const errors = (h: number) =>
      logs(focal.slice((h - 1) * count, h * count)).map(
        (value) => value - Math.log(levels.focal[(h - 1) * 4000]),
      );
    for (const h of [1, 3, 24]) {
      const error = errors(h);
      // antithetic pairs: the mean is exact
      expect(mean(error)).toBeCloseTo(0.2 * 0.8 ** h, 8);
      expect(Math.abs(sd(error) / (0.05 * Math.sqrt(1 - 0.8 ** (2 * h))) - 1)).toBeLessThan(0.05);
    }
  });

  it('use the same luck for every scenario', () => {
    const draws = drawSet('process-noise', repeat(20));
    const levels = simulateLevels(draws, 6, 1);
    const doubled = { ...levels, focal: levels.focal.map((users) => 2 * users) };
    const base = simulateObservations(draws, levels, 3, 2);
    const other = simulateObservations(draws, doubled, 3, 2);
    for (let i = 0; i < base.focal.length; i++) expect(other.focal[i] / base.focal[i]).toBeCloseTo(2, 10);
    expect(other.rival).toEqual(base.rival);
  });

  it('follow the yearly cycle, month by month and year after year', () => {
    const draws = drawSet('process-noise', repeat(10, { size1: 1e-9, noise1: 0 }));
    const seasonal = { ...draws, columns: [...draws.columns] };
    const offsets: number[] = [];
    for (const firm of [1, 2]) {
      for (let month = 1; month <= 12; month++) {
        seasonal.columns.push(`season${firm}m${month}`);
        offsets.push(firm === 1 ? month / 100 : 0);
      }
    }
    const width = draws.columns.length;
    const rows = Array.from({ length: 10 }, (_, i) => [
      ...Array.from(draws.values).slice(i * width, (i + 1) * width),
      ...offsets,
    ]);
    const set = { ...seasonal, values: Float64Array.from(rows.flat()) };
    const levels = simulateLevels(set, 14, 1);
    const { focal, rival } = simulateObservations(set, levels, 1, 2);
    for (const [h, month] of [
      [1, 1],
      [12, 12],
      [13, 1],
    ]) {
      expect(Math.log(focal[(h - 1) * 20] / levels.focal[(h - 1) * 10])).toBeCloseTo(month / 100, 6);
    }
    expect(Math.abs(Math.log(rival[0] / levels.rival[0]))).toBeLessThan(0.1);
  });
});
