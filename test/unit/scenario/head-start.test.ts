import { describe, expect, it } from 'vitest';
import { fillForcedTrajectory } from '@/lib/dynamics/forced-trajectory';
import { createForcing } from '@/lib/dynamics/forcing';
import { integrate } from '@/lib/dynamics/integrate';
import { separatrixHeight } from '@/lib/dynamics/separatrix';
import { fillGrowth } from '@/lib/dynamics/system';
import { compareScenario } from '@/lib/scenario/compare';
import { type Draw, drawSetOf, HEAD_START, pushOf, spreadAround } from './draw-cases';

const OPTIONS = { horizonMonths: 24, seed: 1 };

/** Recruits of the rival that end for good in month 6. */
const pulse = (size: number) =>
  pushOf({
    kind: 'recruits',
    size,
    startMonth: 0,
    lengthMonths: 6,
    rampMonths: 0,
    carryOverHalfLifeMonths: 0,
  });

/** Smallest pulse that flips a draw, by bisection on the comparison. */
function findFlip(draw: Draw): { below: number; above: number } {
  const flips = (size: number) =>
    compareScenario(drawSetOf([draw]), [pulse(size)], OPTIONS).effect.probabilityMoves === 1;
  let [below, above] = [0, 500];
  expect(flips(above)).toBe(true);
  for (let step = 0; step < 40; step++) {
    const middle = (below + above) / 2;
    if (flips(middle)) above = middle;
    else below = middle;
  }
  return { below, above };
}

/** Where the market stands when the pulse ends. */
function stateAfter(draw: Draw, size: number): [number, number] {
  const path = new Float64Array(14);
  fillForcedTrajectory(draw, [draw.n1, draw.n2], createForcing([pulse(size)]), 6, path);
  return [path[12]!, path[13]!];
}

describe('a temporary push where the head start decides', () => {
  it('flips the destination exactly when the path crosses the separatrix', () => {
    const unequal: Draw = { ...HEAD_START, r2: 0.11, alpha: 1.3, beta: 1.8 };
    for (const draw of [HEAD_START, unequal]) {
      const { below, above } = findFlip(draw);
      const [n1, n2] = stateAfter(draw, (below + above) / 2);
      // the threshold is known to 5e-10 users a month; the integrator's 1e-7 of the level is what is left
      expect(n2 / separatrixHeight(draw, n1)!).toBeCloseTo(1, 5);
    }
  });

  it('flips on the straight ray when growth rates are equal', () => {
    const { above } = findFlip(HEAD_START);
    const [n1, n2] = stateAfter(HEAD_START, above);
    expect(n2 / n1).toBeCloseTo(0.8, 5);
  });

  it('agrees, draw by draw, with following each market to its end by another integrator', () => {
    const draws = spreadAround({ ...HEAD_START, n2: 205 }, 40);
    const push = pulse(12);
    const wins = (draw: Draw, state: readonly [number, number]) => {
      const run = integrate((_, y, out) => fillGrowth(draw, y, out), 0, state, 4000, {
        relativeTolerance: 1e-10,
      });
      return run.y[0]! > run.y[1]!;
    };
    const moved = draws.filter((draw) => wins(draw, [draw.n1, draw.n2]) !== wins(draw, stateAfter(draw, 12)));
    const { effect, destinations } = compareScenario(drawSetOf(draws), [push], OPTIONS);
    expect(moved.length).toBeGreaterThan(0);
    expect(moved.length).toBeLessThan(draws.length);
    expect(effect.probabilityMoves).toBeCloseTo(moved.length / draws.length, 12);
    expect(effect).toMatchObject({ destination: 'may-move', reason: 'temporary-crosses' });
    expect(destinations.after.rivalAlone - destinations.before.rivalAlone).toBeCloseTo(
      moved.length / draws.length,
      12,
    );
    expect(destinations.before.shared).toBe(0);
  });

  it('stays on its side after a small push, and says so', () => {
    const { effect } = compareScenario(drawSetOf([HEAD_START]), [pulse(1)], OPTIONS);
    expect(effect).toMatchObject({
      destination: 'stays',
      reason: 'temporary-same-side',
      probabilityMoves: 0,
    });
  });

  it('counts what a carry-over does after the push has ended', () => {
    const { below } = findFlip(HEAD_START);
    const carried = { ...pulse(below), carryOverHalfLifeMonths: 6 };
    expect(compareScenario(drawSetOf([HEAD_START]), [pulse(below)], OPTIONS).effect.probabilityMoves).toBe(0);
    expect(compareScenario(drawSetOf([HEAD_START]), [carried], OPTIONS).effect.probabilityMoves).toBe(1);
  });

  it('moves the destination by a push that starts after the horizon', () => {
    const late = pushOf({ kind: 'recruits', size: 400, startMonth: 70, lengthMonths: 20 });
    const { effect } = compareScenario(drawSetOf([{ ...HEAD_START, n2: 239 }]), [late], OPTIONS);
    expect(effect.probabilityMoves).toBe(1);
    expect(effect.worstShareDifference.q50).toBe(0);
  });
});
