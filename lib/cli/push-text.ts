/**
 * Pushes, money and targets as the command line writes them:
 *
 *   --push   firm=rival,kind=recruits,start=3,length=6,size=5000,ramp=1,carry-over=3
 *   --push   firm=focal,kind=recruits,start=3,length=6,spend=20000,cost-per-recruit=12,most=4000
 *   --money  currency=EUR,margin=2.5,rival-margin=3,discount=10%,months=24
 *   --keep   firm=focal,share=40%,month=24,chance=80%
 *
 * Months count from the last observed one. What is read is checked by the same schemas as a written scenario.
 */
import type { z } from 'zod';
import { type Target, targetSchema } from '../scenario/answers';
import { type Money, moneySchema } from '../scenario/money';
import { PUSH_KINDS } from '../scenario/push-bounds';
import { pushSchema } from '../scenario/push-schema';
import type { PricedPush } from '../scenario/spend';
import { KeyValueError, need, readChoice, readFraction, readNumber, splitKeyValues } from './key-values';

export type TextReading<T> = { ok: true; value: T } | { ok: false; reason: string };

const FIRMS = ['focal', 'rival'] as const;
const PUSH_KEYS = [
  'firm',
  'kind',
  'start',
  'length',
  'size',
  'ramp',
  'carry-over',
  'spend',
  'cost-per-recruit',
  'most',
];
const MONEY_KEYS = ['currency', 'margin', 'rival-margin', 'discount', 'months'];
const TARGET_KEYS = ['firm', 'share', 'month', 'chance'];
/** Length of a push that never ends. */
const LASTING = 'lasting';

/** @param isSizeAsked a counter-push may leave its size out: it is what is asked for */
export function readPushText(text: string, isSizeAsked = false): TextReading<PricedPush> {
  return readText('--push', pushSchema, () => {
    const values = splitKeyValues(text, PUSH_KEYS);
    const kind = readChoice('kind', need(values, 'kind'), PUSH_KINDS);
    const size =
      values.get('size') ?? (isSizeAsked || values.has('cost-per-recruit') ? '0' : need(values, 'size'));
    const length = need(values, 'length');
    return {
      firm: readFirm(values.get('firm') ?? (isSizeAsked ? 'focal' : need(values, 'firm'))),
      kind,
      startMonth: readNumber('start', values.get('start') ?? '0'),
      lengthMonths: length === LASTING ? null : readNumber('length', length),
      size: kind === 'recruits' ? readNumber('size', size) : readFraction('size', size),
      rampMonths: readNumber('ramp', values.get('ramp') ?? '0'),
      carryOverHalfLifeMonths: readNumber('carry-over', values.get('carry-over') ?? '0'),
      ...readPrice(values, isSizeAsked),
    };
  });
}

function readPrice(values: Map<string, string>, isSizeAsked: boolean) {
  const cost = values.get('cost-per-recruit');
  const most = values.get('most');
  if (most !== undefined && cost === undefined) throw new KeyValueError('“most” needs “cost-per-recruit”.');
  const spend = values.get('spend') ?? (cost !== undefined && isSizeAsked ? '0' : undefined);
  return {
    ...(spend === undefined ? {} : { spendPerMonth: readNumber('spend', spend) }),
    ...(cost === undefined
      ? {}
      : {
          response: {
            costPerRecruit: readNumber('cost-per-recruit', cost),
            mostPerMonth: most === undefined ? null : readNumber('most', most),
          },
        }),
  };
}

export function readMoneyText(text: string): TextReading<Money> {
  return readText('--money', moneySchema, () => {
    const values = splitKeyValues(text, MONEY_KEYS);
    const rival = values.get('rival-margin');
    const months = values.get('months');
    return {
      currency: need(values, 'currency'),
      marginPerUserMonth: {
        focal: readNumber('margin', need(values, 'margin')),
        rival: rival === undefined ? null : readNumber('rival-margin', rival),
      },
      discountRatePerYear: readFraction('discount', values.get('discount') ?? '0'),
      months: months === undefined ? null : readNumber('months', months),
    };
  });
}

export function readTargetText(text: string): TextReading<Target> {
  return readText('--keep', targetSchema, () => {
    const values = splitKeyValues(text, TARGET_KEYS);
    return {
      firm: readFirm(values.get('firm') ?? 'focal'),
      share: readFraction('share', need(values, 'share')),
      month: readNumber('month', need(values, 'month')),
      chance: readFraction('chance', need(values, 'chance')),
    };
  });
}

function readFirm(text: string): 1 | 2 {
  return readChoice('firm', text, FIRMS) === 'focal' ? 1 : 2;
}

function readText<T>(option: string, schema: z.ZodType<T>, read: () => unknown): TextReading<T> {
  try {
    const parsed = schema.safeParse(read());
    if (parsed.success) return { ok: true, value: parsed.data };
    const [issue] = parsed.error.issues;
    return { ok: false, reason: `${option}: ${issue!.path.join('.')}: ${issue!.message}.` };
  } catch (error) {
    if (error instanceof KeyValueError) return { ok: false, reason: `${option}: ${error.message}` };
    throw error;
  }
}
