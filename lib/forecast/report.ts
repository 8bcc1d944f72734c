/**
 * The result of a fit as plain JSON: what the store keeps, the command line prints, the brief reads and an issued forecast freezes.
 * Firm 1 is the focal firm, firm 2 the rival. Months are integers (year * 12 + month - 1); users are plain counts.
 */
import { z } from 'zod';
import { addressableSchema, priorSettingsSchema } from '../estimate/prior-schema';
import { OUTCOMES } from './outcomes';

const probability = z.number().min(0).max(1);
const row = z.array(z.number());

/** Shares of draws; they sum to 1. */
export const oddsSchema = z.object({
  coexistence: probability,
  exclusionByFocal: probability,
  exclusionByRival: probability,
  headStartDecides: probability,
});
export type Odds = z.infer<typeof oddsSchema>;

/** Quantiles per future month, each row `horizonMonths` long. */
export const bandsSchema = z.object({ q05: row, q25: row, q50: row, q75: row, q95: row });
export type Bands = z.infer<typeof bandsSchema>;

export const seriesBandsSchema = z.object({
  focal: bandsSchema,
  rival: bandsSchema,
  total: bandsSchema,
  share: bandsSchema,
});
export type SeriesBands = z.infer<typeof seriesBandsSchema>;

/** Median and 90 % interval. null stands for "runs off to infinity / not identified". */
export const intervalSchema = z.object({ q05: z.number(), q50: z.number(), q95: z.number() });
export type Interval = z.infer<typeof intervalSchema>;

/** When something happens: chance that it ever does within the search window, and the month interval given that it does. */
export const milestoneSchema = z.object({
  id: z.enum(['overtaking', 'nearDestination']),
  /** Chance that it happens within `windowMonths` after the last observed month. */
  chance: probability,
  windowMonths: z.number(),
  /** Months after the last observed month, given that it happens; null when (almost) no draw gets there. */
  monthsAhead: intervalSchema.nullable(),
});
export type Milestone = z.infer<typeof milestoneSchema>;

export const outlookSchema = z.object({
  horizonMonths: z.number().int().positive(),
  /** First forecast month. */
  firstMonth: z.number().int(),
  odds: oddsSchema,
  /** The same odds from the prior alone. */
  priorOdds: oddsSchema,
  /** The outcome whose odds pass DECIDED_ABOVE (0.66), else null: the data do not decide yet. */
  decided: z.enum(OUTCOMES).nullable(),
  /** Given that the head start decides: chance that the focal firm is on its own winning side now. null when such draws are too few. */
  headStartFocalAhead: probability.nullable(),
  /** Future observations (measurement error included). */
  observations: seriesBandsSchema,
  /** The underlying level (no measurement error). */
  levels: seriesBandsSchema,
  /** Users of both firms and share at the destination, over draws. */
  destination: z.object({ focal: intervalSchema, rival: intervalSchema, share: intervalSchema }),
  /** Half-life of return to the destination, months: ln 2 / slowest |eigenvalue|. */
  returnHalfLifeMonths: intervalSchema.nullable(),
  overtaking: milestoneSchema.extend({
    /** Who overtakes: the firm behind in the last observed month. */
    overtaker: z.enum(['focal', 'rival']),
  }),
  nearDestination: milestoneSchema,
});
export type Outlook = z.infer<typeof outlookSchema>;

