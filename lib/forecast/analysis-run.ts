/**
 * Slower work on a fitted series, as a resumable run: each `next()` is a bounded slice and tells how far it is. No clock here; the
 * driver owns time and cancelling.
 */
import { z } from 'zod';
import type { DrawSet, FitInput } from '../estimate/types';
import type { FitReport } from './report';

/** Counted steps, without unit: what one step is belongs to the kind of analysis. */
export const analysisProgressSchema = z.object({
  done: z.number().int().nonnegative(),
  total: z.number().int().positive(),
});
export type AnalysisProgress = z.infer<typeof analysisProgressSchema>;

/** What an analysis reads: the series and options of a fit, and what that fit gave. */
export interface AnalysisInput extends FitInput {
  report: FitReport;
  draws: DrawSet;
}

export type AnalysisStep<Result, Failure extends string = string> =
  | { done: false; progress: AnalysisProgress }
  | { done: true; result: Result }
  /** An expected outcome without a result, by its code. */
  | { done: true; failure: Failure };

export interface AnalysisRun<Result, Failure extends string = string> {
  next(): AnalysisStep<Result, Failure>;
}

/** A generator that yields its progress and returns its end, as a run. */
export function runFromSteps<Result, Failure extends string>(
  steps: Generator<AnalysisProgress, { result: Result } | { failure: Failure }>,
): AnalysisRun<Result, Failure> {
  return {
    next() {
      const { done, value } = steps.next();
      return done ? { done: true, ...value } : { done: false, progress: value };
    },
  };
}
