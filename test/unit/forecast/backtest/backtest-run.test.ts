/** The whole backtest with a stand-in for the fit, so that what it should find is known. */
import { describe, expect, it } from 'vitest';
import type { FitInput } from '@/lib/estimate/types';
import { createBacktestRun } from '@/lib/forecast/backtest/backtest-run';
import { type BacktestReport, backtestReportSchema, METHODS } from '@/lib/forecast/backtest/report';
import type { MonthlySeries } from '@/lib/series/types';
import { finish, inputFor, knowingRun, straightMarket } from './backtest-cases';

const TRUE_RATES: [number, number] = [0.05, 0.03];

function backtest(series: MonthlySeries, createRun = knowingRun(TRUE_RATES)): BacktestReport {
  const { end } = finish(createBacktestRun(inputFor(series), createRun));
  if (!('result' in end)) throw new Error(end.failure);
  return end.result;
}

const scoreOf = (report: BacktestReport, method: string, horizon: number) =>
  report.scores.find((row) => row.method === method && row.horizonMonths === horizon)!;

describe('a backtest', () => {
  it('gives a report that the store can keep, with every method at every horizon', () => {
    const report = backtest(straightMarket(48));
    expect(backtestReportSchema.parse(JSON.parse(JSON.stringify(report)))).toEqual(report);
    expect(report.horizons).toEqual([1, 3, 6, 12]);
    expect(report.origins).toEqual({
      possible: 25,
      used: 12,
      failed: 0,
      firstTraining: 24,
      lastTraining: 36,
    });
    for (const horizon of report.horizons)
      for (const method of METHODS) expect(scoreOf(report, method, horizon).cases).toBe(24);
  });

  it('reports every forecast of every origin, in order, and nothing beyond the total', () => {
    const { seen } = finish(createBacktestRun(inputFor(straightMarket(48)), knowingRun(TRUE_RATES)));
    const done = seen.map((progress) => progress.done);
    expect(done).toEqual([...done].sort((a, b) => a - b));
    expect(done[0]).toBe(0);
    expect(seen.every(({ total }) => total === 12 * METHODS.length)).toBe(true);
    expect(done.at(-1)).toBe(12 * METHODS.length);
  });

  it('finds the model better that knows the truth, and the trend better than a model that is wrong', () => {
    const series = straightMarket(60);
    const [right, wrong] = [backtest(series), backtest(series, knowingRun([0.1, -0.05]))];
    const difference = (report: BacktestReport) => report.comparisons.find((row) => row.horizonMonths === 6)!;
    expect(scoreOf(right, 'competition', 6).absoluteLogError).toBeLessThan(
      scoreOf(wrong, 'competition', 6).absoluteLogError,
    );
    expect(difference(wrong).meanDifference).toBeGreaterThan(0.1);
    expect(difference(wrong).pValue).toBeLessThan(0.01);
    expect(wrong.combination!.weights[0].weight).toBeLessThan(0.05);
    expect(right.combination!.weights[0].weight).toBeGreaterThan(wrong.combination!.weights[0].weight);
  });

  it('shows no later month to a forecast', () => {
    const seen: FitInput[] = [];
    const series = straightMarket(36);
    const run = knowingRun(TRUE_RATES);
    const before = backtest(series, (input) => {
      seen.push(input);
      return run(input);
    });
    expect(seen.map((input) => input.series.focal.length)).toEqual([19, 20, 21, 22, 23, 24]);
    // Spoiling the months after the last origin changes what is checked, never the spread of what was forecast.
    const spoilt = { ...series, focal: series.focal.map((count, t) => (t >= 30 ? count! * 3 : count)) };
    const after = backtest(spoilt, run);
    expect(scoreOf(after, 'random-walk-drift', 1)).toEqual(scoreOf(before, 'random-walk-drift', 1));
    expect(scoreOf(after, 'random-walk-drift', 12).crps).toBeGreaterThan(
      scoreOf(before, 'random-walk-drift', 12).crps,
    );
  });

  it('offers a combined forecast exactly where the combination scored better', () => {
    for (const rates of [TRUE_RATES, [0.07, 0.01], [0.1, -0.05]] as [number, number][]) {
      const { combination } = backtest(straightMarket(48), knowingRun(rates));
      expect(combination!.isBetter).toBe(combination!.crps < combination!.bestSingleCrps);
      expect(combination!.forecast !== null).toBe(combination!.isBetter);
      if (combination!.forecast) {
        const { q05, q50, q95 } = combination!.forecast.focal;
        expect(q50).toHaveLength(12);
        expect(q50.every((value, i) => value > q05[i] && value < q95[i])).toBe(true);
      }
    }
  });

  it('leaves gaps out of the score and goes on with one month missing', () => {
    const series = straightMarket(48);
    const gappy = { ...series, rival: series.rival.map((count, t) => (t % 9 === 4 ? null : count)) };
    const report = backtest(gappy);
    expect(scoreOf(report, 'competition', 1).cases).toBeLessThan(24);
    expect(report.scores.every((row) => Number.isFinite(row.crps))).toBe(true);
  });

  it('does not rank a method whose history is too short at some origin', () => {
    const report = backtest(straightMarket(24));
    expect(scoreOf(report, 'seasonal-naive', 6)).toMatchObject({ isComplete: false });
    expect(report.combination!.weights.map(({ method }) => method)).not.toContain('seasonal-naive');
  });

  it('is refused with a code where nothing can be said', () => {
    const short = finish(createBacktestRun(inputFor(straightMarket(14)), knowingRun(TRUE_RATES)));
    expect(short.end).toEqual({ done: true, failure: 'too-few-origins' });
    const { diagnostics } = inputFor(straightMarket(14)).report;
    const mute = () => ({ next: () => ({ done: true, failure: 'failed', diagnostics }) as const });
    expect(finish(createBacktestRun(inputFor(straightMarket(48)), mute)).end).toEqual({
      done: true,
      failure: 'too-few-forecasts',
    });
  });

  it('without any noise ends with scores that are numbers', () => {
    const report = backtest(straightMarket(48, 0));
    expect(JSON.stringify(report)).not.toContain('NaN');
    expect(scoreOf(report, 'random-walk-drift', 12).absoluteLogError).toBeLessThan(1e-6);
  });
});
