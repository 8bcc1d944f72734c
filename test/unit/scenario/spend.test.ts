import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pushSchema } from '@/lib/scenario/push-schema';
import { roundDownToThreeDigits, roundUpToThreeDigits } from '@/lib/scenario/round-digits';
import { recruitsForSpend, resizePush, settleSize, spendForRecruits } from '@/lib/scenario/spend';
import { pushOf } from './draw-cases';

const RESPONSE = { costPerRecruit: 10, mostPerMonth: 500 };

describe('recruits for money', () => {
  it('cost what the first recruits cost while little is spent, and half of the most at S50', () => {
    expect(recruitsForSpend(1, RESPONSE)).toBeCloseTo(0.1, 4);
    expect(recruitsForSpend(5000, RESPONSE)).toBe(250);
    expect(recruitsForSpend(0, RESPONSE)).toBe(0);
    expect(recruitsForSpend(1e12, RESPONSE)).toBeLessThan(500);
  });

  it('all cost the same without a limit', () => {
    expect(recruitsForSpend(5000, { costPerRecruit: 10, mostPerMonth: null })).toBe(500);
    expect(spendForRecruits(500, { costPerRecruit: 10, mostPerMonth: null })).toBe(5000);
  });

  it('need the spend that buys them, and no money buys more than the most', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 499, noNaN: true }), (recruits) => {
        const spend = spendForRecruits(recruits, RESPONSE)!;
        expect(recruitsForSpend(spend, RESPONSE)).toBeCloseTo(recruits, 6);
      }),
    );
    expect(spendForRecruits(500, RESPONSE)).toBeNull();
    expect(resizePush({ ...pushOf({ kind: 'recruits' }), response: RESPONSE }, 501)).toBeNull();
  });

  it('keep the price of a push whose effect does not come from the spend', () => {
    const lift = { ...pushOf(), spendPerMonth: 900 };
    expect(resizePush(lift, 0.5)).toEqual({ ...lift, size: 0.5 });
    expect(settleSize(lift)).toEqual(lift);
  });
});

describe('pushSchema', () => {
  it('works the size out from the spend, whatever size was written', () => {
    const { size: _, ...bought } = {
      ...pushOf({ kind: 'recruits' }),
      spendPerMonth: 5000,
      response: RESPONSE,
    };
    expect(pushSchema.parse(bought).size).toBe(250);
    expect(pushSchema.parse({ ...bought, size: 9 }).size).toBe(250);
    expect(pushSchema.parse(pushSchema.parse(bought))).toEqual(pushSchema.parse(bought));
  });

  it('leaves a push without a price as it was', () => {
    expect(pushSchema.parse(pushOf())).toEqual(pushOf());
    expect(Object.keys(pushSchema.parse(pushOf())).sort()).toEqual(Object.keys(pushOf()).sort());
  });

  it.each([
    [
      'a growth lift bought by the recruit',
      { ...pushOf(), spendPerMonth: 1, response: RESPONSE },
      'response',
    ],
    ['a response without a spend', { ...pushOf({ kind: 'recruits' }), response: RESPONSE }, 'spendPerMonth'],
    ['no size', { ...pushOf(), size: undefined }, 'size'],
    ['a relative size above its limit', pushOf({ size: 5.1 }), 'size'],
    ['a size that is none', pushOf({ size: Number.NaN }), 'size'],
    ['a negative spend', { ...pushOf(), spendPerMonth: -1 }, 'spendPerMonth'],
    ['a third firm', { ...pushOf(), firm: 3 }, 'firm'],
  ])('refuses %s and names the place', (_, push, place) => {
    const parsed = pushSchema.safeParse(push);
    expect(parsed.error?.issues[0]?.path[0]).toBe(place);
  });
});

describe('three digits', () => {
  it.each([
    [0.1234, 0.124, 0.123],
    [0.124, 0.124, 0.124],
    [3061, 3070, 3060],
    [3070, 3070, 3070],
    [1e-7, 1e-7, 1e-7],
    [0, 0, 0],
  ])('of %f are %f upwards and %f downwards', (value, up, down) => {
    expect(roundUpToThreeDigits(value)).toBe(up);
    expect(roundDownToThreeDigits(value)).toBe(down);
  });

  it('are within 1 % on the right side', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e12, noNaN: true }), (value) => {
        const [up, down] = [roundUpToThreeDigits(value), roundDownToThreeDigits(value)];
        expect(up / value).toBeGreaterThan(1 - 1e-9);
        expect(up / value).toBeLessThan(1.0101);
        expect(down / value).toBeLessThan(1 + 1e-9);
        expect(down / value).toBeGreaterThan(0.99);
      }),
    );
  });
});
