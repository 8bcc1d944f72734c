import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Money } from '@/lib/scenario/money';
import { MAX_PUSHES, PUSH_KINDS } from '@/lib/scenario/push-bounds';
import { readScenarioQuery, writeScenarioQuery } from '@/lib/scenario/scenario-query';
import { type PricedPush, settleSize } from '@/lib/scenario/spend';
import { pushOf } from './draw-cases';

const money: Money = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 2.5, rival: null },
  discountRatePerYear: 0.1,
  months: 24,
};

const number = (max: number) => fc.double({ min: 0, max, noNaN: true }).map(Math.abs);
const anyPush: fc.Arbitrary<PricedPush> = fc
  .record({
    firm: fc.constantFrom(1 as const, 2 as const),
    kind: fc.constantFrom(...PUSH_KINDS),
    startMonth: number(120),
    lengthMonths: fc.option(number(120)),
    size: number(5),
    rampMonths: number(120),
    carryOverHalfLifeMonths: number(24),
  })
  .chain((push) => {
    const priced = fc.record({ spendPerMonth: number(1e6) }).map((price) => ({ ...push, ...price }));
    if (push.kind !== 'recruits') return fc.oneof(fc.constant(push), priced);
    const response = fc.record({
      costPerRecruit: fc.double({ min: 0.1, max: 1e4, noNaN: true }),
      mostPerMonth: fc.option(fc.double({ min: 1, max: 1e6, noNaN: true })),
    });
    const bought = fc
      .tuple(priced, response)
      .map(([one, terms]): PricedPush => settleSize({ ...one, response: terms }));
    return fc.oneof(fc.constant(push), priced, bought);
  });

describe('a scenario in an address', () => {
  it('is short and readable', () => {
    const pushes = [
      pushOf({ kind: 'recruits', size: 5000, startMonth: 3 }),
      pushOf({ firm: 1, size: 0.2, lengthMonths: null, rampMonths: 0, carryOverHalfLifeMonths: 0 }),
    ];
    expect(writeScenarioQuery({ name: 'Our answer', pushes, money })).toBe(
      'push=2_recruits_3_6_5000_1_3&push=1_growth-lift_2_%7E_0.2&money=EUR_2.5__0.1_24&name=Our+answer',
    );
  });

  it('comes back as it was, whatever it holds', () => {
    fc.assert(
      fc.property(
        fc.array(anyPush, { minLength: 1, maxLength: MAX_PUSHES }),
        fc.option(fc.constant(money)),
        fc.string({ maxLength: 40 }).map((name) => name.trim()),
        (pushes, assumed, name) => {
          const scenario = { name, pushes, money: assumed };
          expect(readScenarioQuery(writeScenarioQuery(scenario))).toEqual(scenario);
          expect(readScenarioQuery(`?${writeScenarioQuery(scenario)}`)).toEqual(scenario);
        },
      ),
    );
  });

  it('is nothing where there is no push', () => {
    expect(readScenarioQuery('')).toBeNull();
    expect(readScenarioQuery('name=A&money=EUR_2')).toBeNull();
  });

  it('leaves out what was cut or tampered with, and keeps the rest', () => {
    const good = 'push=2_recruits_3_6_5000';
    for (const bad of [
      'push=2_recr',
      'push=3_pull_1_1_1',
      'push=',
      'push=1_pull_1_1_NaN',
      'push=1_pull_1_1_1e9',
    ]) {
      expect(readScenarioQuery(`${good}&${bad}`)!.pushes).toHaveLength(1);
      expect(readScenarioQuery(bad)).toBeNull();
    }
    expect(readScenarioQuery(`${good}&money=EUR_much`)!.money).toBeNull();
  });

  it('never throws, whatever the address', () => {
    fc.assert(
      fc.property(fc.string(), fc.string(), (push, rest) => {
        readScenarioQuery(`push=${push}&money=${rest}&name=${rest}`);
      }),
    );
  });

  it('takes no more pushes than a scenario may have', () => {
    const many = Array.from({ length: 30 }, () => 'push=2_recruits_3_6_5000').join('&');
    expect(readScenarioQuery(many)!.pushes).toHaveLength(MAX_PUSHES);
  });
});
