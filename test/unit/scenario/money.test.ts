import { describe, expect, it } from 'vitest';
import { finishRun } from '@/lib/scenario/answer-run';
import { breakEvenSchema } from '@/lib/scenario/answers';
import { compareScenario } from '@/lib/scenario/compare';
import { findBreakEven } from '@/lib/scenario/find-break-even';
import type { Money } from '@/lib/scenario/money';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { type PricedPush, recruitsForSpend } from '@/lib/scenario/spend';
import { COEXISTENCE, type Draw, drawSetOf, pushOf, spreadAround, swapDraw } from './draw-cases';

const OPTIONS = { horizonMonths: 24, seed: 3 };
/** Nothing grows and nobody competes: recruits stay and add up. */
const STILL: Draw = { ...COEXISTENCE, r1: 1e-12, r2: 1e-12, alpha: 0, beta: 0 };
const MONEY: Money = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 2, rival: 3 },
  discountRatePerYear: 0,
  months: 12,
};
/** 10 recruits a month in months 2 to 6. */
const PUSH: PricedPush = pushOf({
  firm: 1,
  kind: 'recruits',
  size: 10,
  startMonth: 2,
  lengthMonths: 4,
  rampMonths: 0,
  carryOverHalfLifeMonths: 0,
});

const countMoney = (draws: Draw[], pushes: PricedPush[], money: Money = MONEY) =>
  compareScenario(drawSetOf(draws), pushes, OPTIONS, money).money!;

/** Users gained in months 1 .. 12, by hand. */
const GAINED = [0, 0, 10, 20, 30, 40, 40, 40, 40, 40, 40, 40];

describe('the money of a scenario', () => {
  it('is margin on user-months gained less spend, by hand', () => {
    const { focal, rival, focalAnswer, months } = countMoney([STILL], [{ ...PUSH, spendPerMonth: 100 }]);
    const gain = 2 * GAINED.reduce((sum, users) => sum + users, 0);
    expect(months).toBe(12);
    expect(focal.gain.q50).toBeCloseTo(gain, 5);
    expect(focal.spend).toBe(400);
    expect(focal.expectedValue).toBeCloseTo(gain - 400, 5);
    expect(focal.chancePositive).toBe(1);
    // running value after months 3 .. 8: -80, -140, -180, -200 ... it passes 0 when 2 x 40 a month have made up for it
    let running = 0;
    const back = GAINED.findIndex((users, h) => {
      running += 2 * users - (h >= 2 && h < 6 ? 100 : 0);
      return running > 0 && h >= 2;
    });
    expect(focal.paybackMonths!.q50).toBe(back + 1 - 2);
    expect(rival!.gain.q50).toBeCloseTo(0, 6);
    expect(focalAnswer).toBeNull();
  });

  it('discounts margin and spend to the last observed month', () => {
    const money = { ...MONEY, discountRatePerYear: 0.21 };
    const { focal } = countMoney([STILL], [{ ...PUSH, spendPerMonth: 100 }], money);
    const factor = (h: number) => 1.21 ** (-h / 12);
    const gain = GAINED.reduce((sum, users, i) => sum + 2 * users * factor(i + 1), 0);
    expect(focal.gain.q50).toBeCloseTo(gain, 5);
    expect(focal.spend).toBeCloseTo(100 * (factor(3) + factor(4) + factor(5) + factor(6)), 9);
  });

  it('pays for parts of months, and for a lasting push to the end of the months counted', () => {
    const spend = (change: Partial<PricedPush>) =>
      countMoney([STILL], [{ ...PUSH, spendPerMonth: 100, ...change }]).focal.spend;
    expect(spend({ startMonth: 1.5, lengthMonths: 0.75 })).toBeCloseTo(75, 9);
    expect(spend({ startMonth: 2, lengthMonths: null })).toBeCloseTo(1000, 9);
    expect(spend({ startMonth: 13 })).toBe(0);
  });

  it('is nothing without a push', () => {
    const { focal } = countMoney(spreadAround(COEXISTENCE, 20), []);
    expect(focal).toEqual({
      spend: 0,
      gain: { q05: 0, q50: 0, q95: 0 },
      value: { q05: 0, q50: 0, q95: 0 },
      expectedValue: 0,
      chancePositive: 0,
      paybackMonths: null,
    });
  });

  it('never pays back what is lost, and says so by null', () => {
    const { focal } = countMoney([STILL], [{ ...PUSH, spendPerMonth: 1e6 }]);
    expect(focal).toMatchObject({ chancePositive: 0, paybackMonths: null });
  });

  it('counts our own pushes against the rival’s alone where both push', () => {
    const draws = spreadAround(COEXISTENCE, 30);
    const rivals = pushOf({ firm: 2, size: 0.6 });
    const own = { ...PUSH, spendPerMonth: 50 };
    const both = countMoney(draws, [rivals, own]);
    const alone = countMoney(draws, [rivals]);
    // the mean is linear: value of both = value of the rival's + value of the answer
    expect(both.focalAnswer!.expectedValue).toBeCloseTo(
      both.focal.expectedValue - alone.focal.expectedValue,
      6,
    );
    expect(alone.focal.expectedValue).toBeLessThan(0);
    expect(both.focalAnswer!.gain.q05).toBeGreaterThan(0);
  });

  it('leaves the rival out when its margin is unknown', () => {
    const money = { ...MONEY, marginPerUserMonth: { focal: 2, rival: null } };
    expect(countMoney([STILL], [PUSH], money).rival).toBeNull();
  });

  it('mirrors when the firms are swapped', () => {
    const draws = spreadAround(COEXISTENCE, 30);
    const priced = { ...PUSH, spendPerMonth: 100 };
    const money = { ...MONEY, marginPerUserMonth: { focal: 2, rival: 2 } };
    const one = countMoney(draws, [priced], money);
    const two = countMoney(draws.map(swapDraw), [{ ...priced, firm: 2 }], money);
    expect(two.rival!.expectedValue).toBeCloseTo(one.focal.expectedValue, 6);
    expect(two.focal.gain.q50).toBeCloseTo(one.rival!.gain.q50, 6);
    expect(two.rival!.paybackMonths).toEqual(one.focal.paybackMonths);
  });
});