/** One parameter as the data leave it, with what was believed before. */
export const parameterRowSchema = z.object({
  id: z.enum(['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'a12', 'a21']),
  posterior: intervalSchema,
  prior: intervalSchema,
  /** 1 - var(posterior of ln)/var(prior of ln), clipped to [0, 1]: 0 the data taught nothing. */
  contraction: probability,
});
export type ParameterRow = z.infer<typeof parameterRowSchema>;

/** What the data cannot tell; `lib/brief` says it in words. */
export const unknownSchema = z.object({
  code: z.enum([
    'saturation-unseen', // firm's series has not bent: its saturation level is a guess
    'competition-unidentified', // the coefficient hardly moved from its prior
    'short-series',
    'share-only', // the two series add to a constant
    'prior-conflict', // posterior sits far in the tail of the prior
    'persistent-errors', // residuals persist strongly: the months are fewer than they look
    'flat-incumbent', // firm only falls in the window: own crowding b_ii cannot be told from 0
    'late-launch',
    'not-converged',
  ]),
  firm: z.union([z.literal(1), z.literal(2)]).nullable(),
  parameter: z.string().nullable(),
});
export type Unknown = z.infer<typeof unknownSchema>;

export const startRowSchema = z.object({
  origin: z.enum(['gradient-matching', 'leslie', 'latin-hypercube']),
  /** Penalised objective after the fit, or null when it failed. */
  value: z.number().nullable(),
  reachedBest: z.boolean(),
  iterations: z.number().int(),
  /** Reason for stopping, an id of the termination table in lib/numeric. */
  stopped: z.string(),
});

export const diagnosticsSchema = z.object({
  status: z.enum(['converged', 'not-converged', 'too-short', 'no-usable-data', 'failed']),
  rHat: z.number().nullable(),
  ess: z.number().nullable(),
  chains: z.number().int(),
  drawsKept: z.number().int(),
  evaluations: z.number().int(),
  starts: z.array(startRowSchema),
  startsAtBest: z.number().int(),
  /** Condition number of the scaled Jacobian at the best point. */
  conditionNumber: z.number().nullable(),
});
export type Diagnostics = z.infer<typeof diagnosticsSchema>;

/** The best single point, natural units. */
export const pointFitSchema = z.object({
  r1: z.number(),
  r2: z.number(),
  k1: z.number(),
  k2: z.number(),
  alpha: z.number(),
  beta: z.number(),
  n1Start: z.number(),
  n2Start: z.number(),
  /** Users at the last observed month on the fitted path. */
  n1Last: z.number(),
  n2Last: z.number(),
});
export type PointFit = z.infer<typeof pointFitSchema>;

/** Error parameters over draws. */
export const errorsSchema = z.object({
  /** sd of ln users, per firm. */
  focal: intervalSchema,
  rival: intervalSchema,
  /** Month-to-month correlation of the errors, per firm. */
  persistenceFocal: intervalSchema,
  persistenceRival: intervalSchema,
});

/** Fitted level in each observed month (median and 90 % interval over draws), null before a launch. */
export const historySchema = z.object({
  focal: z.array(intervalSchema.nullable()),
  rival: z.array(intervalSchema.nullable()),
});

/** What the series was found to hold besides growth and competition. Months are calendar months. */
export const structureSchema = z.object({
  /** Harmonics of a yearly cycle in use; 0: none was found. */
  seasonHarmonics: z.union([z.literal(0), z.literal(1), z.literal(2), z.literal(6)]),
  /** Chance that rates and levels jumped once within the series. */
  breakChance: probability,
  /** Month in which they did, given that they did; null when too few draws have a break. */
  breakMonth: intervalSchema.nullable(),
  /** A firm that has left: from this month on it has no users. Absent: both are there. */
  exit: z.object({ firm: z.union([z.literal(1), z.literal(2)]), month: z.number().int() }).optional(),
  /** Months that somebody marked, with the chance that parameters jumped in each; absent: none was marked. */
  markedBreaks: z.array(z.object({ month: z.number().int(), chance: probability })).optional(),
  /** Single counts that the fit could not believe and nearly ignored. */
  flaggedCounts: z.array(z.object({ firm: z.union([z.literal(1), z.literal(2)]), month: z.number().int() })),
});
export type Structure = z.infer<typeof structureSchema>;

/** A thinned set of draws for the maps (at most CLOUD_SIZE): coefficients and where each draw ends. */
export const cloudSchema = z.array(
  z.object({
    alpha: z.number(),
    beta: z.number(),
    outcome: z.enum(OUTCOMES),
    /** Users at the destination that this draw reaches from the last observed state. */
    n1End: z.number(),
    n2End: z.number(),
  }),
);
export type Cloud = z.infer<typeof cloudSchema>;

/** status usable: everything is there. */
export const fitReportSchema = z.object({
  engineVersion: z.string(),
  seed: z.number().int(),
  errorModel: z.enum(['ar1', 'process-noise']),
  months: z.number().int(),
  diagnostics: diagnosticsSchema,
  point: pointFitSchema,
  parameters: z.array(parameterRowSchema),
  errors: errorsSchema,
  history: historySchema,
  /** Absent in results of engine versions before 0.3. */
  structure: structureSchema.optional(),
  /** What was believed before the counts; absent: the usual settings of the time. */
  beliefs: z.object({ priors: priorSettingsSchema, addressable: addressableSchema.nullable() }).optional(),
  outlook: outlookSchema,
  cloud: cloudSchema,
  unknowns: z.array(unknownSchema),
});
export type FitReport = z.infer<typeof fitReportSchema>;
