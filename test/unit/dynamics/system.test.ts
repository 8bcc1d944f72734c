import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  assertSystem,
  type CompetitionSystem,
  fillGrowth,
  fillJacobian,
  fromCrowdingForm,
  swapFirms,
  toCrowdingForm,
  toPerUserEffects,
  toScaledSystem,
} from '@/lib/dynamics/system';
import { anyShares, anySystem, stateOf } from './arbitrary';

const MARKET: CompetitionSystem = { r1: 0.25, r2: 0.2, k1: 1000, k2: 800, alpha: 0.56, beta: 1.125 };
/** A handful of multiplications and divisions: a few units in the last place. */
const ROUNDING = 1e-14;

function growthOf(system: CompetitionSystem, state: ArrayLike<number>): Float64Array {
  const out = new Float64Array(2);
  fillGrowth(system, state, out);
  return out;
}

describe('fillGrowth', () => {
  it('gives the logistic growth of each firm when the other has no users', () => {
    expect(growthOf(MARKET, [400, 0])).toEqual(Float64Array.of(0.25 * 400 * (1 - 0.4), 0));
    expect(growthOf(MARKET, [0, 200])).toEqual(Float64Array.of(0, 0.2 * 200 * (1 - 0.25)));
  });

  it('is the same in the crowding form and in the per-user form', () => {
    fc.assert(
      fc.property(anySystem, anyShares, (system, shares) => {
        const [n1, n2] = stateOf(system, shares);
        const growth = growthOf(system, [n1, n2]);
        const b = toCrowdingForm(system);
        const { a12, a21 } = toPerUserEffects(system);
        const crowding = [n1 * (b.r1 - b.b11 * n1 - b.b12 * n2), n2 * (b.r2 - b.b22 * n2 - b.b21 * n1)];
        const perUser = [
          system.r1 * n1 * (1 - (n1 + a12 * n2) / system.k1),
          system.r2 * n2 * (1 - (n2 + a21 * n1) / system.k2),
        ];
        // The bracket may cancel: the error is measured against r N times the size of its terms.
        const scale = [system.r1 * n1 * 6, system.r2 * n2 * 6];
        for (const other of [crowding, perUser]) {
          expect(Math.abs(growth[0] - other[0])).toBeLessThanOrEqual(ROUNDING * scale[0]);
          expect(Math.abs(growth[1] - other[1])).toBeLessThanOrEqual(ROUNDING * scale[1]);
        }
      }),
    );
  });
});

describe('fillJacobian', () => {
  it('agrees with central differences, which are exact for a quadratic', () => {
    fc.assert(
      fc.property(anySystem, anyShares, (system, shares) => {
        const state = stateOf(system, shares);
        const jacobian = new Float64Array(4);
        fillJacobian(system, state, jacobian);
        for (const j of [0, 1]) {
          const step = state[j] / 64;
          const up = growthOf(
            system,
            state.map((value, i) => value + (i === j ? step : 0)),
          );
          const down = growthOf(
            system,
            state.map((value, i) => value - (i === j ? step : 0)),
          );
          for (const i of [0, 1]) {
            const difference = (up[i] - down[i]) / (2 * step);
            const scale = (Math.abs(up[i]) + Math.abs(down[i]) + state[i] * 0.5) / step;
            expect(Math.abs(difference - jacobian[2 * i + j])).toBeLessThanOrEqual(ROUNDING * scale);
          }
        }
      }),
    );
  });
});

describe('forms of the system', () => {
  it('come back unchanged from the crowding form', () => {
    fc.assert(
      fc.property(anySystem, (system) => {
        const back = fromCrowdingForm(toCrowdingForm(system))!;
        for (const id of ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta'] as const) {
          expect(Math.abs(back[id] - system[id])).toBeLessThanOrEqual(ROUNDING * system[id]);
        }
      }),
    );
  });

  it('have no saturation level when a firm does not crowd itself', () => {
    expect(fromCrowdingForm({ r1: 0.1, r2: 0.1, b11: 0, b12: 1e-4, b21: 1e-4, b22: 1e-4 })).toBeNull();
    expect(fromCrowdingForm({ r1: 0.1, r2: 0.1, b11: 1e-4, b12: 1e-4, b21: 1e-4, b22: 0 })).toBeNull();
  });

  it('keep alpha and beta in the scaled form, with the ratio of the growth rates', () => {
    expect(toScaledSystem(MARKET)).toEqual({ rho: 0.8, alpha: 0.56, beta: 1.125 });
  });

  it('exchange the firms and come back after a second exchange', () => {
    expect(swapFirms(MARKET)).toEqual({ r1: 0.2, r2: 0.25, k1: 800, k2: 1000, alpha: 1.125, beta: 0.56 });
    expect(swapFirms(swapFirms(MARKET))).toEqual(MARKET);
  });
});

describe('assertSystem', () => {
  it.each([
    ['r1', 0],
    ['r2', Number.NaN],
    ['k1', Number.POSITIVE_INFINITY],
    ['k2', -1],
    ['alpha', -0.1],
    ['beta', Number.NaN],
  ])('names %s when it is %d', (id, value) => {
    expect(() => assertSystem({ ...MARKET, [id]: value })).toThrow(`system.${id}`);
  });

  it('accepts independent growth, alpha = beta = 0', () => {
    expect(() => assertSystem({ ...MARKET, alpha: 0, beta: 0 })).not.toThrow();
  });
});
