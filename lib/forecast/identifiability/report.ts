/**
 * What the data can and cannot tell, as plain JSON: the result of the analysis of identifiability. Firm 1 is the focal firm. A part is null
 * where it could not be computed. Users are plain counts, rates are per month, intervals of profiles are at 95 %.
 */
import { z } from 'zod';
import { OUTCOMES } from '../outcomes';

const probability = z.number().min(0).max(1);
const outcome = z.enum(OUTCOMES);
const parameter = z.enum(['r1', 'r2', 'k1', 'k2', 'alpha', 'beta']);
const known = z.enum(['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1Start', 'n2Start']);

/** Plain least squares with one kind of errors: what it says of the outcome. */
const verdictSchema = z.object({
  outcome: z.enum([...OUTCOMES, 'boundary', 'notIdentified']),
  /** null: does not exist in the best fit (a firm's growth does not bend). */
  alpha: z.number().nullable(),
  beta: z.number().nullable(),
  k1: z.number().nullable(),
  k2: z.number().nullable(),
});
export type Verdict = z.infer<typeof verdictSchema>;

export const profileSchema = z.object({
  quantity: z.enum(['alpha', 'beta', 'k1', 'k2']),
  /** null: infinite or undefined in the best fit. */
  estimate: z.number().nullable(),
  /** null: open, the data give no bound. A coefficient whose interval holds 0 ends there. */
  low: z.number().nullable(),
  high: z.number().nullable(),
});

const decisionRowSchema = z.object({
  months: z.number().int().positive(),
  decided: probability,
  sure: probability,
  effectiveDraws: z.number().nonnegative(),
  extrapolated: probability,
});

const sensitivityRowSchema = z.object({
  id: parameter,
  /** 90 % interval of the parameter. */
  low: z.number(),
  high: z.number(),
  elasticity: z.number(),
  shareAtLow: probability.nullable(),
  shareAtHigh: probability.nullable(),
  shareExplained: probability,
  oddsAtLow: probability,
  oddsAtHigh: probability,
  oddsElasticity: z.number(),
  oddsExplained: probability,
});
export type SensitivityRow = z.infer<typeof sensitivityRowSchema>;

const sensitivitySchema = z.object({
  horizonMonths: z.number().int().positive(),
  /** The outcome with the best odds, which the odds of the rows are of. */
  leading: outcome,
  leadingOdds: probability,
  rows: z.array(sensitivityRowSchema),
  /** odds is null where the leading outcome leaves nothing to learn. */
  learnFirst: z.object({ share: parameter, odds: parameter.nullable() }),
});
export type Sensitivity = z.infer<typeof sensitivitySchema>;

/** What one firm does to the other: takes room, leaves it alone, or gives it room. */
export const EFFECTS = ['takes', 'none', 'gives'] as const;
export type Effect = (typeof EFFECTS)[number];
export const SIGN_PATTERNS = [
  'competition',
  'oneSided',
  'predatorPrey',
  'mutualHelp',
  'oneSidedHelp',
  'none',
] as const;
export type SignPatternId = (typeof SIGN_PATTERNS)[number];

const signPatternSchema = z.object({
  /** Odds by what the rival does to the focal firm and the reverse. */
  cells: z.array(
    z.object({ onFocal: z.enum(EFFECTS), onRival: z.enum(EFFECTS), odds: probability, prior: probability }),
  ),
  patterns: z.array(z.object({ id: z.enum(SIGN_PATTERNS), odds: probability, prior: probability })),
  /** Median and 90 % interval of the signed coefficients. */
  alpha: z.object({ q05: z.number(), q50: z.number(), q95: z.number() }),
  beta: z.object({ q05: z.number(), q50: z.number(), q95: z.number() }),
  effectiveDraws: z.number().nonnegative(),
});
export type SignPattern = z.infer<typeof signPatternSchema>;

export const identifiabilityReportSchema = z.object({
  /** Best and 95 % profile interval, errors on the log scale. */
  profiles: z.array(profileSchema).nullable(),
  collinearity: z
    .object({
      /** null: infinite. */
      index: z.number().nullable(),
      isPoorlyTold: z.boolean(),
      weakest: z.array(z.object({ id: known, weight: z.number() })),
    })
    .nullable(),
  decision: z
    .object({ futures: z.number().int().nonnegative(), rows: z.array(decisionRowSchema) })
    .nullable(),
  sensitivity: sensitivitySchema.nullable(),
  signPattern: signPatternSchema.nullable(),
  errorScales: z
    .object({
      log: verdictSchema,
      raw: verdictSchema,
      /** Both say an outcome, and not the same. */
      disagree: z.boolean(),
    })
    .nullable(),
});
export type IdentifiabilityReport = z.infer<typeof identifiabilityReportSchema>;
