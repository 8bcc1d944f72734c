/** Stand-ins for analyses: runs with a chosen number of slices that end with a small backtest report. */
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import type { AnalysisStep } from '@/lib/forecast/analysis-run';
import type { BacktestReport } from '@/lib/forecast/backtest/report';
import type { AnalysisRuns } from '@/lib/jobs/analysis-runs';

export const FAKE_BACKTEST: BacktestReport = {
  engineVersion: ENGINE_VERSION,
  origins: { possible: 9, used: 6, failed: 0, firstTraining: 24, lastTraining: 29 },
  horizons: [1],
  scores: (['competition', 'random-walk-drift'] as const).map((method, i) => ({
    method,
    horizonMonths: 1,
    cases: 12,
    isComplete: true,
    absoluteLogError: 0.03 + 0.01 * i,
    mase: 0.9,
    crps: 0.02 + 0.01 * i,
    intervalScore90: 0.2,
    coverage50: 0.5,
    coverage90: 1,
  })),
  comparisons: [
    {
      horizonMonths: 1,
      bestSimple: 'random-walk-drift',
      meanDifference: -0.01,
      statistic: -1.2,
      pValue: 0.28,
    },
  ],
  combination: null,
};

export interface FakeAnalysisOptions {
  slices: number;
  sliceMilliseconds?: number;
  onSlice?: (slice: number) => void;
  end?: () => AnalysisStep<BacktestReport>;
}

export function fakeAnalyses({
  slices,
  sliceMilliseconds = 0,
  onSlice,
  end,
}: FakeAnalysisOptions): AnalysisRuns {
  return {
    backtest: () => {
      let slice = 0;
      return {
        next() {
          slice += 1;
          onSlice?.(slice);
          const until = performance.now() + sliceMilliseconds;
          while (performance.now() < until);
          if (slice <= slices) return { done: false, progress: { done: slice, total: slices } };
          return end ? end() : { done: true, result: FAKE_BACKTEST };
        },
      };
    },
  };
}
