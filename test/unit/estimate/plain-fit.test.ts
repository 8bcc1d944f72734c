import { describe, expect, it } from 'vitest';
import { integrate } from '@/lib/dynamics/integrate';
import { type CompetitionSystem, fillGrowth, toCrowdingForm } from '@/lib/dynamics/system';
import { fitPlain } from '@/lib/estimate/plain-fit';
import { createPlainProblem, PLAIN_PARAMETER_COUNT, type PlainSeries } from '@/lib/estimate/plain-problem';
import { createPlainStarts } from '@/lib/estimate/plain-starts';

const SYSTEM: CompetitionSystem = { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha: 0.56, beta: 1.125 };

/** Exact counts of a system, every `step` months. */
function simulate(system: CompetitionSystem, start: [number, number], months: number, step = 1): PlainSeries {
  const times = Array.from({ length: Math.floor(months / step) + 1 }, (_, i) => i * step);
  const states = times.map(
    (t) =>
      integrate((_, y, out) => fillGrowth(system, y, out), 0, start, t, {
        relativeTolerance: 1e-12,
        absoluteTolerance: 0,
      }).y,
  );
  return { times, first: states.map((y) => y[0]), second: states.map((y) => y[1]) };
}

/** The series with a fixed wiggle of +-2 %, so that there is something to leave over. */
function wiggle(series: PlainSeries): PlainSeries {
  const shake = (counts: readonly (number | null)[], phase: number) =>
    counts.map((count, i) => count && count * (1 + 0.02 * Math.sin(2.3 * i + phase)));
  return { ...series, first: shake(series.first, 0), second: shake(series.second, 1) };
}

describe('createPlainProblem', () => {
  it.each(['log', 'raw'] as const)('has the sensitivities of central differences, %s', (errorScale) => {
    const series = wiggle(simulate(SYSTEM, [50, 20], 24, 2));
    const problem = createPlainProblem(series, errorScale);
    const theta = Float64Array.of(Math.log(0.3), Math.log(0.15), -3, -3.5, 0.2, 0.1, 0.15, 0.1);
    const m = problem.residualCount;
    const jacobian = new Float64Array(m * PLAIN_PARAMETER_COUNT);
    const [up, down, at] = [new Float64Array(m), new Float64Array(m), new Float64Array(m)];
    expect(problem.evaluate(theta, at, jacobian)).toBe(true);
    for (let j = 0; j < PLAIN_PARAMETER_COUNT; j++) {
      const step = 1e-5;
      problem.evaluate(
        theta.map((value, i) => value + (i === j ? step : 0)),
        up,
        null,
      );
      problem.evaluate(
        theta.map((value, i) => value - (i === j ? step : 0)),
        down,
        null,
      );
      const column = at.map((_, i) => jacobian[i * PLAIN_PARAMETER_COUNT + j]);
      const size = Math.max(...column.map(Math.abs));
      // Differences of paths integrated to 1e-10, divided by 2e-5.
      column.forEach((slope, i) => {
        expect(Math.abs((up[i] - down[i]) / (2 * step) - slope)).toBeLessThan(2e-5 * size);
      });
    }
  });

  it('gives the same residuals with and without a Jacobian', () => {
    const problem = createPlainProblem(wiggle(simulate(SYSTEM, [50, 20], 24)), 'log');
    const theta = Float64Array.of(Math.log(0.3), Math.log(0.15), -3, -3.5, 0.2, 0.1, 0.15, 0.1);
    const [bare, full] = [new Float64Array(50), new Float64Array(50)];
    problem.evaluate(theta, bare, null);
    problem.evaluate(theta, full, new Float64Array(50 * PLAIN_PARAMETER_COUNT));
    expect(bare).toEqual(full);
  });

  it('leaves out what was not observed, and zeros on the log scale alone', () => {
    const series: PlainSeries = { times: [0, 1, 2], first: [1, null, 3], second: [0, 2, null] };
    expect(createPlainProblem(series, 'raw').residualCount).toBe(4);
    expect(createPlainProblem(series, 'log').residualCount).toBe(3);
  });

  it('refuses times that do not rise and a firm without counts', () => {
    expect(() => createPlainProblem({ times: [0, 0], first: [1, 1], second: [1, 1] }, 'log')).toThrow('rise');
    expect(() => createPlainProblem({ times: [0, 1], first: [1, 1], second: [0, null] }, 'raw')).toThrow(
      'firm 2',
    );
  });
});

