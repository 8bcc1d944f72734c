/**
 * What a scenario does against no push at all, on the same draws with common random numbers. Plain JSON: the page draws it,
 * an issued forecast freezes it. Firm 1 is the focal firm, firm 2 the rival; share is the focal firm's; users are plain counts.
 */
import { z } from 'zod';
import { bandsSchema, intervalSchema, oddsSchema } from '../forecast/report';
import { moneyResultSchema } from './money';
import { pushesSchema } from './push-schema';

const probability = z.number().min(0).max(1);

/** Quantiles per future month, each row `horizonMonths` long. */
export const scenarioBandsSchema = z.object({ focal: bandsSchema, rival: bandsSchema, share: bandsSchema });
export type ScenarioBands = z.infer<typeof scenarioBandsSchema>;

/** Who is left at the destination once the head start has been played out: chances over draws; they sum to 1. */
export const destinationsSchema = z.object({
  shared: probability,
  focalAlone: probability,
  rivalAlone: probability,
});
export type Destinations = z.infer<typeof destinationsSchema>;

export const EFFECT_REASONS = [
  'no-push', // nothing is pushed
  'temporary-fades', // temporary, and (almost) no draw lets the head start decide: the market returns
  'temporary-same-side', // temporary, the head start decides in some draws, and none is carried across the separatrix
  'temporary-crosses', // temporary, and in some draws carries the market across the separatrix
  'lasting-crosses', // lasting, and moves alpha or beta across 1 (or the market across the separatrix) in some draws
  'lasting-same-outcome', // lasting: the levels they settle at move, who is left does not
] as const;
export type EffectReason = (typeof EFFECT_REASONS)[number];

export const effectSchema = z.object({
  /** stays: who is left changes in fewer than STAYS_BELOW of draws; moves: in more than MOVES_ABOVE; may-move: between. */
  destination: z.enum(['moves', 'stays', 'may-move']),
  /** Share of draws in which who is left at the destination changes. */
  probabilityMoves: probability,
  reason: z.enum(EFFECT_REASONS),
  /** At least one push never ends. */
  isLasting: z.boolean(),
  /** Difference in the focal share at the destination, over draws; all 0 for a temporary push that moves nothing. */
  settledShareDifference: intervalSchema,
  /** Where the median difference in share is largest in size. `monthsAhead` counts from the last observed month. */
  worstShareDifference: z.object({
    monthsAhead: z.number().int().positive(),
    q05: z.number(),
    q50: z.number(),
    q95: z.number(),
  }),
  /** Months that the difference was followed for; may reach beyond the horizon. */
  followedMonths: z.number().int().positive(),
  /**
   * First month after the worst from which the median difference stays within half a point of share to the end of what was followed;
   * null: it does not come back by then, or never left.
   */
  backWithinHalfPointMonth: z.number().int().positive().nullable(),
  /** Half-life of return to the destination over draws, months; null when it cannot be told. */
  returnHalfLifeMonths: intervalSchema.nullable(),
});
export type ScenarioEffect = z.infer<typeof effectSchema>;

export const checkpointSchema = z.object({
  monthsAhead: z.number().int().positive(),
  /** Pushed minus baseline. */
  difference: z.object({ focal: intervalSchema, rival: intervalSchema, share: intervalSchema }),
  /** Underlying level under the pushes. */
  pushed: z.object({ focal: intervalSchema, rival: intervalSchema, share: intervalSchema }),
  baseline: z.object({ focal: intervalSchema, rival: intervalSchema, share: intervalSchema }),
});
export type Checkpoint = z.infer<typeof checkpointSchema>;

/** Draws in which the head start decides with and without the pushes, and how many of them end on the other side of the separatrix. */
export const crossingSchema = z.object({
  draws: z.number().int().nonnegative(),
  crossed: z.number().int().nonnegative(),
});
export type Crossing = z.infer<typeof crossingSchema>;

export const scenarioComparisonSchema = z.object({
  horizonMonths: z.number().int().positive(),
  draws: z.number().int().positive(),
  pushes: pushesSchema,
  /** Future observations without and with the pushes, from the same random numbers. */
  baseline: scenarioBandsSchema,
  pushed: scenarioBandsSchema,
  /** Underlying level with the pushes minus without, draw by draw. */
  difference: scenarioBandsSchema,
  /** At 6, 12 and 24 months, as far as the horizon reaches. */
  checkpoints: z.array(checkpointSchema),
  odds: z.object({ before: oddsSchema, after: oddsSchema }),
  destinations: z.object({ before: destinationsSchema, after: destinationsSchema }),
  effect: effectSchema,
  /** Absent in comparisons that were made before it was counted. */
  crossing: crossingSchema.optional(),
  /** Where money was assumed. */
  money: moneyResultSchema.optional(),
});
export type ScenarioComparison = z.infer<typeof scenarioComparisonSchema>;
