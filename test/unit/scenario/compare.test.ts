import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Push, PushKind } from '@/lib/dynamics/push';
import { outcomeOf } from '@/lib/forecast/odds';
import { OUTCOMES } from '@/lib/forecast/outcomes';
import { compareScenario } from '@/lib/scenario/compare';
import { type ScenarioComparison, scenarioComparisonSchema } from '@/lib/scenario/comparison';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import {
  COEXISTENCE,
  type Draw,
  drawSetOf,
  EXCLUSION_BY_FOCAL,
  EXCLUSION_BY_RIVAL,
  HEAD_START,
  processNoiseSetOf,
  pushOf,
  spreadAround,
  swapDraw,
} from './draw-cases';

const OPTIONS = { horizonMonths: 24, seed: 7 };
const KINDS: PushKind[] = ['recruits', 'growth-lift', 'pull', 'room'];
/** A size that matters for each kind. */
const SIZE: Record<PushKind, number> = { recruits: 20, 'growth-lift': 0.4, pull: 0.4, room: 0.4 };

const compare = (draws: Draw[], pushes: Push[], options = OPTIONS) =>
  compareScenario(drawSetOf(draws), pushes, options);

describe('compareScenario', () => {
  it('gives a comparison that survives JSON and its schema', () => {
    const comparison = compare(spreadAround(COEXISTENCE, 40), [pushOf()]);
    expect(scenarioComparisonSchema.parse(JSON.parse(JSON.stringify(comparison)))).toEqual(comparison);
    expect(comparison.checkpoints.map((one) => one.monthsAhead)).toEqual([6, 12, 24]);
    expect(comparison.difference.share.q50).toHaveLength(24);
  });

  it('equals the baseline to the last digit without a push and with pushes of size 0', () => {
    const scenario = prepareScenario(drawSetOf(spreadAround(HEAD_START, 60)), OPTIONS);
    const nothing = KINDS.map((kind) => pushOf({ kind, size: 0 }));
    for (const pushes of [[], nothing, [pushOf({ size: 0, lengthMonths: null })]]) {
      const comparison = scenario.compare(pushes);
      expect(comparison.pushed).toEqual(comparison.baseline);
      for (const band of Object.values(comparison.difference)) {
        expect(
          Object.values(band)
            .flat()
            .every((value) => value === 0),
        ).toBe(true);
      }
      expect(comparison.odds.after).toEqual(comparison.odds.before);
      expect(comparison.effect).toMatchObject({
        destination: 'stays',
        probabilityMoves: 0,
        reason: 'no-push',
      });
    }
  });

  it('forgets nothing between calls: the same pushes give the same answer whatever came before', () => {
    const scenario = prepareScenario(drawSetOf(spreadAround(HEAD_START, 60)), OPTIONS);
    const first = scenario.compare([pushOf()]);
    scenario.compare([pushOf({ size: 2, kind: 'pull', lengthMonths: null })]);
    expect(scenario.compare([pushOf()])).toEqual(first);
    expect(compareScenario(drawSetOf(spreadAround(HEAD_START, 60)), [pushOf()], OPTIONS)).toEqual(first);
  });

  it.each(KINDS)(
    'a temporary %s leaves the destination of every draw in coexistence and exclusion',
    (kind) => {
      const draws = [COEXISTENCE, EXCLUSION_BY_FOCAL, EXCLUSION_BY_RIVAL].flatMap((draw) =>
        spreadAround(draw, 30),
      );
      // the largest pushes that the controls offer, many times over
      const comparison = compare(draws, [pushOf({ kind, size: 10 * SIZE[kind] })]);
      expect(comparison.effect).toMatchObject({
        destination: 'stays',
        probabilityMoves: 0,
        reason: 'temporary-fades',
      });
      expect(comparison.effect.settledShareDifference).toEqual({ q05: 0, q50: 0, q95: 0 });
      expect(comparison.odds.after).toEqual(comparison.odds.before);
      expect(comparison.destinations.after).toEqual(comparison.destinations.before);
      expect(Math.abs(comparison.effect.worstShareDifference.q50)).toBeGreaterThan(0.01);
    },
  );

  // by hand for firm 1 and u = 1: growth lift alpha/2, 2 beta; pull and room 2 beta; recruits nothing
  it.each([
    ['growth-lift', 0.5, 2],
    ['pull', 1, 2],
    ['room', 1, 2],
    ['recruits', 1, 1],
  ] as const)(
    'moves the odds by a lasting %s as the scaled coefficients move',
    (kind, alphaFactor, betaFactor) => {
      const draws = [COEXISTENCE, EXCLUSION_BY_FOCAL, HEAD_START].flatMap((draw) => spreadAround(draw, 30));
      const { odds } = compare(draws, [pushOf({ firm: 1, kind, size: 1, lengthMonths: null })]);
      for (const outcome of OUTCOMES) {
        const count = draws.filter(
          (draw) => outcomeOf(alphaFactor * draw.alpha, betaFactor * draw.beta) === outcome,
        ).length;
        expect(odds.after[outcome]).toBeCloseTo(count / draws.length, 12);
      }
      if (kind === 'recruits') expect(odds.after).toEqual(odds.before);
      else expect(odds.after.exclusionByFocal + odds.after.headStartDecides).toBeGreaterThan(0.99);
    },
  );

  it('settles a lasting push where its own system settles', () => {
    const push = pushOf({ firm: 1, kind: 'room', size: 0.2, lengthMonths: null });
    const { settledShareDifference, reason } = compare([COEXISTENCE], [push]).effect;
    // by hand: K1 and beta times 1.2; x* = (1-a)/(1-ab), y* = (1-b)/(1-ab)
    const share = (k1: number, a: number, b: number) => {
      const [n1, n2] = [k1 * (1 - a), COEXISTENCE.k2 * (1 - b)];
      return n1 / (n1 + n2);
    };
    expect(reason).toBe('lasting-same-outcome');
    expect(settledShareDifference.q50).toBeCloseTo(share(1200, 0.5, 0.72) - share(1000, 0.5, 0.6), 12);
  });

  it('rests under lasting recruits where growth and recruits cancel', () => {
    const recruits = 12;
    // alone and lasting: r2 n2 (1 - n2/k2) + u = 0
    const draw: Draw = { ...COEXISTENCE, alpha: 0, beta: 0 };
    const { r2, k2 } = draw;
    const rest = (k2 / 2) * (1 + Math.sqrt(1 + (4 * recruits) / (r2 * k2)));
    const { settledShareDifference } = compare(
      [draw],
      [pushOf({ kind: 'recruits', size: recruits, lengthMonths: null })],
    ).effect;
    // the path is followed until a month moves it by less than 1e-6 of K: 1e-5 after dividing by the rate
    expect(settledShareDifference.q50).toBeCloseTo(1000 / (1000 + rest) - 1000 / 1800, 4);
  });

  it('recruits with no dynamics add up', () => {
    const still: Draw = { ...COEXISTENCE, r1: 1e-12, r2: 1e-12, alpha: 0, beta: 0 };
    const { difference } = compare(
      [still],
      [
        pushOf({
          kind: 'recruits',
          size: 10,
          startMonth: 3,
          lengthMonths: 4,
          rampMonths: 0,
          carryOverHalfLifeMonths: 0,
        }),
      ],
    );
    // 10 a month from month 3 to month 7
    expect(difference.rival.q50.slice(0, 10).map((users) => Math.round(users * 1e6) / 1e6)).toEqual([
      0, 0, 0, 10, 20, 30, 40, 40, 40, 40,
    ]);
    expect(difference.focal.q50.every((users) => Math.abs(users) < 1e-6)).toBe(true);
  });

  it('mirrors when the firms are swapped', () => {
    const draws = [...spreadAround(COEXISTENCE, 20), ...spreadAround(HEAD_START, 21)];
    const one = compare(draws, [pushOf({ firm: 2 }), pushOf({ firm: 1, kind: 'recruits', size: 5 })]);
    const two = compare(draws.map(swapDraw), [
      pushOf({ firm: 1 }),
      pushOf({ firm: 2, kind: 'recruits', size: 5 }),
    ]);
    // both integrate the same equations; only the order of sums differs
    const close = (a: number[], b: number[], sign = 1) =>
      a.forEach((value, i) => {
        expect(sign * value).toBeCloseTo(b[i]!, 8);
      });
    close(one.difference.focal.q05, two.difference.rival.q05);
    close(one.difference.rival.q95, two.difference.focal.q95);
    close(one.difference.share.q05, two.difference.share.q95, -1);
    expect(one.odds.before.exclusionByFocal).toBe(two.odds.before.exclusionByRival);
    expect(one.destinations.after.focalAlone).toBe(two.destinations.after.rivalAlone);
    expect(one.effect.probabilityMoves).toBe(two.effect.probabilityMoves);
  });

  it('meets the same luck with and without the push: errors change no difference of levels', () => {
    const draws = spreadAround(COEXISTENCE, 30);
    const exact = compareScenario(drawSetOf(draws, { size: 0, persistence: 0 }), [pushOf()], OPTIONS);
    const noisy = compareScenario(drawSetOf(draws, { size: 0.2, persistence: 0.5 }), [pushOf()], OPTIONS);
    expect(noisy.difference).toEqual(exact.difference);
    const width = ({ pushed }: ScenarioComparison) => pushed.focal.q95[11]! - pushed.focal.q05[11]!;
    expect(width(noisy)).toBeGreaterThan(1.5 * width(exact));
  });

  it('repeats its numbers by the seed alone', () => {
    const draws = drawSetOf(spreadAround(COEXISTENCE, 30));
    expect(compareScenario(draws, [pushOf()], OPTIONS)).toEqual(compareScenario(draws, [pushOf()], OPTIONS));
    expect(compareScenario(draws, [pushOf()], { ...OPTIONS, seed: 8 }).pushed).not.toEqual(
      compareScenario(draws, [pushOf()], OPTIONS).pushed,
    );
  });

  it('never lowers the users of the pushing firm nor raises the other’s by pushing more', () => {
    const draw = fc.record({
      r1: fc.double({ min: 0.02, max: 0.5, noNaN: true }),
      r2: fc.double({ min: 0.02, max: 0.5, noNaN: true }),
      k1: fc.double({ min: 100, max: 5000, noNaN: true }),
      k2: fc.double({ min: 100, max: 5000, noNaN: true }),
      alpha: fc.double({ min: 0, max: 3, noNaN: true }),
      beta: fc.double({ min: 0, max: 3, noNaN: true }),
      n1: fc.double({ min: 1, max: 6000, noNaN: true }),
      n2: fc.double({ min: 1, max: 6000, noNaN: true }),
    });
    const push = fc.record({
      firm: fc.constantFrom(1 as const, 2 as const),
      kind: fc.constantFrom(...KINDS),
      startMonth: fc.nat(12),
      lengthMonths: fc.option(fc.nat(18)),
      size: fc.double({ min: 0, max: 1, noNaN: true }),
      rampMonths: fc.nat(4),
      carryOverHalfLifeMonths: fc.nat(6),
    });
    fc.assert(
      fc.property(draw, push, fc.double({ min: 1, max: 3, noNaN: true }), (one, base, more) => {
        const size = base.kind === 'recruits' ? base.size * 50 : base.size;
        const scenario = prepareScenario(drawSetOf([one]), { horizonMonths: 24, seed: 1 });
        const less = scenario.compare([{ ...base, size }]).difference;
        const greater = scenario.compare([{ ...base, size: size * more }]).difference;
        const [own, other] = base.firm === 1 ? (['focal', 'rival'] as const) : (['rival', 'focal'] as const);
        for (let h = 0; h < 24; h++) {
          // integration error 1e-7 of the level per step
          const slack = 1e-5 * (one.k1 + one.k2 + one.n1 + one.n2);
          expect(greater[own].q50[h]!).toBeGreaterThanOrEqual(less[own].q50[h]! - slack);
          expect(greater[other].q50[h]!).toBeLessThanOrEqual(less[other].q50[h]! + slack);
          expect(less[own].q50[h]!).toBeGreaterThanOrEqual(-slack);
        }
      }),
      { numRuns: 60 },
    );
  });

  it('shakes the level alike with and without the push under process noise, and keeps the destination', () => {
    const draws = processNoiseSetOf(spreadAround(COEXISTENCE, 60), 0.1);
    const scenario = prepareScenario(draws, OPTIONS);
    const nothing = scenario.compare([]);
    expect(nothing.pushed).toEqual(nothing.baseline);
    const { effect, difference } = scenario.compare([pushOf()]);
    expect(effect.probabilityMoves).toBe(0);
    // common shocks: every draw loses share while the push lasts
    expect(difference.share.q95[6]!).toBeLessThan(0);
    const calm = compareScenario(processNoiseSetOf(spreadAround(COEXISTENCE, 60), 0), [], OPTIONS);
    const width = ({ baseline }: ScenarioComparison) => baseline.focal.q95[23]! - baseline.focal.q05[23]!;
    expect(width(nothing)).toBeGreaterThan(width(calm));
  });

  it('refuses a horizon and draws that are none', () => {
    expect(() => compareScenario(drawSetOf([COEXISTENCE]), [], { horizonMonths: 0, seed: 1 })).toThrow(
      /horizonMonths/,
    );
    expect(() => compareScenario({ ...drawSetOf([COEXISTENCE]), count: 0, values: [] }, [], OPTIONS)).toThrow(
      /draws/,
    );
  });

  it('answers a slider: three pushes on 400 draws over 36 months in little processor time', () => {
    const scenario = prepareScenario(drawSetOf(spreadAround(COEXISTENCE, 400)), {
      horizonMonths: 36,
      seed: 1,
    });
    const pushes = [pushOf(), pushOf({ firm: 1, startMonth: 4 }), pushOf({ kind: 'recruits', size: 20 })];
    const times = Array.from({ length: 9 }, () => {
      const before = process.cpuUsage();
      scenario.compare(pushes);
      const { user, system } = process.cpuUsage(before);
      return (user + system) / 1000;
    }).sort((a, b) => a - b);
    // milliseconds; 10 to 15 on the machine it was written on, and three times the 40 that a slider may take
    expect(times[4]).toBeLessThan(120);
  });
});
