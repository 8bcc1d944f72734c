import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { PUSH_KINDS } from '@/lib/scenario/push-bounds';
import { firstPush, limitsForPush } from '@/lib/scenario/push-limits';
import { pushesSchema, pushSchema } from '@/lib/scenario/push-schema';
import { pushOf } from './draw-cases';

const scale = { focalUsers: 320_000, rivalUsers: 180_000, horizonMonths: 24 };

describe('limitsForPush', () => {
  it('sizes recruits by the market and keeps the other kinds relative', () => {
    expect(limitsForPush('recruits', scale).size).toEqual({ min: 0, max: 50_000, step: 500, first: 10_000 });
    expect(limitsForPush('growth-lift', scale).size.max).toBe(1);
  });

  it('gives first pushes that are accepted and lie in their ranges, whatever the size of the market', () => {
    const users = fc.double({ min: 0.001, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(users, users, fc.integer({ min: 1, max: 120 }), (focalUsers, rivalUsers, horizonMonths) => {
        for (const kind of PUSH_KINDS) {
          const market = { focalUsers, rivalUsers, horizonMonths };
          const push = pushSchema.parse(firstPush(2, kind, market));
          for (const [field, { min, max, step }] of Object.entries(limitsForPush(kind, market))) {
            const value = push[field as keyof typeof push] as number;
            expect(value).toBeGreaterThanOrEqual(min);
            expect(value).toBeLessThanOrEqual(max);
            expect(step).toBeGreaterThan(0);
          }
        }
      }),
    );
  });
});

describe('pushSchema', () => {
  it.each([
    ['a third firm', { firm: 3 }],
    ['another kind', { kind: 'magic' }],
    ['a negative size', { size: -0.1 }],
    ['a size that is no number', { size: Number.NaN }],
    ['an endless size', { size: Number.POSITIVE_INFINITY }],
    ['a relative size beyond all sense', { size: 6 }],
    ['a start in the past', { startMonth: -1 }],
    ['a start beyond ten years', { startMonth: 121 }],
    ['a negative length', { lengthMonths: -1 }],
    ['a long carry-over', { carryOverHalfLifeMonths: 25 }],
  ])('refuses %s', (_, change) => {
    expect(pushSchema.safeParse({ ...pushOf(), ...change }).success).toBe(false);
  });

  it('accepts many recruits and a lasting push', () => {
    expect(pushSchema.safeParse(pushOf({ kind: 'recruits', size: 50_000, lengthMonths: null })).success).toBe(
      true,
    );
  });

  it('refuses more than a dozen pushes', () => {
    expect(pushesSchema.safeParse(Array.from({ length: 13 }, () => pushOf())).success).toBe(false);
  });
});
