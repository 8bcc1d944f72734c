import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findEquilibria } from '@/lib/dynamics/equilibria';
import { fillForcedTrajectory } from '@/lib/dynamics/forced-trajectory';
import { createForcing } from '@/lib/dynamics/forcing';
import { applyLastingPush, applyLastingPushes } from '@/lib/dynamics/lasting-push';
import { classifyOutcome } from '@/lib/dynamics/outcome';
import type { Push } from '@/lib/dynamics/push';
import { type CompetitionSystem, swapFirms, toCrowdingForm } from '@/lib/dynamics/system';
import { anyPush, anySystem } from './arbitrary';

const SYSTEM: CompetitionSystem = { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha: 0.5, beta: 0.8 };
const LIFT: Push = {
  firm: 1,
  kind: 'growth-lift',
  startMonth: 0,
  lengthMonths: null,
  size: 0.5,
  rampMonths: 0,
  carryOverHalfLifeMonths: 0,
};
const ROUNDING = 1e-14;

describe('applyLastingPush', () => {
  it.each([
    ['growth-lift', { r1: 0.375, r2: 0.2, k1: 1500, k2: 800, alpha: 0.5 / 1.5, beta: 0.8 * 1.5 }],
    ['pull', { ...SYSTEM, beta: 0.8 * 1.5 }],
    ['room', { ...SYSTEM, k1: 1500, beta: 0.8 * 1.5 }],
    ['recruits', SYSTEM],
  ] as const)('firm 1, %s', (kind, expected) => {
    expect(applyLastingPush(SYSTEM, { ...LIFT, kind })).toEqual(expected);
  });

  it('changes in the crowding form just what the push is', () => {
    fc.assert(
      fc.property(anySystem, anyPush, (system, raw) => {
        const push: Push = { ...raw, lengthMonths: null };
        const before = toCrowdingForm(system);
        const after = toCrowdingForm(applyLastingPush(system, push));
        const [own, crowd, pull] =
          push.firm === 1 ? (['r1', 'b11', 'b21'] as const) : (['r2', 'b22', 'b12'] as const);
        const factor = 1 + push.size;
        if (push.kind === 'growth-lift') before[own] *= factor;
        if (push.kind === 'pull') before[pull] *= factor;
        if (push.kind === 'room') before[crowd] /= factor;
        for (const id of ['r1', 'r2', 'b11', 'b12', 'b21', 'b22'] as const) {
          expect(Math.abs(after[id] - before[id])).toBeLessThanOrEqual(ROUNDING * before[id]);
        }
      }),
    );
  });

  it('does the same for firm 2 with the firms exchanged', () => {
    const swapped = applyLastingPush(swapFirms(SYSTEM), { ...LIFT, firm: 2 });
    expect(swapFirms(swapped)).toEqual(applyLastingPush(SYSTEM, LIFT));
  });

  it('changes nothing when the push has an end', () => {
    expect(applyLastingPush(SYSTEM, { ...LIFT, lengthMonths: 600 })).toEqual(SYSTEM);
  });

  it('can move the destination by carrying a coefficient over 1', () => {
    expect(classifyOutcome(SYSTEM)).toBe('coexistence');
    expect(classifyOutcome(applyLastingPush(SYSTEM, LIFT))).toBe('exclusionByFirst');
  });

  it('refuses a negative size', () => {
    expect(() => applyLastingPush(SYSTEM, { ...LIFT, size: -0.1 })).toThrow('push.size');
  });
});

describe('applyLastingPushes', () => {
  it('gives the system whose sink the pushed path approaches', () => {
    const pushes: Push[] = [
      { ...LIFT, size: 0.1, rampMonths: 3 },
      { ...LIFT, firm: 2, kind: 'room', size: 0.2, startMonth: 6 },
      { ...LIFT, kind: 'pull', size: 5, startMonth: 2, lengthMonths: 10, carryOverHalfLifeMonths: 2 },
    ];
    // The slowest rate at the new sink is near 0.02 per month: thirty of its time constants.
    const months = 1500;
    const out = new Float64Array(2 * (months + 1));
    fillForcedTrajectory(SYSTEM, [50, 20], createForcing(pushes), months, out);
    const [, , , shared] = findEquilibria(applyLastingPushes(SYSTEM, pushes));
    expect(shared.kind).toBe('sink');
    expect(out[2 * months] / shared.point[0]).toBeCloseTo(1, 6);
    expect(out[2 * months + 1] / shared.point[1]).toBeCloseTo(1, 6);
  });
});
