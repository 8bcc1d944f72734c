import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { DEFAULT_FIT_OPTIONS, ESS_LIMIT, R_HAT_LIMIT } from '@/lib/estimate/defaults';
import { readColumn } from '@/lib/estimate/draws';
import { createFitRun, type Fit } from '@/lib/estimate/fit-run';
import type { FitInput, FitProgress } from '@/lib/estimate/types';
import { quantiles } from '@/lib/numeric/quantile';
import { createStream } from '@/lib/numeric/random';
import type { MonthlySeries } from '@/lib/series/types';
import {
  COEXISTING,
  FIRST_MONTH,
  RIVAL_LOSES,
  simulateSeries,
  simulateWandering,
  type Truth,
  toTheta,
} from './simulated-market';

function runToEnd(series: MonthlySeries, options: Partial<FitInput['options']> = {}) {
  const run = createFitRun({ series, options: { ...DEFAULT_FIT_OPTIONS, ...options } });
  const progress: FitProgress[] = [];
  for (;;) {
    const step = run.next();
    if (step.done) return { ...step, progress };
    progress.push(step.progress);
  }
}

function fitOf(series: MonthlySeries, options: Partial<FitInput['options']> = {}): Fit {
  const end = runToEnd(series, options);
  if (!('fit' in end)) throw new Error(`no fit: ${end.failure.status}`);
  return end.fit;
}

const COLUMNS = { r1: 'r1', r2: 'r2', k1: 'k1', k2: 'k2', alpha: 'alpha', beta: 'beta' } as const;

/** Distance of the truth from the middle of the draws, in units of half their 98 % interval. */
function missesOf(fit: Fit, truth: Truth): number[] {
  return Object.keys(COLUMNS).map((column) => {
    const [low, middle, high] = quantiles(readColumn(fit.draws, column), [0.01, 0.5, 0.99]).map(Math.log);
    return Math.abs(Math.log(truth[column as keyof typeof COLUMNS]) - middle) / ((high - low) / 2);
  });
}

describe('a fit', () => {
  it('recovers the parameters of both error models within their intervals, and converges', () => {
    for (const [truth, errorModel] of [
      [COEXISTING, 'process-noise'],
      [RIVAL_LOSES, 'ar1'],
    ] as const) {
      const fit = fitOf(simulateSeries(truth, 48, 0.02, 1), { errorModel });
      expect(fit.status).toBe('converged');
      expect(fit.rHat).toBeLessThanOrEqual(R_HAT_LIMIT);
      expect(fit.ess).toBeGreaterThanOrEqual(ESS_LIMIT);
      // six 98 % intervals: each holds the truth but for a chance of one in fifty
      expect(Math.max(...missesOf(fit, truth))).toBeLessThan(1.2);
      expect(fit.starts.filter((start) => start.reachedBest).length).toBeGreaterThan(fit.starts.length / 2);
    }
  });

  it('gives the same numbers for the same seed, others for another', () => {
    const series = simulateSeries(RIVAL_LOSES, 24, 0.03, 4);
    const one = fitOf(series, { seed: 5 });
    expect(fitOf(series, { seed: 5 }).draws.values).toEqual(one.draws.values);
    expect(fitOf(series, { seed: 6 }).draws.values).not.toEqual(one.draws.values);
  });

  it('tells true progress that never goes back', () => {
    const { progress } = runToEnd(simulateSeries(COEXISTING, 30, 0.03, 1));
    const order = ['starts', 'polish', 'warm-up', 'sampling'];
    for (let i = 1; i < progress.length; i++) {
      expect(order.indexOf(progress[i].stage)).toBeGreaterThanOrEqual(order.indexOf(progress[i - 1].stage));
      expect(progress[i].startsDone).toBeGreaterThanOrEqual(progress[i - 1].startsDone);
      expect(progress[i].drawsKept).toBeGreaterThanOrEqual(progress[i - 1].drawsKept);
    }
    expect(progress.some(({ rHat, ess }) => rHat !== null && ess !== null)).toBe(true);
  });

  it('finds process noise where there is some, and little where there is none', () => {
    const noiseOf = (series: MonthlySeries) => quantiles(readColumn(fitOf(series).draws, 'noise1'), [0.5])[0];
    expect(noiseOf(simulateWandering(COEXISTING, 60, 0.01, 0.04, 2))).toBeGreaterThan(0.025);
    expect(noiseOf(simulateSeries(COEXISTING, 60, 0.04, 2))).toBeLessThan(0.01);
  });
});

