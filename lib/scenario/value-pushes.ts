/** Counts the money of a scenario (`money.ts` has the formula) from the levels of the draws with and without pushes. */
import { intervalOf } from '../forecast/interval';
import type { FirmMoney, Money } from './money';
import type { PricedPush } from './spend';

/** Fewer draws than this share pay back: no months are told. */
const PAYS_BACK_AT_LEAST = 0.01;
const MONTHS_PER_YEAR = 12;

/** Factors 1 / (1 + d)^(h/12) of months h = 1 .. months. */
export function listDiscounts(ratePerYear: number, months: number): Float64Array {
  return Float64Array.from({ length: months }, (_, h) => (1 + ratePerYear) ** (-(h + 1) / MONTHS_PER_YEAR));
}

/** Part of each month (h - 1, h], h = 1 .. months, in which a push is on and costs money. */
export function listPaidMonths(
  push: Pick<PricedPush, 'startMonth' | 'lengthMonths'>,
  months: number,
): Float64Array {
  const end = push.lengthMonths === null ? Number.POSITIVE_INFINITY : push.startMonth + push.lengthMonths;
  return Float64Array.from({ length: months }, (_, h) =>
    Math.max(0, Math.min(h + 1, end) - Math.max(h, push.startMonth)),
  );
}

/** Money spent in months 1 .. months by the pushes of one firm. */
function listSpend(pushes: readonly PricedPush[], firm: 1 | 2, months: number): Float64Array {
  const spend = new Float64Array(months);
  for (const push of pushes) {
    if (push.firm !== firm || !push.spendPerMonth) continue;
    const paid = listPaidMonths(push, months);
    for (let h = 0; h < months; h++) spend[h]! += push.spendPerMonth * paid[h]!;
  }
  return spend;
}

export interface ValueInput {
  firm: 1 | 2;
  /** All pushes of the scenario; only the firm's own cost it money. */
  pushes: readonly PricedPush[];
  money: Money;
  /** Months over which value is counted. */
  months: number;
  draws: number;
  /** Levels of the firm, month-major: month h of draw i at (h - 1) draws + i. */
  pushed: Float64Array;
  baseline: Float64Array;
}

/** @throws RangeError when the firm's margin is not given */
export function valuePushes(input: ValueInput): FirmMoney {
  const { firm, pushes, money, months, draws } = input;
  const discounts = listDiscounts(money.discountRatePerYear, months);
  const spend = listSpend(pushes, firm, months);
  const total = spend.reduce((sum, amount, h) => sum + amount * discounts[h]!, 0);
  const gains = sumGains(input, discounts);
  const values = gains.map((gain) => gain - total);
  return {
    spend: total,
    gain: intervalOf(gains),
    value: intervalOf(values),
    expectedValue: values.reduce((sum, value) => sum + value, 0) / draws,
    chancePositive: values.reduce((sum, value) => sum + (value > 0 ? 1 : 0), 0) / draws,
    paybackMonths: total > 0 ? findPayback(input, discounts, spend) : null,
  };
}

/** Discounted margin gained in each draw. */
export function sumGains(
  { firm, money, months, draws, pushed, baseline }: Omit<ValueInput, 'pushes'>,
  discounts: Float64Array,
): Float64Array {
  const margin = marginOf(money, firm);
  const gains = new Float64Array(draws);
  for (let h = 0; h < months; h++) {
    const worth = margin * discounts[h]!;
    for (let i = 0; i < draws; i++) gains[i]! += worth * (pushed[h * draws + i]! - baseline[h * draws + i]!);
  }
  return gains;
}

/** Months from the first spend until the running value stays positive to the end. */
function findPayback(
  { firm, money, months, draws, pushed, baseline }: ValueInput,
  discounts: Float64Array,
  spend: Float64Array,
): FirmMoney['paybackMonths'] {
  const margin = marginOf(money, firm);
  const first = spend.findIndex((amount) => amount > 0);
  const found: number[] = [];
  for (let i = 0; i < draws; i++) {
    let value = 0;
    let since: number | null = null;
    for (let h = 0; h < months; h++) {
      const at = h * draws + i;
      value += discounts[h]! * (margin * (pushed[at]! - baseline[at]!) - spend[h]!);
      if (!(value > 0)) since = null;
      else if (h >= first) since ??= h;
    }
    if (since !== null) found.push(since + 1 - first);
  }
  return found.length >= PAYS_BACK_AT_LEAST * draws && found.length > 0 ? intervalOf(found) : null;
}

function marginOf({ marginPerUserMonth }: Money, firm: 1 | 2): number {
  const margin = firm === 1 ? marginPerUserMonth.focal : marginPerUserMonth.rival;
  if (margin === null)
    throw new RangeError('money.marginPerUserMonth.rival must be given to count its value');
  return margin;
}
