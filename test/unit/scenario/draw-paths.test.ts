import { describe, expect, it } from 'vitest';
import { SEASON_MONTHS } from '@/lib/estimate/kalman-filter';
import { seasonColumn } from '@/lib/estimate/state-posterior';
import type { DrawSet } from '@/lib/estimate/types';
import { computeSeriesBands } from '@/lib/forecast/bands';
import { simulateLevels, simulateObservations } from '@/lib/forecast/simulate';
import { compareScenario } from '@/lib/scenario/compare';
import { tracePushedPath } from '@/lib/scenario/draw-paths';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { COEXISTENCE, drawSetOf, HEAD_START, processNoiseSetOf, pushOf, spreadAround } from './draw-cases';

const OPTIONS = { horizonMonths: 24, seed: 7 };
/** Enough recruits to carry some of the head-start draws over. */
const pulse = pushOf({
  kind: 'recruits',
  size: 12,
  startMonth: 0,
  rampMonths: 0,
  carryOverHalfLifeMonths: 0,
});

describe('pushed paths', () => {
  const draws = [...spreadAround({ ...HEAD_START, n2: 205 }, 40), ...spreadAround(COEXISTENCE, 20)];
  const prepared = prepareScenario(drawSetOf(draws), OPTIONS);

  it('cross in as many draws as the comparison counts', () => {
    const paths = prepared.samplePaths([pulse], draws.length);
    const { crossing, effect } = prepared.compare([pulse]);
    expect(crossing).toEqual({
      draws: paths.filter((path) => path.isHeadStart).length,
      crossed: paths.filter((path) => path.hasCrossed).length,
    });
    expect(crossing!.draws).toBe(40);
    expect(crossing!.crossed).toBeGreaterThan(0);
    expect(crossing!.crossed).toBeLessThan(40);
    // nothing else moves the destination of a temporary push
    expect(effect.probabilityMoves).toBe(crossing!.crossed / draws.length);
  });

  it('start in the last observed month and reach as far as the horizon', () => {
    const [path] = prepared.samplePaths([pulse], 1);
    expect(path!.baseline).toHaveLength(25);
    expect(path!.pushed).toHaveLength(25);
    expect(path!.pushed[0]).toEqual([draws[0]!.n1, draws[0]!.n2]);
    expect(path!.baseline[0]).toEqual(path!.pushed[0]);
  });

  it('are the baseline to the last digit without a push', () => {
    for (const path of prepared.samplePaths([pushOf({ size: 0 })], 10)) {
      expect(path.pushed).toEqual(path.baseline);
      expect(path.hasCrossed).toBe(false);
    }
  });

  it('are taken evenly from all draws, at most as many as there are', () => {
    expect(prepared.samplePaths([], 6).map(({ baseline }) => baseline[0]![0])).toEqual(
      [0, 10, 20, 30, 40, 50].map((i) => draws[i]!.n1),
    );
    expect(prepared.samplePaths([], 1000)).toHaveLength(draws.length);
  });

  it('never cross where a lasting push takes the tipping line away', () => {
    const lasting = pushOf({ firm: 1, kind: 'growth-lift', size: 1, lengthMonths: null });
    const { isHeadStart, hasCrossed } = tracePushedPath(HEAD_START, [300, 200], [lasting], 24);
    // alpha 1.5 / 2 is below 1: exclusion by the focal firm
    expect({ isHeadStart, hasCrossed }).toEqual({ isHeadStart: false, hasCrossed: false });
  });
});

describe('the baseline of a scenario', () => {
  /** Process-noise draws with a yearly cycle of the focal firm, as the fit gives them. */
  function seasonal(): DrawSet {
    const plain = processNoiseSetOf(spreadAround(COEXISTENCE, 400), 0.02);
    const width = plain.columns.length;
    const offsets = [1, 2].flatMap((firm) =>
      Array.from({ length: SEASON_MONTHS }, (_, m) => ({
        column: seasonColumn(firm as 1 | 2, m + 1),
        value: firm === 1 ? 0.3 * Math.sin((2 * Math.PI * (m + 1)) / SEASON_MONTHS) : 0,
      })),
    );
    const values = Array.from({ length: plain.count }, (_, i) => [
      ...Array.from(plain.values.slice(i * width, (i + 1) * width)),
      ...offsets.map(({ value }) => value),
    ]).flat();
    return { ...plain, columns: [...plain.columns, ...offsets.map(({ column }) => column)], values };
  }

  it.each([
    ['without a yearly cycle', processNoiseSetOf(spreadAround(COEXISTENCE, 400), 0.02)],
    ['with one', seasonal()],
  ])('is the outlook of the same draws, %s', (_, draws) => {
    const levels = simulateLevels(draws, OPTIONS.horizonMonths, OPTIONS.seed);
    const outlook = computeSeriesBands(simulateObservations(draws, levels, OPTIONS.seed, 10));
    const { baseline } = compareScenario(draws, [], OPTIONS);
    for (const key of ['focal', 'rival'] as const) {
      baseline[key].q50.forEach((users, h) => {
        // other random errors on the same levels: 400 draws of 5 % error put a median within half a percent, three of them
        expect(Math.abs(users / outlook[key].q50[h]! - 1)).toBeLessThan(0.02);
      });
    }
  });

  it('swings with the year where the draws do', () => {
    const [with_, without] = [seasonal(), processNoiseSetOf(spreadAround(COEXISTENCE, 400), 0.02)].map(
      (draws) => compareScenario(draws, [], OPTIONS).baseline.focal.q50,
    );
    // sin at months 3 and 9: +-0.3
    expect(with_![2]! / without![2]!).toBeCloseTo(Math.exp(0.3), 6);
    expect(with_![8]! / without![8]!).toBeCloseTo(Math.exp(-0.3), 6);
  });
});
