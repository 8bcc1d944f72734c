/** A backtest report in which a straight trend did better than the own model, for tests of words and of freezing. */
import type { BacktestReport, ScoreRow } from '@/lib/forecast/backtest/report';

export function scoreRow(
  method: ScoreRow['method'],
  error: number,
  crps: number,
  changes: Partial<ScoreRow> = {},
): ScoreRow {
  return {
    method,
    horizonMonths: 12,
    cases: 20,
    isComplete: true,
    absoluteLogError: Math.log1p(error),
    mase: 1.5,
    crps,
    intervalScore90: 0.5,
    coverage50: 0.5,
    coverage90: 0.9,
    ...changes,
  };
}

export function sampleBacktest(changes: Partial<BacktestReport> = {}): BacktestReport {
  return {
    engineVersion: '1',
    origins: { possible: 25, used: 10, failed: 0, firstTraining: 24, lastTraining: 36 },
    horizons: [12],
    scores: [scoreRow('competition', 0.058, 0.05), scoreRow('random-walk-drift', 0.031, 0.03)],
    comparisons: [
      {
        horizonMonths: 12,
        bestSimple: 'random-walk-drift',
        meanDifference: 0.02,
        statistic: 3,
        pValue: 0.012,
      },
    ],
    combination: null,
    ...changes,
  };
}
