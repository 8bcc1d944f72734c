/**
 * A scenario as the query of an address, so that what is being edited can be shared and survives a reload:
 *
 *   ?push=2_recruits_3_6_5000_1_3&push=1_growth-lift_4_~_0.2&money=EUR_2.5__0.1_24&name=Our+answer
 *
 * A push is firm_kind_start_length_size_ramp_carryOver_spend_costPerRecruit_mostPerMonth, a lasting one with ~ for its length; money is
 * currency_margin_rivalMargin_discount_months. Ends that say nothing are left off. What cannot be read is left out, never a fault: an
 * address may have been cut on its way.
 */
import { cutText } from '../series/clean-name';
import { type Money, moneySchema } from './money';
import { MAX_PUSHES, MAX_SCENARIO_NAME_LENGTH } from './push-bounds';
import { pushSchema } from './push-schema';
import type { PricedPush } from './spend';

export interface QueryScenario {
  /** Empty when the address has none. */
  name: string;
  pushes: PricedPush[];
  money: Money | null;
}

const SEPARATOR = '_';
const LASTING = '~';

export function writeScenarioQuery({ name, pushes, money }: QueryScenario): string {
  const query = new URLSearchParams();
  for (const push of pushes) query.append('push', writePush(push));
  if (money) query.append('money', writeMoney(money));
  if (name !== '') query.append('name', name);
  return query.toString();
}

/** Null when the query holds no push that can be read. */
export function readScenarioQuery(query: string | URLSearchParams): QueryScenario | null {
  const values = new URLSearchParams(query);
  const pushes = values
    .getAll('push')
    .flatMap((code) => readPush(code) ?? [])
    .slice(0, MAX_PUSHES);
  if (pushes.length === 0) return null;
  const name = cutText((values.get('name') ?? '').trim(), MAX_SCENARIO_NAME_LENGTH);
  return { name, pushes, money: readMoney(values.get('money')) };
}

function writePush(push: PricedPush): string {
  const { firm, kind, startMonth, lengthMonths, size, rampMonths, carryOverHalfLifeMonths } = push;
  return join([
    firm,
    kind,
    startMonth,
    lengthMonths ?? LASTING,
    size,
    rampMonths || null,
    carryOverHalfLifeMonths || null,
    push.spendPerMonth,
    push.response?.costPerRecruit,
    push.response?.mostPerMonth,
  ]);
}

function readPush(code: string): PricedPush | null {
  const [firm, kind, start, length, size, ramp, carryOver, spend, cost, most] = code.split(SEPARATOR);
  const parsed = pushSchema.safeParse({
    firm: Number(firm),
    kind,
    startMonth: readNumber(start),
    lengthMonths: length === LASTING ? null : readNumber(length),
    size: readNumber(size),
    rampMonths: readNumber(ramp) ?? 0,
    carryOverHalfLifeMonths: readNumber(carryOver) ?? 0,
    spendPerMonth: readNumber(spend),
    ...(cost
      ? { response: { costPerRecruit: readNumber(cost), mostPerMonth: readNumber(most) ?? null } }
      : {}),
  });
  return parsed.success ? parsed.data : null;
}

/** An underscore in the currency would part it. */
function writeMoney({ currency, marginPerUserMonth, discountRatePerYear, months }: Money): string {
  const { focal, rival } = marginPerUserMonth;
  return join([currency.replaceAll(SEPARATOR, ' '), focal, rival, discountRatePerYear || null, months]);
}

function readMoney(code: string | null): Money | null {
  if (code === null) return null;
  const [currency, focal, rival, discount, months] = code.split(SEPARATOR);
  const parsed = moneySchema.safeParse({
    currency,
    marginPerUserMonth: { focal: readNumber(focal), rival: readNumber(rival) ?? null },
    discountRatePerYear: readNumber(discount) ?? 0,
    months: readNumber(months) ?? null,
  });
  return parsed.success ? parsed.data : null;
}

function join(parts: (string | number | null | undefined)[]): string {
  const last = parts.findLastIndex((part) => part !== null && part !== undefined);
  return parts
    .slice(0, last + 1)
    .map((part) => part ?? '')
    .join(SEPARATOR);
}

/** Undefined for nothing; NaN, which no schema takes, for what is no number. */
function readNumber(text: string | undefined): number | undefined {
  return text === undefined || text === '' ? undefined : Number(text);
}