describe('findBreakEven', () => {
  const ask = (draws: Draw[], push: PricedPush, pushes: PricedPush[] = [], money = MONEY) =>
    finishRun(findBreakEven(prepareScenario(drawSetOf(draws), OPTIONS), { push, pushes, money }));

  it('is the gain over the months paid for, by hand', () => {
    const gain = 2 * GAINED.reduce((sum, users) => sum + users, 0);
    const answer = ask([STILL], PUSH);
    if (answer.code !== 'found') throw new Error('found expected');
    // 680 / 4 months
    expect(answer.spendPerMonth).toBe(gain / 4);
    expect(answer.interval!.q05).toBeCloseTo(gain / 4, 5);
    expect(breakEvenSchema.parse(JSON.parse(JSON.stringify(answer)))).toEqual(answer);
  });

  it('leaves an expected value of nothing, with the rival’s push as it is', () => {
    const draws = spreadAround(COEXISTENCE, 40);
    const rivals = pushOf({ firm: 2, size: 0.6 });
    const answer = ask(draws, PUSH, [rivals]);
    if (answer.code !== 'found') throw new Error('found expected');
    const at = (spendPerMonth: number) =>
      countMoney(draws, [rivals, { ...PUSH, spendPerMonth }]).focalAnswer!.expectedValue;
    // three digits downwards: less than 1 % below the exact spend
    expect(at(answer.spendPerMonth)).toBeGreaterThanOrEqual(0);
    expect(at(1.01 * answer.spendPerMonth)).toBeLessThan(0);
  });

  it.each([40, 200, null])(
    'finds the largest spend that buys its money back, at most %s recruits',
    (most) => {
      const draws = spreadAround(COEXISTENCE, 40);
      const response = { costPerRecruit: 8, mostPerMonth: most };
      const push = { ...PUSH, spendPerMonth: 1, response };
      const answer = ask(draws, push);
      if (answer.code !== 'found') throw new Error(`found expected, got ${answer.code}`);
      const at = (spendPerMonth: number) =>
        countMoney(draws, [{ ...push, spendPerMonth, size: recruitsForSpend(spendPerMonth, response) }]).focal
          .expectedValue;
      expect(at(answer.spendPerMonth)).toBeGreaterThanOrEqual(0);
      // three digits and the bisection's 0.4 %
      for (const factor of [1.02, 1.3, 2, 5]) expect(at(factor * answer.spendPerMonth)).toBeLessThan(0);
    },
  );

  it('says that it never pays when the first recruits cost more than they bring', () => {
    const response = { costPerRecruit: 1e4, mostPerMonth: 100 };
    expect(ask(spreadAround(COEXISTENCE, 20), { ...PUSH, spendPerMonth: 1, response }).code).toBe(
      'never-pays',
    );
    expect(ask([STILL], { ...PUSH, startMonth: 13 }).code).toBe('never-pays');
    expect(ask([STILL], { ...PUSH, size: 0 }).code).toBe('never-pays');
  });

  it('says that it always pays when recruits cost next to nothing', () => {
    const response = { costPerRecruit: 1e-6, mostPerMonth: null };
    expect(ask([STILL], { ...PUSH, spendPerMonth: 1, response }).code).toBe('always-pays');
  });

  it('refuses a firm whose margin is unknown', () => {
    const money = { ...MONEY, marginPerUserMonth: { focal: 2, rival: null } };
    expect(() => ask([STILL], { ...PUSH, firm: 2 }, [], money)).toThrow(/marginPerUserMonth/);
  });
});
