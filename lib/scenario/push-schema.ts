/**
 * What a push may be when it comes from outside: a form, a stored scenario, a file. `lib/dynamics/push.ts` says what it does.
 * Months count from the last observed month; size is users per month for recruits, a fraction (0.2 = +20 %) for the other kinds.
 */
import { z } from 'zod';
import type { Push } from '../dynamics/push';

export const PUSH_KINDS = ['recruits', 'growth-lift', 'pull', 'room'] as const;

/** Furthest month that a push may reach: ten years. */
export const MAX_PUSH_MONTHS = 120;
/** Largest relative push: six times as strong. */
export const MAX_RELATIVE_SIZE = 5;
/** Largest recruits per month: more than people live. */
export const MAX_RECRUITS_PER_MONTH = 1e10;
/** Longest carry-over half-life, months. */
export const MAX_CARRY_OVER_HALF_LIFE = 24;
/** Most pushes in one scenario. */
export const MAX_PUSHES = 12;

const months = z.number().min(0).max(MAX_PUSH_MONTHS);

export const pushSchema = z
  .object({
    firm: z.union([z.literal(1), z.literal(2)]),
    kind: z.enum(PUSH_KINDS),
    startMonth: months,
    lengthMonths: months.nullable(),
    size: z.number().min(0),
    rampMonths: months,
    carryOverHalfLifeMonths: z.number().min(0).max(MAX_CARRY_OVER_HALF_LIFE),
  })
  .refine((push) => push.size <= (push.kind === 'recruits' ? MAX_RECRUITS_PER_MONTH : MAX_RELATIVE_SIZE), {
    path: ['size'],
    message: 'size is too large for this kind of push',
  }) satisfies z.ZodType<Push>;

export const pushesSchema = z.array(pushSchema).max(MAX_PUSHES);
