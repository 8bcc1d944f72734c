import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import {
  FORCED_RELATIVE_TOLERANCE,
  ForcedIntegrator,
  fillForcedTrajectory,
} from '@/lib/dynamics/forced-trajectory';
import { createForcing, pushStrength } from '@/lib/dynamics/forcing';
import { integrate } from '@/lib/dynamics/integrate';
import type { Push } from '@/lib/dynamics/push';
import { type CompetitionSystem, type State, swapFirms, toCrowdingForm } from '@/lib/dynamics/system';
import { anyPush, anyShares, anySystem, scalePush, stateOf } from './arbitrary';

const MONTHS = 36;
const SYSTEM: CompetitionSystem = { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha: 0.56, beta: 1.125 };
const START: State = [50, 20];
const PUSH: Push = {
  firm: 2,
  kind: 'growth-lift',
  startMonth: 3.3,
  lengthMonths: 6,
  size: 0.4,
  rampMonths: 2,
  carryOverHalfLifeMonths: 3,
};
/** One step a month, each within the tolerance, and room for the errors to grow to twice their size on the way. */
const PATH_TOLERANCE = 2 * MONTHS * FORCED_RELATIVE_TOLERANCE;
/** Reference paths cost far more than the paths they check. */
const FEWER_RUNS = { numRuns: 40 };

function pathOf(system: CompetitionSystem, start: State, pushes: Push[], months = MONTHS): Float64Array {
  const out = new Float64Array(2 * (months + 1));
  expect(fillForcedTrajectory(system, start, createForcing(pushes), months, out)).toBe('complete');
  return out;
}

/** The same path by the adaptive integrator, restarted at every month and every jump, strengths straight from `pushStrength`. */
function referencePath(system: CompetitionSystem, start: State, pushes: Push[]): Float64Array {
  const out = new Float64Array(2 * (MONTHS + 1));
  out.set(start);
  const marks = new Set(pushes.flatMap(marksOf).concat(Array.from({ length: MONTHS + 1 }, (_, m) => m)));
  const stops = [...marks].filter((t) => t >= 0 && t <= MONTHS).sort((a, b) => a - b);
  let y: ArrayLike<number> = start;
  for (let i = 1; i < stops.length; i++) {
    const [from, to] = [stops[i - 1], stops[i]];
    const rhs = (t: number, state: Float64Array, growth: Float64Array) => {
      // Just inside the segment: at its ends a step push has the value of the neighbour.
      fillPushedGrowth(system, pushes, Math.min(to - 1e-12, Math.max(from + 1e-12, t)), state, growth);
    };
    const absoluteTolerance = [1e-13 * system.k1, 1e-13 * system.k2];
    y = integrate(rhs, from, y, to, { relativeTolerance: 1e-11, absoluteTolerance }).y;
    if (Number.isInteger(to)) out.set(y as Float64Array, 2 * to);
  }
  return out;
}

function marksOf(push: Push): number[] {
  const { startMonth, rampMonths, lengthMonths } = push;
  return [startMonth, startMonth + rampMonths, startMonth + (lengthMonths ?? 0)];
}

function fillPushedGrowth(
  system: CompetitionSystem,
  pushes: Push[],
  t: number,
  [n1, n2]: Float64Array,
  out: Float64Array,
): void {
  const b = toCrowdingForm(system);
  const recruits = [0, 0];
  for (const push of pushes) {
    const factor = 1 + pushStrength(push, t);
    const isFirst = push.firm === 1;
    if (push.kind === 'growth-lift') b[isFirst ? 'r1' : 'r2'] *= factor;
    if (push.kind === 'pull') b[isFirst ? 'b21' : 'b12'] *= factor;
    if (push.kind === 'room') b[isFirst ? 'b11' : 'b22'] /= factor;
    if (push.kind === 'recruits') recruits[push.firm - 1] += factor - 1;
  }
  out[0] = n1 * (b.r1 - b.b11 * n1 - b.b12 * n2) + recruits[0];
  out[1] = n2 * (b.r2 - b.b22 * n2 - b.b21 * n1) + recruits[1];
}

