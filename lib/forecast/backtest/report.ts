/**
 * The result of a backtest as plain JSON: what the store keeps, the brief reads and an issued forecast freezes.
 * Errors and scores are of ln users unless said otherwise, so both firms count alike; lower is better.
 */
import { z } from 'zod';

/** The model of this app, then the simple methods. */
export const METHODS = [
  'competition',
  'random-walk-drift',
  'seasonal-naive',
  'independent-logistic',
  'damped-trend',
] as const;
export type Method = (typeof METHODS)[number];
export const SIMPLE_METHODS = METHODS.slice(1) as Exclude<Method, 'competition'>[];

const probability = z.number().min(0).max(1);
const methodSchema = z.enum(METHODS);
const row = z.array(z.number());

/** How one method did over all origins and both firms at one horizon. */
export const scoreRowSchema = z.object({
  method: z.enum([...METHODS, 'combination']),
  horizonMonths: z.number().int().positive(),
  /** Forecasts scored: origins times firms, less months that were not observed. */
  cases: z.number().int().positive(),
  /** It gave a forecast wherever the own model did. Only such methods are ranked and combined. */
  isComplete: z.boolean(),
  /** Mean absolute error of the median, ln users. */
  absoluteLogError: z.number(),
  /** In users, against the mean change from month to month in the training months (m = 1); null: nothing changed there. */
  mase: z.number().nullable(),
  crps: z.number(),
  intervalScore90: z.number(),
  coverage50: probability,
  coverage90: probability,
});
export type ScoreRow = z.infer<typeof scoreRowSchema>;

/** The own model against the best simple method at one horizon (Diebold-Mariano on CRPS, two-sided). */
export const comparisonSchema = z.object({
  horizonMonths: z.number().int().positive(),
  /** The complete simple method with the lowest CRPS. */
  bestSimple: methodSchema,
  /** CRPS of the own model less that of the best simple method; negative: the own model is better. */
  meanDifference: z.number(),
  statistic: z.number().nullable(),
  /** null: the origins overlap too much to tell. */
  pValue: probability.nullable(),
});
export type Comparison = z.infer<typeof comparisonSchema>;

/** Quantiles of future observations, users, one entry a month from the first forecast month. */
const combinedBandsSchema = z.object({ q05: row, q25: row, q50: row, q75: row, q95: row });

export const combinationSchema = z.object({
  /** Non-negative, they add to 1. */
  weights: z.array(z.object({ method: methodSchema, weight: probability })),
  /** Mean CRPS over all cases with weights learnt without the origin that is scored. */
  crps: z.number(),
  /** The best single method in hindsight. */
  bestSingle: methodSchema,
  bestSingleCrps: z.number(),
  /** It scored better than every single method: only then there is a forecast. */
  isBetter: z.boolean(),
  forecast: z.object({ focal: combinedBandsSchema, rival: combinedBandsSchema }).nullable(),
});
export type Combination = z.infer<typeof combinationSchema>;

export const backtestReportSchema = z.object({
  engineVersion: z.string(),
  origins: z.object({
    /** Months from which a forecast of the longest horizon could be checked. */
    possible: z.number().int().nonnegative(),
    used: z.number().int().positive(),
    /** Origins at which the own model gave no forecast. */
    failed: z.number().int().nonnegative(),
    /** Months of training at the first and the last used origin. */
    firstTraining: z.number().int(),
    lastTraining: z.number().int(),
  }),
  /** Ascending; the last one is the longest that the series allows. */
  horizons: z.array(z.number().int().positive()).min(1),
  scores: z.array(scoreRowSchema),
  comparisons: z.array(comparisonSchema),
  /** null: fewer than two methods could be combined. */
  combination: combinationSchema.nullable(),
});
export type BacktestReport = z.infer<typeof backtestReportSchema>;
