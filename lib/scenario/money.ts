/**
 * What a scenario is worth to a firm: margin on the user-months it gains against no push, less what its own pushes cost, both
 * discounted to the last observed month. Over the months h = 1 .. H, draw by draw,
 *
 *   value = sum of (m (N(h) - N0(h)) - s(h)) / (1 + d)^(h/12)
 *
 * with m the margin per user-month, N and N0 the underlying levels with and without the pushes, s(h) the money spent from month
 * h - 1 to h, d the discount rate per year. Margins of users beyond H are not counted.
 */
import { z } from 'zod';
import { intervalSchema } from '../forecast/report';
import { MAX_CURRENCY_LENGTH, MAX_DISCOUNT_RATE, MAX_MONEY, MAX_PUSH_MONTHS } from './push-bounds';

const margin = z.number().min(0).max(MAX_MONEY);

/** What has to be assumed to count money. */
export const moneySchema = z.object({
  /** A label, nothing is converted. */
  currency: z.string().trim().min(1).max(MAX_CURRENCY_LENGTH),
  /** Money earned per user and month; the rival's is often unknown. */
  marginPerUserMonth: z.object({ focal: margin, rival: margin.nullable() }),
  /** 0.1 = 10 % a year. */
  discountRatePerYear: z.number().min(0).max(MAX_DISCOUNT_RATE),
  /** Months over which value is counted; null: as far as the forecast reaches. */
  months: z.number().int().min(1).max(MAX_PUSH_MONTHS).nullable(),
});
export type Money = z.infer<typeof moneySchema>;

const probability = z.number().min(0).max(1);

export const firmMoneySchema = z.object({
  /** Discounted spend of the firm's own pushes within the months counted: the same in every draw. */
  spend: z.number().nonnegative(),
  /** Discounted margin gained (negative: lost), over draws. */
  gain: intervalSchema,
  /** gain - spend. */
  value: intervalSchema,
  /** Mean of the value over draws. */
  expectedValue: z.number(),
  chancePositive: probability,
  /**
   * Months from the first money spent until the discounted sums stay positive to the end of the months counted, over the draws in
   * which they do; null when the firm spends nothing, or (almost) no draw pays back.
   */
  paybackMonths: intervalSchema.nullable(),
});
export type FirmMoney = z.infer<typeof firmMoneySchema>;

export const moneyResultSchema = z.object({
  assumed: moneySchema,
  /** Months over which value was counted. */
  months: z.number().int().positive(),
  focal: firmMoneySchema,
  /** Null when the rival's margin is not given. */
  rival: firmMoneySchema.nullable(),
  /** What the focal firm's own pushes are worth, the rival's being as they are; null unless both firms push. */
  focalAnswer: firmMoneySchema.nullable(),
});
export type MoneyResult = z.infer<typeof moneyResultSchema>;