/** Largest difference of two paths, relative to the level or, for a firm near zero, to a millionth of its K. */
function pathDistance(a: Float64Array, b: Float64Array, system: CompetitionSystem): number {
  let worst = 0;
  for (let i = 0; i < a.length; i++) {
    const k = i % 2 === 0 ? system.k1 : system.k2;
    worst = Math.max(worst, Math.abs(a[i] - b[i]) / Math.max(Math.abs(b[i]), 1e-6 * k));
  }
  return worst;
}

describe('fillForcedTrajectory', () => {
  it('follows the adaptive integrator without pushes', () => {
    fc.assert(
      fc.property(anySystem, anyShares, (system, shares) => {
        const start = stateOf(system, shares);
        const distance = pathDistance(pathOf(system, start, []), referencePath(system, start, []), system);
        expect(distance).toBeLessThan(PATH_TOLERANCE);
      }),
      FEWER_RUNS,
    );
  });

  it('follows the adaptive integrator with up to three pushes of every kind', () => {
    fc.assert(
      fc.property(
        anySystem,
        anyShares,
        fc.array(anyPush, { minLength: 1, maxLength: 3 }),
        (system, shares, raw) => {
          const pushes = raw.map((push) => scalePush(push, system));
          const start = stateOf(system, shares);
          const path = pathOf(system, start, pushes);
          expect(pathDistance(path, referencePath(system, start, pushes), system)).toBeLessThan(
            PATH_TOLERANCE,
          );
        },
      ),
    );
  });

  it('is the unforced path to the last digit when the size is zero', () => {
    expect(pathOf(SYSTEM, START, [{ ...PUSH, size: 0 }])).toEqual(pathOf(SYSTEM, START, []));
  });

  it('is the unforced path to the last digit until the push starts', () => {
    const forced = pathOf(SYSTEM, START, [PUSH]);
    const free = pathOf(SYSTEM, START, []);
    expect(forced.slice(0, 8)).toEqual(free.slice(0, 8));
    expect(forced[10]).not.toBe(free[10]);
  });

  it('comes close to the unforced path as the size goes to zero', () => {
    const free = pathOf(SYSTEM, START, []);
    const change = (size: number) => pathDistance(pathOf(SYSTEM, START, [{ ...PUSH, size }]), free, SYSTEM);
    // Linear in the size, from errors of 1e-6 upwards.
    expect(change(1e-3) / change(1e-2)).toBeGreaterThan(0.08);
    expect(change(1e-3) / change(1e-2)).toBeLessThan(0.12);
  });

  it('a larger push never lowers the pushing firm nor raises the other', () => {
    fc.assert(
      fc.property(
        anySystem,
        anyShares,
        anyPush,
        fc.double({ min: 0, max: 0.99, noNaN: true }),
        (system, shares, raw, share) => {
          const push = scalePush(raw, system);
          const start = stateOf(system, shares);
          const more = pathOf(system, start, [push]);
          const less = pathOf(system, start, [{ ...push, size: push.size * share }]);
          const own = push.firm - 1;
          for (let m = 0; m <= MONTHS; m++) {
            // Up to the error of the integrator.
            const slack = PATH_TOLERANCE * (1e-6 * system.k1 + 1e-6 * system.k2);
            const ownLess = less[2 * m + own] * (1 - PATH_TOLERANCE) - slack;
            const otherLess = less[2 * m + 1 - own] * (1 + PATH_TOLERANCE) + slack;
            expect(more[2 * m + own]).toBeGreaterThanOrEqual(ownLess);
            expect(more[2 * m + 1 - own]).toBeLessThanOrEqual(otherLess);
          }
        },
      ),
    );
  });

  it('exchanges the paths with the firms', () => {
    const swappedPush = { ...PUSH, firm: 1 as const };
    const path = pathOf(SYSTEM, START, [PUSH]);
    const swapped = pathOf(swapFirms(SYSTEM), [START[1], START[0]], [swappedPush]);
    const back = swapped.map((_, i) => swapped[i % 2 === 0 ? i + 1 : i - 1]);
    expect(pathDistance(back, path, SYSTEM)).toBeLessThan(PATH_TOLERANCE);
  });

  it('brings back a firm with no users by recruits, and by nothing else', () => {
    const none: State = [500, 0];
    const lasting = { ...PUSH, startMonth: 0, lengthMonths: null };
    expect(pathOf(SYSTEM, none, [{ ...lasting, kind: 'recruits', size: 5 }])[2 * MONTHS + 1]).toBeGreaterThan(
      1,
    );
    for (const kind of ['growth-lift', 'pull', 'room'] as const) {
      expect(pathOf(SYSTEM, none, [{ ...lasting, kind }])[2 * MONTHS + 1]).toBe(0);
    }
  });

  it('keeps users positive on a steep fall', () => {
    const path = pathOf({ ...SYSTEM, r1: 1.5, alpha: 3 }, [2000, 2000], []);
    expect(Math.min(...path)).toBeGreaterThan(0);
  });

  it('puts the start into month 0 and is ready for zero months', () => {
    expect(Array.from(pathOf(SYSTEM, START, [PUSH], 0))).toEqual([50, 20]);
  });

  it('gives the same numbers when one forcing serves many draws', () => {
    const forcing = createForcing([PUSH]);
    const out = new Float64Array(2 * (MONTHS + 1));
    for (const r1 of [0.1, 0.9, 0.25]) {
      fillForcedTrajectory({ ...SYSTEM, r1 }, START, forcing, MONTHS, out);
    }
    expect(out).toEqual(pathOf(SYSTEM, START, [PUSH]));
  });

  it('takes hardly more than one step a month in an ordinary market: the others leave the shared table', () => {
    const forcing = createForcing([PUSH]);
    const otherSteps = vi.spyOn(forcing, 'fillStageEffects');
    fillForcedTrajectory(SYSTEM, START, forcing, MONTHS, new Float64Array(2 * (MONTHS + 1)));
    expect(otherSteps.mock.calls.length).toBeLessThan(MONTHS / 6);
    // A growth of 100 % a month is not ordinary.
    otherSteps.mockClear();
    fillForcedTrajectory({ ...SYSTEM, r2: 1 }, START, forcing, MONTHS, new Float64Array(2 * (MONTHS + 1)));
    expect(otherSteps.mock.calls.length).toBeGreaterThan(MONTHS / 6);
  });

  it.each([
    ['not-finite', { ...SYSTEM, r1: Number.NaN }],
    ['not-finite', { ...SYSTEM, k1: 0 }],
    ['too-many-steps', { ...SYSTEM, r1: 1e6 }],
  ] as const)('returns %s with NaN in the months it could not reach', (status, system) => {
    const out = new Float64Array(2 * (MONTHS + 1));
    expect(fillForcedTrajectory(system, START, createForcing([]), MONTHS, out)).toBe(status);
    expect(Array.from(out.slice(0, 2))).toEqual([50, 20]);
    expect(out.slice(2).every(Number.isNaN)).toBe(true);
  });

  it('refuses an array that is too short', () => {
    expect(() => fillForcedTrajectory(SYSTEM, START, createForcing([]), 5, new Float64Array(11))).toThrow(
      'out',
    );
  });
});

describe('ForcedIntegrator', () => {
  it('goes on from a state that was changed from outside', () => {
    const integrator = new ForcedIntegrator(SYSTEM, START, createForcing([]));
    integrator.advanceFrom(0);
    integrator.users1 = 400;
    integrator.users2 = 300;
    integrator.advanceFrom(1);
    const fresh = pathOf(SYSTEM, [400, 300], [], 1);
    expect(integrator.users1 / fresh[2]).toBeCloseTo(1, 5);
    expect(integrator.users2 / fresh[3]).toBeCloseTo(1, 5);
  });
});
