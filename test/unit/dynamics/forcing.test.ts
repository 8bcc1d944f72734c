import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  createForcing,
  EFFECT_COUNT,
  GROWTH,
  PULL,
  pushStrength,
  RECRUITS,
  ROOM,
  STAGE_SHARES,
} from '@/lib/dynamics/forcing';
import type { Push } from '@/lib/dynamics/push';
import { anyPush } from './arbitrary';

const PUSH: Push = {
  firm: 2,
  kind: 'growth-lift',
  startMonth: 3,
  lengthMonths: 6,
  size: 0.4,
  rampMonths: 2,
  carryOverHalfLifeMonths: 3,
};

/** All effects tabled for the first `months` months as [time, effects] rows. */
function listStages(pushes: Push[], months: number): [number, Float64Array][] {
  const forcing = createForcing(pushes);
  forcing.cover(months);
  const rows: [number, Float64Array][] = [];
  for (let segment = 0; segment < forcing.segments; segment++) {
    const from = forcing.startOf(segment);
    for (let stage = 0; stage < STAGE_SHARES.length; stage++) {
      const first = (segment * STAGE_SHARES.length + stage) * EFFECT_COUNT;
      const t = from + STAGE_SHARES[stage] * (forcing.ends[segment] - from);
      rows.push([t, forcing.stageEffects.slice(first, first + EFFECT_COUNT)]);
    }
  }
  return rows;
}

describe('pushStrength', () => {
  it.each([
    [0, 0],
    [3, 0],
    [4, 0.2],
    [5, 0.4],
    [8.9, 0.4],
    [9, 0.4],
    [12, 0.2],
    [15, 0.1],
  ])('at month %d is %d: ramp, full strength, then halved every three months', (t, strength) => {
    expect(pushStrength(PUSH, t)).toBeCloseTo(strength, 14);
  });

  it('lasts for ever without an end', () => {
    expect(pushStrength({ ...PUSH, lengthMonths: null }, 1e6)).toBe(0.4);
  });

  it('steps in and out at once without ramp and carry-over', () => {
    const step = { ...PUSH, rampMonths: 0, carryOverHalfLifeMonths: 0 };
    expect([2.999, 3, 8.999, 9].map((t) => pushStrength(step, t))).toEqual([0, 0.4, 0.4, 0]);
  });

  it('fades from what it reached when the ramp is longer than the push', () => {
    const short = { ...PUSH, lengthMonths: 1 };
    expect(pushStrength(short, 4)).toBeCloseTo(0.2, 14);
    expect(pushStrength(short, 7)).toBeCloseTo(0.1, 14);
  });

  it('stays between zero and its size', () => {
    fc.assert(
      fc.property(anyPush, fc.double({ min: -5, max: 60, noNaN: true }), (push, t) => {
        expect(pushStrength(push, t)).toBeGreaterThanOrEqual(0);
        expect(pushStrength(push, t)).toBeLessThanOrEqual(push.size);
      }),
    );
  });
});

describe('createForcing', () => {
  it('tables the strengths of every push at every stage inside the segments', () => {
    fc.assert(
      fc.property(fc.array(anyPush, { maxLength: 3 }), (pushes) => {
        for (const [t, effects] of listStages(pushes, 30)) {
          // On the edge of a segment a step has two values, and the table rightly has the one of its own segment.
          if (pushes.some((push) => isNearBreakpoint(push, t))) continue;
          expect(maxDifference(effects, expectedEffects(pushes, t))).toBeLessThan(1e-12);
        }
      }),
    );
  });

  it('cuts time at every month and every breakpoint', () => {
    const forcing = createForcing([{ ...PUSH, startMonth: 2.5 }]);
    forcing.cover(10);
    // 2.5 start, 4.5 end of the ramp, 8.5 end of the push.
    expect(Array.from(forcing.ends.slice(0, forcing.segments))).toEqual([
      1, 2, 2.5, 3, 4, 4.5, 5, 6, 7, 8, 8.5, 9, 10,
    ]);
    expect(Array.from(forcing.firstSegment.slice(0, 11))).toEqual([0, 1, 2, 4, 5, 7, 8, 9, 10, 12, 13]);
  });

  it('knows the segments in which nothing changes', () => {
    const forcing = createForcing([PUSH]);
    forcing.cover(10);
    expect(Array.from(forcing.isSteady.slice(0, 10))).toEqual([1, 1, 1, 0, 0, 1, 1, 1, 1, 0]);
  });

  it('goes on from where it was when more months are asked for, past its first room', () => {
    const forcing = createForcing([PUSH]);
    forcing.cover(20);
    forcing.cover(200);
    const whole = createForcing([PUSH]);
    whole.cover(200);
    expect(forcing.segments).toBe(200);
    expect(Array.from(forcing.ends.slice(0, 200))).toEqual(Array.from(whole.ends.slice(0, 200)));
    const used = 200 * STAGE_SHARES.length * EFFECT_COUNT;
    expect(forcing.stageEffects.slice(0, used)).toEqual(whole.stageEffects.slice(0, used));
  });

  it('leaves out a push of size zero', () => {
    const forcing = createForcing([{ ...PUSH, startMonth: 2.5, size: 0 }]);
    forcing.cover(10);
    expect(forcing.segments).toBe(10);
  });

  it.each([
    ['size', -0.1],
    ['size', Number.NaN],
    ['rampMonths', -1],
    ['carryOverHalfLifeMonths', Number.POSITIVE_INFINITY],
    ['lengthMonths', -1],
    ['startMonth', Number.NaN],
  ])('names push.%s when it is %d', (name, value) => {
    expect(() => createForcing([{ ...PUSH, [name]: value }])).toThrow(`push.${name}`);
  });
});

function isNearBreakpoint(push: Push, t: number): boolean {
  const marks = [
    push.startMonth,
    push.startMonth + push.rampMonths,
    push.startMonth + (push.lengthMonths ?? 0),
  ];
  return marks.some((mark) => Math.abs(mark - t) < 1e-9);
}

/** The header of forcing.ts, said once more. */
function expectedEffects(pushes: Push[], t: number): Float64Array {
  const effects = Float64Array.of(1, 1, 1, 1, 1, 1, 0, 0);
  for (const push of pushes) {
    const u = pushStrength(push, t);
    const firm = push.firm - 1;
    if (push.kind === 'growth-lift') effects[GROWTH + firm] *= 1 + u;
    if (push.kind === 'room') effects[ROOM + firm] /= 1 + u;
    if (push.kind === 'pull') effects[PULL + firm] *= 1 + u;
    if (push.kind === 'recruits') effects[RECRUITS + firm] += u;
  }
  return effects;
}

function maxDifference(a: Float64Array, b: Float64Array): number {
  return Math.max(...a.map((value, i) => Math.abs(value - b[i])));
}
