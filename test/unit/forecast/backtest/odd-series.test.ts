/** Whatever a series holds, the backtest ends in short slices: with scores, or with the code of why there are none. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createBacktestRun } from '@/lib/forecast/backtest/backtest-run';
import { backtestReportSchema } from '@/lib/forecast/backtest/report';
import type { MonthlySeries } from '@/lib/series/types';
import { explainAnalysisFailure } from '@/lib/services/explain';
import { anySeries, driveInSlices, ODD_SERIES } from '../odd-series';
import { inputFor, knowingRun } from './backtest-cases';

/** With a stand-in for the fit, whose own slices are looked at in the test of the outlook run. */
function backtest(series: MonthlySeries): void {
  const end = driveInSlices(createBacktestRun(inputFor(series), knowingRun([0.05, 0.03])));
  if ('result' in end) backtestReportSchema.parse(end.result);
  else expect(explainAnalysisFailure('backtest', end.failure).what).toMatch(/^Past forecasts/);
}

describe('the backtest of any series', () => {
  it.each(ODD_SERIES)('%s: ends with scores or a code', (_, series) => backtest(series));

  it('whatever it holds: never throws, never gives a number that is none', () => {
    fc.assert(fc.property(anySeries, backtest), { numRuns: 40, seed: 2007 });
  });
});
