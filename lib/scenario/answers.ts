/**
 * Answers that a push must give, as plain JSON: a page shows them, an issued forecast freezes them. `target`: a firm keeps a share of at
 * least `share` in month `month` with a chance of at least `chance`, over the draws, for the underlying level without measurement error.
 */
import { z } from 'zod';
import { intervalSchema } from '../forecast/report';
import { moneySchema } from './money';
import { MAX_PUSH_MONTHS } from './push-bounds';
import { pushSchema } from './push-schema';

const probability = z.number().min(0).max(1);
const month = z.number().min(0).max(MAX_PUSH_MONTHS);

export const targetSchema = z.object({
  /** Whose share: 1 focal, 2 rival. */
  firm: z.union([z.literal(1), z.literal(2)]),
  /** Share to be kept, a fraction between 0 and 1. */
  share: z.number().gt(0).lt(1),
  /** Months after the last observed one. */
  month: z.number().int().min(1).max(MAX_PUSH_MONTHS),
  chance: z.number().gt(0).lt(1),
});
export type Target = z.infer<typeof targetSchema>;

/** How well a push does: chance that the target share is kept, and the share that is kept with the wished chance. */
const reachSchema = z.object({ chance: probability, shareKept: probability });
export type Reach = z.infer<typeof reachSchema>;

export const smallestPushSchema = z.discriminatedUnion('code', [
  /** `push` meets the target, 2 % less does not. */
  z.object({ code: z.literal('found'), target: targetSchema, push: pushSchema, reach: reachSchema }),
  /** The target is met without it. */
  z.object({ code: z.literal('not-needed'), target: targetSchema, reach: reachSchema }),
  /** `push` is the largest that was looked at, and the best that can be had. */
  z.object({ code: z.literal('no-size-does'), target: targetSchema, push: pushSchema, reach: reachSchema }),
]);
export type SmallestPush = z.infer<typeof smallestPushSchema>;

export const lastUsefulMonthSchema = z.discriminatedUnion('code', [
  /** The push still meets the target when it starts in `startMonth`, and in no later month. */
  z.object({
    code: z.literal('found'),
    target: targetSchema,
    push: pushSchema,
    startMonth: month,
    reach: reachSchema,
  }),
  z.object({ code: z.literal('not-needed'), target: targetSchema, push: pushSchema, reach: reachSchema }),
  /** `startMonth` is the month that gives the best chance. */
  z.object({
    code: z.literal('no-month-does'),
    target: targetSchema,
    push: pushSchema,
    startMonth: month,
    reach: reachSchema,
  }),
]);
export type LastUsefulMonth = z.infer<typeof lastUsefulMonthSchema>;

export const chanceMapSchema = z.object({
  target: targetSchema,
  /** The push of which size and start are varied. */
  push: pushSchema,
  /** Ascending. */
  sizes: z.array(z.number().nonnegative()).min(1),
  startMonths: z.array(month).min(1),
  /** chances[i][j]: sizes[i] started in startMonths[j]. */
  chances: z.array(z.array(probability)),
});
export type ChanceMap = z.infer<typeof chanceMapSchema>;

/** The push whose price was asked for, and what was assumed. */
const asked = { push: pushSchema, money: moneySchema };

export const breakEvenSchema = z.discriminatedUnion('code', [
  /** Up to this much money a month the expected value is not negative. */
  z.object({
    code: z.literal('found'),
    ...asked,
    spendPerMonth: z.number().nonnegative(),
    /** Over draws, for a push whose effect does not depend on what is spent; null where it does. */
    interval: intervalSchema.nullable(),
  }),
  /** Not even the first money comes back. */
  z.object({ code: z.literal('never-pays'), ...asked }),
  /** It pays at any spend that was looked at. */
  z.object({ code: z.literal('always-pays'), ...asked, spendPerMonth: z.number() }),
]);
export type BreakEven = z.infer<typeof breakEvenSchema>;

/** What an issued forecast keeps of the answers. */
export const answersSchema = z.object({
  smallestPush: smallestPushSchema.optional(),
  lastUsefulMonth: lastUsefulMonthSchema.optional(),
  chanceMap: chanceMapSchema.optional(),
  breakEven: breakEvenSchema.optional(),
});
export type Answers = z.infer<typeof answersSchema>;