describe('what a series may hold besides', () => {
  const base = simulateSeries(COEXISTING, 48, 0.02, 3);
  const cycle = (t: number) => 0.12 * Math.cos((2 * Math.PI * (t - 3)) / 12);

  it('a yearly cycle is found and measured; none is found in a series without', () => {
    const focal = base.focal.map((count, t) => Math.round(count! * Math.exp(cycle(t))));
    const fit = fitOf({ ...base, focal });
    expect(fit.choice.harmonics).toBeGreaterThanOrEqual(1);
    for (const ahead of [1, 4, 9]) {
      const [offset] = quantiles(readColumn(fit.draws, `season1m${ahead}`), [0.5]);
      // 48 counts of sd 0.02 fix two coefficients to 0.004
      expect(Math.abs(offset - cycle(47 + ahead))).toBeLessThan(0.02);
    }
    expect(fitOf(base).choice.harmonics).toBe(0);
  });

  const before = simulateSeries(COEXISTING, 30, 0.02, 5);
  const broken = (after: MonthlySeries): MonthlySeries => {
    const join = (a: (number | null)[], b: (number | null)[]) => [...a, ...b.slice(1)];
    return { ...before, focal: join(before.focal, after.focal), rival: join(before.rival, after.rival) };
  };
  const changed: Truth = {
    ...COEXISTING,
    k1: 4e5,
    alpha: 1.3,
    n1: before.focal[29]!,
    n2: before.rival[29]!,
  };

  it('one break is found in its month; none in a series without', () => {
    const fit = fitOf(broken(simulateSeries(changed, 25, 0.02, 6)));
    expect(fit.choice.breakChance).toBeGreaterThan(0.9);
    const [month] = quantiles(readColumn(fit.draws, 'breakMonth'), [0.5]);
    expect(Math.abs(month - 29)).toBeLessThanOrEqual(3);
    // the parameters in force now are those after the break
    expect(quantiles(readColumn(fit.draws, 'k1'), [0.5])[0]).toBeLessThan(6e5);
    expect(fitOf(base).choice.breakChance).toBeLessThan(0.2);
  });

  it('a spike is flagged and hardly moves the fit; a clean series has no flag', () => {
    const focal = base.focal.map((count, t) => (t === 20 ? 2 * count! : count));
    const spiked = fitOf({ ...base, focal });
    const clean = fitOf(base);
    expect(spiked.choice.flags).toEqual([{ firm: 1, month: 20 }]);
    expect(clean.choice.flags).toEqual([]);
    const middle = (fit: Fit) => quantiles(readColumn(fit.draws, 'k1'), [0.5])[0];
    expect(Math.abs(middle(spiked) / middle(clean) - 1)).toBeLessThan(0.05);
  });

  it('gaps and a late launch are no errors', () => {
    const focal = base.focal.map((count, t) => (t % 5 === 2 ? null : count));
    const late = base.rival.map((count, t) => (t < 9 ? 0 : count));
    const fit = fitOf({ ...base, focal, rival: late });
    expect(fit.observations.firms[1].entry).toBe(9);
    expect(fit.draws.values.every(Number.isFinite)).toBe(true);
    expect(quantiles(readColumn(fit.draws, 'r2'), [0.5])[0]).toBeGreaterThan(0.05);
  });
});

