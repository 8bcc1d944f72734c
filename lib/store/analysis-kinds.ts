/** The kinds of analysis and what each gives. `lib/jobs/analysis-runs.ts` has how each is made. */
import type { z } from 'zod';
import { backtestReportSchema } from '../forecast/backtest/report';
import { identifiabilityReportSchema } from '../forecast/identifiability/report';

const RESULTS = {
  backtest: backtestReportSchema,
  identifiability: identifiabilityReportSchema,
} satisfies Record<string, z.ZodType>;

export type AnalysisKind = keyof typeof RESULTS;
export type AnalysisResult<Kind extends AnalysisKind = AnalysisKind> = z.infer<(typeof RESULTS)[Kind]>;

export function isAnalysisKind(text: string): text is AnalysisKind {
  return Object.hasOwn(RESULTS, text);
}

export function analysisResultSchema<Kind extends AnalysisKind>(kind: Kind): z.ZodType<AnalysisResult<Kind>> {
  return RESULTS[kind] as unknown as z.ZodType<AnalysisResult<Kind>>;
}
