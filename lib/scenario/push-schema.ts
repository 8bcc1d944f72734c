/**
 * What a push may be when it comes from outside: a form, a stored scenario, a file. `lib/dynamics/push.ts` says what it does.
 * Months count from the last observed month; size is users per month for recruits, a fraction (0.2 = +20 %) for the other kinds.
 * Recruits may be given by what is spent on them: the size then follows (`spend.ts`), whatever size was written.
 */
import { z } from 'zod';
import {
  MAX_CARRY_OVER_HALF_LIFE,
  MAX_MONEY,
  MAX_PUSH_MONTHS,
  MAX_PUSHES,
  MAX_RECRUITS_PER_MONTH,
  MAX_RELATIVE_SIZE,
  PUSH_KINDS,
} from './push-bounds';
import { type SpendResponse, settleSize } from './spend';

const months = z.number().min(0).max(MAX_PUSH_MONTHS);

const spendResponseSchema = z.object({
  costPerRecruit: z.number().positive().max(MAX_MONEY),
  mostPerMonth: z.number().positive().max(MAX_RECRUITS_PER_MONTH).nullable(),
}) satisfies z.ZodType<SpendResponse>;

export const pushSchema = z
  .object({
    firm: z.union([z.literal(1), z.literal(2)]),
    kind: z.enum(PUSH_KINDS),
    startMonth: months,
    lengthMonths: months.nullable(),
    size: z.number().min(0).optional(),
    rampMonths: months,
    carryOverHalfLifeMonths: z.number().min(0).max(MAX_CARRY_OVER_HALF_LIFE),
    spendPerMonth: z.number().min(0).max(MAX_MONEY).optional(),
    response: spendResponseSchema.optional(),
  })
  .refine(({ response, kind }) => !response || kind === 'recruits', {
    path: ['response'],
    message: 'only recruits can be bought by a cost per recruit',
  })
  .refine(({ response, spendPerMonth }) => !response || spendPerMonth !== undefined, {
    path: ['spendPerMonth'],
    message: 'say how much is spent per month',
  })
  .refine(({ response, size }) => response || size !== undefined, {
    path: ['size'],
    message: 'say how large the push is',
  })
  .transform((push) => settleSize({ ...push, size: push.size ?? 0 }))
  .refine((push) => push.size <= (push.kind === 'recruits' ? MAX_RECRUITS_PER_MONTH : MAX_RELATIVE_SIZE), {
    path: ['size'],
    message: 'size is too large for this kind of push',
  });

export const pushesSchema = z.array(pushSchema).max(MAX_PUSHES);
