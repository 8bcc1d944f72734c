/**
 * What a push may be when it comes from outside: a form, a stored scenario, a file. `lib/dynamics/push.ts` says what it does.
 * Months count from the last observed month; size is users per month for recruits, a fraction (0.2 = +20 %) for the other kinds.
 */
import { z } from 'zod';
import type { Push } from '../dynamics/push';
import {
  MAX_CARRY_OVER_HALF_LIFE,
  MAX_PUSH_MONTHS,
  MAX_PUSHES,
  MAX_RECRUITS_PER_MONTH,
  MAX_RELATIVE_SIZE,
  PUSH_KINDS,
} from './push-bounds';

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
