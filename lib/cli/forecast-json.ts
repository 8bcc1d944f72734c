/**
 * What `elbowroom forecast FILE --json` prints: exactly one object, on one line, of one of these two shapes.
 * Months are "2024-03"; users are plain counts; shares and odds are fractions of 1. Fields may be added; none changes its meaning.
 */
import { z } from 'zod';
import { OUTCOMES } from '../forecast/outcomes';
import {
  bandsSchema,
  type FitReport,
  oddsSchema,
  type ParameterRow,
  startRowSchema,
} from '../forecast/report';
import { explainProblem } from '../series/explain';
import { addMonths, formatMonth } from '../series/month';
import type { MonthlySeries, SeriesProblem, SeriesReading } from '../series/types';
import { EXIT_CODES, type ExitId } from './exit-codes';

const month = z.string().regex(/^\d{4}-\d{2}$/);

const problemJsonSchema = z.object({
  code: z.string(),
  /** error: the cell, row or file is not used. warning: used, or kept as a gap. */
  severity: z.enum(['error', 'warning']),
  /** Row of the file as a spreadsheet shows it; null: the whole file. */
  row: z.number().int().nullable(),
  column: z.string().nullable(),
  value: z.string().nullable(),
  readings: z.array(z.string()).optional(),
  other: z.object({ row: z.number().int().nullable(), value: z.string() }).optional(),
  what: z.string(),
  why: z.string(),
  tryThis: z.string(),
});

const intervalJsonSchema = z.object({ median: z.number(), q05: z.number(), q95: z.number() });

export const forecastJsonSchema = z.object({
  focal: z.string(),
  rival: z.string(),
  /** The series as understood: consecutive months; null is a gap, 0 before the first count means not launched. */
  series: z.object({
    months: z.array(month),
    focal: z.array(z.number().nullable()),
    rival: z.array(z.number().nullable()),
  }),
  problems: z.array(problemJsonSchema),
  /** Chances of the four outcomes; they sum to 1. */
  odds: oddsSchema,
  /** The outcome whose chance passes 66 %; null: the data do not decide yet. */
  decided: z.enum(OUTCOMES).nullable(),
  /** Quantiles of future observations, one entry a month; `share` is the focal firm's. */
  forecast: z.object({ months: z.array(month), focal: bandsSchema, rival: bandsSchema, share: bandsSchema }),
  /**
   * Median and 90 % interval over the draws, natural units: r growth per month, k saturation level in users, alpha and beta the scaled
   * competition coefficients (how much of the focal firm's room a full rival takes, and the reverse), a12 and a21 the same per user.
   */
  parameters: z.object({
    r1: intervalJsonSchema,
    r2: intervalJsonSchema,
    k1: intervalJsonSchema,
    k2: intervalJsonSchema,
    alpha: intervalJsonSchema,
    beta: intervalJsonSchema,
    a12: intervalJsonSchema,
    a21: intervalJsonSchema,
  }),
  diagnostics: z.object({
    status: z.enum(['converged', 'not-converged']),
    /** Worst split R-hat of the watched quantities. */
    rhat: z.number().nullable(),
    /** Smallest bulk effective sample size of the watched quantities. */
    ess: z.number().nullable(),
    starts: z.array(startRowSchema),
  }),
  /** Time from opening the file to the finished outlook. */
  milliseconds: z.number().nonnegative(),
  seed: z.number().int(),
  engineVersion: z.string(),
});
export type ForecastJson = z.infer<typeof forecastJsonSchema>;

const errorIds = EXIT_CODES.map(({ id }) => id).filter((id) => id !== 'ok') as [ExitId, ...ExitId[]];

export const errorJsonSchema = z.object({
  error: z.object({ code: z.enum(errorIds), message: z.string(), problems: z.array(problemJsonSchema) }),
});
export type ErrorJson = z.infer<typeof errorJsonSchema>;

export function toForecastJson(
  reading: SeriesReading & { series: MonthlySeries },
  report: FitReport,
  milliseconds: number,
): ForecastJson {
  const { series, focalName, rivalName, problems } = reading;
  const { outlook, diagnostics } = report;
  const { focal, rival, share } = outlook.observations;
  const listMonths = (first: number, count: number) =>
    Array.from({ length: count }, (_, index) => formatMonth(addMonths(first, index)));
  return forecastJsonSchema.parse({
    focal: focalName,
    rival: rivalName,
    series: {
      months: listMonths(series.firstMonth, series.focal.length),
      focal: series.focal,
      rival: series.rival,
    },
    problems: problems.map(toProblemJson),
    odds: outlook.odds,
    decided: outlook.decided,
    forecast: { months: listMonths(outlook.firstMonth, outlook.horizonMonths), focal, rival, share },
    parameters: Object.fromEntries(report.parameters.map(toParameterJson)),
    diagnostics: {
      status: diagnostics.status,
      rhat: diagnostics.rHat,
      ess: diagnostics.ess,
      starts: diagnostics.starts,
    },
    milliseconds,
    seed: report.seed,
    engineVersion: report.engineVersion,
  });
}

export function toErrorJson(code: ExitId, message: string, problems: readonly SeriesProblem[]): ErrorJson {
  return errorJsonSchema.parse({ error: { code, message, problems: problems.map(toProblemJson) } });
}

function toProblemJson(problem: SeriesProblem) {
  return { ...problem, ...explainProblem(problem) };
}

function toParameterJson({ id, posterior }: ParameterRow): [string, z.infer<typeof intervalJsonSchema>] {
  return [id, { median: posterior.q50, q05: posterior.q05, q95: posterior.q95 }];
}
