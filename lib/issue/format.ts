/**
 * The issued forecast: an outlook with its data and scenario, frozen as plain JSON under a format version.
 * It stores numbers, not recipes, so it reads the same after the market, the engine or the words have changed.
 * A stored version is never rewritten: a new version gets a new reader here and the old reader stays.
 */
import { z } from 'zod';
import { backtestReportSchema } from '../forecast/backtest/report';
import { identifiabilityReportSchema } from '../forecast/identifiability/report';
import { fitReportSchema } from '../forecast/report';
import { answersSchema } from '../scenario/answers';
import { scenarioComparisonSchema } from '../scenario/comparison';
import { MAX_SIDE_BY_SIDE } from '../scenario/push-bounds';
import { pushesSchema } from '../scenario/push-schema';
import { trialSchema } from '../scenario/trial-draws';

export const ISSUE_FORMAT_VERSION = 1;

const count = z.number().nonnegative().nullable();

const marketSchema = z.object({
  name: z.string(),
  unit: z.string(),
  focalName: z.string(),
  rivalName: z.string(),
  measurementError: z.object({ focal: z.number().nonnegative(), rival: z.number().nonnegative() }).optional(),
});

const revisionSchema = z.object({
  number: z.number().int().positive(),
  createdAt: z.string().nullable(),
  fileName: z.string().nullable(),
});

const seriesSchema = z
  .object({ firstMonth: z.number().int(), focal: z.array(count), rival: z.array(count) })
  .refine((series) => series.focal.length === series.rival.length, {
    message: 'both firms must have the same number of months',
  });

const scenarioSchema = z.object({
  name: z.string(),
  pushes: pushesSchema,
  /** Money, where it was counted, is in here. */
  comparison: scenarioComparisonSchema,
  answers: answersSchema.optional(),
});
export type IssuedScenario = z.infer<typeof scenarioSchema>;

export const issuedForecastSchema = z.object({
  formatVersion: z.literal(ISSUE_FORMAT_VERSION),
  /** ISO 8601 with time zone. */
  issuedAt: z.iso.datetime({ offset: true }),
  /** Name of the person who issued it. */
  issuedBy: z.string(),
  market: marketSchema,
  revision: revisionSchema,
  /** As the fit saw it: months left out are gaps. */
  series: seriesSchema,
  /** Absent in forecasts issued before there were events. */
  events: z
    .array(z.object({ month: z.number().int(), note: z.string(), changesParameters: z.boolean() }))
    .optional(),
  /** Months that the fit did not see, with their counts. */
  leftOut: z
    .array(z.object({ month: z.number().int(), focal: count, rival: count, reason: z.string() }))
    .optional(),
  report: fitReportSchema,
  /** Absent in forecasts issued before there were backtests, or before theirs was done. */
  backtest: backtestReportSchema.optional(),
  /** Likewise. */
  identifiability: identifiabilityReportSchema.optional(),
  /** The one scenario of forecasts issued before there could be several; null since. */
  scenario: scenarioSchema.nullable(),
  /** Compared on the same draws. */
  scenarios: z.array(scenarioSchema).max(MAX_SIDE_BY_SIDE).optional(),
  /** Thinned draws. Their presence is the issuer's permission to move the sliders on the link; absent: frozen scenarios only. */
  trial: trialSchema.optional(),
});
export type IssuedForecast = z.infer<typeof issuedForecastSchema>;