describe('a marked month', () => {
  const FALLEN: Truth = { ...COEXISTING, k1: 2.5e5, alpha: 1.3 };
  const MARK = 30;
  const join = (a: (number | null)[], b: (number | null)[]) => [...a, ...b.slice(1)];
  /** Other parameters from month MARK on, seen for `further` months. */
  function changedAtMark(further: number): MonthlySeries {
    const before = simulateSeries(COEXISTING, MARK, 0.02, 5);
    const last = { n1: before.focal[MARK - 1]!, n2: before.rival[MARK - 1]! };
    const after = simulateSeries({ ...FALLEN, ...last }, further + 1, 0.02, 6);
    return { ...before, focal: join(before.focal, after.focal), rival: join(before.rival, after.rival) };
  }
  const markedAt = (month: number) => ({ changeMonths: [FIRST_MONTH + month] });

  it('is where parameters changed, if they did: the month is known and the later ones are in force', () => {
    const fit = fitOf(changedAtMark(24), markedAt(MARK - 1));
    const [mark] = fit.choice.markedBreaks;
    expect([fit.choice.markedBreaks.length, mark.month]).toEqual([1, MARK - 1]);
    expect(mark.chance).toBeGreaterThan(0.66);
    const months = readColumn(fit.draws, 'breakMonth');
    expect(months.filter((month) => month === mark.month).length / months.length).toBeGreaterThan(0.6);
    expect(Math.max(...missesOf(fit, FALLEN))).toBeLessThan(1.2);
  });

  it('is believed less where nothing changed, and costs little there', () => {
    const series = simulateSeries(COEXISTING, 48, 0.02, 3);
    const fit = fitOf(series, markedAt(24));
    expect(fit.choice.markedBreaks[0].chance).toBeLessThan(0.4);
    expect(Math.max(...missesOf(fit, COEXISTING))).toBeLessThan(1.2);
  });

  it('near the end, where an unmarked break could not be told, opens the outlook to both', () => {
    const series = changedAtMark(3);
    const [plain, marked] = [fitOf(series), fitOf(series, markedAt(MARK - 1))];
    expect(plain.choice.markedBreaks).toEqual([]);
    expect(marked.choice.markedBreaks[0].chance).toBeGreaterThan(0.25);
    const widthOf = (fit: Fit) => {
      const [low, high] = quantiles(readColumn(fit.draws, 'k1'), [0.05, 0.95]);
      return Math.log(high / low);
    };
    expect(widthOf(marked)).toBeGreaterThan(widthOf(plain));
  });

  it('outside the series changes no number', () => {
    const series = simulateSeries(RIVAL_LOSES, 24, 0.03, 4);
    const outside = { changeMonths: [FIRST_MONTH, FIRST_MONTH - 5, FIRST_MONTH + 24] };
    expect(fitOf(series, outside).draws.values).toEqual(fitOf(series).draws.values);
  });
});

describe('a firm that has left', () => {
  const path = createTrajectory({ months: 40, entry1: 0, entry2: 0, exit2: 28 });
  path.run(toTheta(COEXISTING));
  const stream = createStream(3, 0);
  const observed = (logLevel: Float64Array) =>
    Array.from(logLevel, (value) => Math.round(Math.exp(value + 0.02 * stream.normal())));
  const series: MonthlySeries = {
    firstMonth: FIRST_MONTH,
    focal: observed(path.logLevel1),
    rival: observed(path.logLevel2),
  };

  it.each(['process-noise', 'ar1'] as const)(
    'is no error of the fit, %s: the truth is found',
    (errorModel) => {
      const fit = fitOf(series, { errorModel });
      expect(fit.observations.firms.map(({ exit }) => exit)).toEqual([undefined, 28]);
      expect(fit.status).toBe('converged');
      expect(Math.max(...missesOf(fit, COEXISTING))).toBeLessThan(1.2);
      expect(new Set(readColumn(fit.draws, 'n2'))).toEqual(new Set([0]));
      // alone the firm shows its saturation level well
      const [low, high] = quantiles(readColumn(fit.draws, 'k1'), [0.05, 0.95]);
      expect(Math.log(high / low)).toBeLessThan(0.3);
    },
  );

  it('teaches more of the other one than if its zeros were gaps', () => {
    const widthOf = (rival: (number | null)[]) => {
      const [low, high] = quantiles(readColumn(fitOf({ ...series, rival }).draws, 'k1'), [0.05, 0.95]);
      return Math.log(high / low);
    };
    const gaps = series.rival.map((count) => count || null);
    expect(widthOf([...series.rival])).toBeLessThan(widthOf(gaps));
  });
});

describe('a series that cannot be fitted', () => {
  it('ends with a status, at once', () => {
    const short = { firstMonth: 0, focal: [1, 2, 3], rival: [3, 2, 1] };
    expect(runToEnd(short)).toMatchObject({ done: true, failure: { status: 'too-short' } });
    const absent = { firstMonth: 0, focal: new Array(30).fill(0), rival: new Array(30).fill(8) };
    expect(runToEnd(absent)).toMatchObject({ done: true, failure: { status: 'no-usable-data' } });
  });
});
