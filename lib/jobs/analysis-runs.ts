/** How each kind of analysis is made, and whether a fit that ended well starts it by itself. */
import type { AnalysisInput, AnalysisRun } from '../forecast/analysis-run';
import { createBacktestRun } from '../forecast/backtest/backtest-run';
import { createIdentifiabilityRun } from '../forecast/identifiability/identifiability-run';
import type { AnalysisKind, AnalysisResult } from '../store/analysis-kinds';

export type CreateAnalysisRun<Kind extends AnalysisKind = AnalysisKind> = (
  input: AnalysisInput,
) => AnalysisRun<AnalysisResult<Kind>>;

/** The kinds that a worker can make; each one is asked for when a fit has ended well, in this order. */
export type AnalysisRuns = { readonly [Kind in AnalysisKind]?: CreateAnalysisRun<Kind> };

export const ANALYSIS_RUNS = {
  identifiability: createIdentifiabilityRun,
  backtest: createBacktestRun,
} satisfies Required<AnalysisRuns>;
