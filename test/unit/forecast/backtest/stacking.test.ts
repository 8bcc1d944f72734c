import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { mixMembers } from '@/lib/forecast/backtest/members';
import { casePoolCrps, projectOnSimplex, type StackingCase, stack } from '@/lib/forecast/backtest/stacking';
import { standardMembers } from '@/lib/forecast/baselines/baseline';
import { ensembleCrps } from '@/lib/forecast/scores';
import { createStream } from '@/lib/numeric/random';

/** Nearly normal members. */
const BELL = standardMembers(1000, 100);
const around = (centre: number, scale: number) => BELL.map((z) => centre + scale * z);

function makeCases(count: number, seed: number, members: (truth: number) => Float64Array[]): StackingCase[] {
  const stream = createStream(seed, 0);
  return Array.from({ length: count }, (_, i) => {
    const truth = stream.normal();
    return { group: i % 8, actual: truth + 0.3 * stream.normal(), members: members(truth) };
  });
}

describe('stacking', () => {
  it('gives the true model nearly all the weight', () => {
    const cases = makeCases(400, 1, (truth) => [
      around(truth + 1, 0.3),
      around(truth, 0.3),
      around(truth, 3),
    ]);
    const { weights, single, leftOut } = stack(cases);
    expect(weights[1]).toBeGreaterThan(0.95);
    expect(weights.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 10);
    expect(leftOut).toBeLessThan(single[1] * 1.02);
    expect(single.indexOf(Math.min(...single))).toBe(1);
  });

  it('mixes two models that err to either side, and the mixture scores better than each on what it did not see', () => {
    const cases = makeCases(400, 2, (truth) => [around(truth - 0.4, 0.2), around(truth + 0.4, 0.2)]);
    const { weights, single, leftOut } = stack(cases);
    expect(Math.abs(weights[0] - 0.5)).toBeLessThan(0.1);
    expect(leftOut).toBeLessThan(0.9 * Math.min(...single));
  });

  it('reaches a minimum: no move of weight between two methods scores better on the cases it was learnt from', () => {
    const cases = makeCases(60, 3, (truth) => [
      around(truth - 0.3, 0.2),
      around(truth + 0.5, 0.4),
      around(0, 1),
    ]);
    const { weights } = stack(cases);
    const value = (w: number[]) => cases.reduce((sum, item) => sum + casePoolCrps(item, w), 0) / cases.length;
    const best = value(weights);
    for (const from of [0, 1, 2]) {
      for (const to of [0, 1, 2]) {
        const step = Math.min(0.01, weights[from]);
        const moved = weights.map((weight, k) => weight + (k === to ? step : 0) - (k === from ? step : 0));
        expect(value(moved)).toBeGreaterThanOrEqual(best - 1e-9);
      }
    }
  });

  it('learns the weights of a group without that group', () => {
    const cases = makeCases(80, 4, (truth) => [around(truth + 0.5, 0.3), around(truth - 0.5, 0.3)]);
    const changed = cases.map((item) => (item.group === 3 ? { ...item, actual: item.actual + 5 } : item));
    const [before, after] = [stack(cases), stack(changed)];
    expect(after.weightsWithout.get(3)).toEqual(before.weightsWithout.get(3));
    expect(after.weightsWithout.get(2)).not.toEqual(before.weightsWithout.get(2));
  });
});

it('the pool of members has the CRPS of the pooled ensemble', () => {
  const [first, second] = [Float64Array.of(0, 1, 2, 5), Float64Array.of(1, 3, 3.5, 4)];
  const item = { group: 0, actual: 2.2, members: [first, second] };
  expect(casePoolCrps(item, [0.5, 0.5])).toBeCloseTo(ensembleCrps([...first, ...second], 2.2), 12);
  expect(casePoolCrps(item, [1, 0])).toBeCloseTo(ensembleCrps(first, 2.2), 12);
});

it('mixed members are the quantiles of the mixture', () => {
  const mixed = mixMembers([
    { members: around(0, 1), weight: 0.7 },
    { members: around(100, 1), weight: 0.3 },
  ]);
  expect(mixed).toHaveLength(100);
  expect(mixed.filter((value) => value > 50)).toHaveLength(30);
  expect([...mixMembers([{ members: around(3, 2), weight: 1 }])]).toEqual([...around(3, 2)]);
});

it('projecting on the simplex leaves weights that are weights, and nothing nearer', () => {
  fc.assert(
    fc.property(
      fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: 1, maxLength: 6 }),
      (point) => {
        const on = projectOnSimplex(point);
        expect(on.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 9);
        expect(on.every((weight) => weight >= 0)).toBe(true);
        // First-order condition: all positive weights lost the same amount, the others at most gained up to it.
        const shifts = point.map((value, k) => value - on[k]);
        const shift = Math.max(...shifts);
        on.forEach((weight, k) => {
          if (weight > 0) expect(shifts[k]).toBeCloseTo(shift, 9);
        });
      },
    ),
  );
  expect(projectOnSimplex([0.2, 0.3, 0.5])).toEqual([0.2, 0.3, 0.5]);
});
