import { describe, expect, test } from 'vitest';
import { readMoneyText, readPushText, readTargetText } from '@/lib/cli/push-text';

const take = <T>(reading: { ok: true; value: T } | { ok: false; reason: string }): T => {
  if (!reading.ok) throw new Error(reading.reason);
  return reading.value;
};

describe('a push on the command line', () => {
  test('every key is read', () => {
    const text =
      'firm=rival, kind=recruits, start=3, length=6, size=5000, ramp=1, carry-over=2.5, spend=9000';
    expect(take(readPushText(text))).toEqual({
      firm: 2,
      kind: 'recruits',
      startMonth: 3,
      lengthMonths: 6,
      size: 5000,
      rampMonths: 1,
      carryOverHalfLifeMonths: 2.5,
      spendPerMonth: 9000,
    });
  });

  test('starts at once, without ramp and fading, unless told', () => {
    expect(take(readPushText('firm=focal,kind=pull,length=lasting,size=20%'))).toEqual({
      firm: 1,
      kind: 'pull',
      startMonth: 0,
      lengthMonths: null,
      size: 0.2,
      rampMonths: 0,
      carryOverHalfLifeMonths: 0,
    });
    expect(take(readPushText('firm=focal,kind=pull,length=3,size=0.2')).size).toBe(0.2);
  });

  test('recruits may be bought', () => {
    const text = 'firm=focal,kind=recruits,length=6,spend=5000,cost-per-recruit=10,most=500';
    const push = take(readPushText(text));
    expect(push.response).toEqual({ costPerRecruit: 10, mostPerMonth: 500 });
    expect(push.size).toBe(250);
    expect(take(readPushText(text.replace(',most=500', ''))).size).toBe(500);
  });

  test('a counter-push is the focal firm’s and needs no size', () => {
    expect(take(readPushText('kind=room,length=6', true))).toMatchObject({ firm: 1, size: 0 });
    const bought = take(readPushText('kind=recruits,length=6,cost-per-recruit=10', true));
    expect(bought).toMatchObject({ size: 0, spendPerMonth: 0 });
  });

  test.each([
    ['firm=rival,kind=recruits,length=6', '“size” is missing'],
    ['kind=recruits,length=6,size=1', '“firm” is missing'],
    ['firm=rival,kind=recruits,size=1', '“length” is missing'],
    ['firm=them,kind=recruits,length=6,size=1', '“firm” takes focal, rival, not “them”'],
    ['firm=rival,kind=magic,length=6,size=1', '“kind” takes recruits, growth-lift, pull, room'],
    ['firm=rival,kind=pull,length=6,size=1,size=2', '“size” stands there twice'],
    ['firm=rival,kind=pull,length=6,size', '“size” needs a value'],
    ['firm=rival,kind=pull,length=6,size=', '“size” takes a number'],
    ['firm=rival,kind=pull,length=six,size=1', '“length” takes a number, not “six”'],
    ['firm=rival,kind=pull,length=6,strength=1', 'There is no “strength”'],
    ['firm=rival,kind=recruits,length=6,size=5%', '“size” takes a number, not “5%”'],
    ['firm=rival,kind=recruits,length=6,size=1,most=9', '“most” needs “cost-per-recruit”'],
    ['firm=rival,kind=pull,length=6,size=9', 'too large'],
    ['firm=rival,kind=pull,length=600,size=1', 'lengthMonths'],
    ['firm=rival,kind=pull,length=6,cost-per-recruit=1,spend=1', 'only recruits'],
    ['firm=rival,kind=recruits,length=6,cost-per-recruit=1', 'how much is spent'],
    ['', 'There is no “”'],
  ])('%s is refused in one sentence', (text, part) => {
    const reading = readPushText(text);
    if (reading.ok) throw new Error('it was read');
    expect(reading.reason).toContain(part);
    expect(reading.reason).toMatch(/^--push: [^\n]+\.$/);
  });
});

test('money is read with its defaults', () => {
  expect(take(readMoneyText('currency=EUR,margin=2.5'))).toEqual({
    currency: 'EUR',
    marginPerUserMonth: { focal: 2.5, rival: null },
    discountRatePerYear: 0,
    months: null,
  });
  expect(take(readMoneyText('currency=k$,margin=1,rival-margin=3,discount=10%,months=36'))).toMatchObject({
    marginPerUserMonth: { focal: 1, rival: 3 },
    discountRatePerYear: 0.1,
    months: 36,
  });
  expect(readMoneyText('margin=1')).toMatchObject({ ok: false, reason: expect.stringContaining('currency') });
});

test('a target is read in percent or as fractions', () => {
  const target = { firm: 1, share: 0.4, month: 24, chance: 0.8 };
  expect(take(readTargetText('share=40%,month=24,chance=80%'))).toEqual(target);
  expect(take(readTargetText('firm=rival,share=0.4,month=24,chance=0.8'))).toEqual({ ...target, firm: 2 });
  expect(readTargetText('share=140%,month=24,chance=80%')).toMatchObject({ ok: false });
  expect(readTargetText('share=40%,month=2.5,chance=80%')).toMatchObject({ ok: false });
});