describe('createPlainStarts', () => {
  it('begins near the truth on exact counts', () => {
    const series = simulate(SYSTEM, [50, 20], 36);
    const problem = createPlainProblem(series, 'log');
    const { scales } = problem;
    const [start] = createPlainStarts(series, problem, 1, 1);
    const { b11, b12, b21, b22 } = toCrowdingForm(SYSTEM);
    const truth = [b11 * scales[0], b12 * scales[1], b21 * scales[0], b22 * scales[1]];
    expect(Math.exp(start[0]) / SYSTEM.r1).toBeCloseTo(1, 1);
    truth.forEach((value, i) => {
      expect(Math.abs(start[4 + i] / value - 1)).toBeLessThan(0.1);
    });
  });

  it('is the same for the same seed and different for another', () => {
    const series = simulate(SYSTEM, [50, 20], 36);
    const problem = createPlainProblem(series, 'log');
    const starts = createPlainStarts(series, problem, 4, 1);
    expect(createPlainStarts(series, problem, 4, 1)).toEqual(starts);
    expect(createPlainStarts(series, problem, 4, 2)[1]).not.toEqual(starts[1]);
    // Asking for fewer does not change the ones before.
    expect(createPlainStarts(series, problem, 2, 1)).toEqual(starts.slice(0, 2));
  });

  it('survives a series too short to regress', () => {
    const series: PlainSeries = { times: [0, 1], first: [1, 2], second: [3, 2] };
    for (const start of createPlainStarts(series, createPlainProblem(series, 'log'), 3, 1))
      expect(start.every(Number.isFinite)).toBe(true);
  });
});

describe('fitPlain', () => {
  it.each(['log', 'raw'] as const)('gives back the system that made exact counts, %s', (errorScale) => {
    const fit = fitPlain(simulate(SYSTEM, [50, 20], 60, 2), { errorScale, starts: 4 });
    expect(fit.estimates.r1 / SYSTEM.r1).toBeCloseTo(1, 5);
    expect(fit.estimates.n2Start / 20).toBeCloseTo(1, 5);
    expect(fit.k2! / SYSTEM.k2).toBeCloseTo(1, 5);
    expect(fit.alpha! / SYSTEM.alpha).toBeCloseTo(1, 5);
    expect(fit.beta! / SYSTEM.beta).toBeCloseTo(1, 5);
    expect(fit.outcome).toBe('exclusionByFirst');
  });

  it('covers the truth by a few standard errors on counts with a wiggle', () => {
    const fit = fitPlain(wiggle(simulate(SYSTEM, [50, 20], 60)), { starts: 4 });
    const truth = { ...toCrowdingForm(SYSTEM), n1Start: 50, n2Start: 20 };
    expect(fit.status).toBe('gradient');
    for (const id of ['r1', 'r2', 'b11', 'b12', 'b21', 'b22', 'n1Start', 'n2Start'] as const) {
      expect(Math.abs(fit.estimates[id] - truth[id])).toBeLessThan(4 * fit.standardErrors[id]!);
    }
  });

  it('exchanges its answers with the firms', () => {
    const series = wiggle(simulate(SYSTEM, [50, 20], 36));
    const fit = fitPlain(series, { starts: 4 });
    const swapped = fitPlain(
      { times: series.times, first: series.second, second: series.first },
      { starts: 4 },
    );
    expect(swapped.rss / fit.rss).toBeCloseTo(1, 6);
    expect(swapped.alpha! / fit.beta!).toBeCloseTo(1, 4);
    expect(swapped.outcome).toBe('exclusionBySecond');
  });

  it('says notIdentified, never a race, when a firm does not crowd itself in the window', () => {
    // Firm 1 grows faster and faster while firm 2 saturates beside it: there is no K1 in these numbers.
    const times = Array.from({ length: 30 }, (_, i) => i);
    const first = times.map((t) => 100 * Math.exp(0.03 * t + 0.0005 * t * t));
    const second = times.map((t) => 500 / (1 + 20 * Math.exp(-0.4 * t)));
    const fit = fitPlain({ times, first, second }, { starts: 6 });
    expect(fit.atZero).toContain('b11');
    expect(fit.k1).toBeNull();
    expect(fit.beta).toBeNull();
    expect(fit.outcome).toBe('notIdentified');
    expect(fit.standardErrors.b11).toBeNull();
  });

  it('reports every start and how many found the best', () => {
    const fit = fitPlain(wiggle(simulate(SYSTEM, [50, 20], 36)), { starts: 5 });
    expect(fit.starts).toHaveLength(5);
    expect(fit.startsAtBest).toBeGreaterThanOrEqual(1);
    for (const start of fit.starts) if (start.rss !== null) expect(start.rss).toBeGreaterThan(0.99 * fit.rss);
  });

  it('refuses fewer counts than parameters', () => {
    expect(() => fitPlain({ times: [0, 1, 2], first: [1, 2, 3], second: [1, 2, 3] })).toThrow('8 counts');
  });
});
