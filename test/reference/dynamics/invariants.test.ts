/**
 * Statements about the competitive growth system that are exact for every parameter (proved by hand), as property tests:
 *   (a) without the other firm, the closed logistic        (d) r1 = r2: the ray N1/N2 = (K1 - a12 K2)/(K2 - a21 K1) is invariant
 *   (b) twins: the logistic with K/(1 + alpha)             (e) swap, rescaled users, rescaled time change nothing else
 *   (c) alpha = beta = 1, K equal: ln(N1/N1(0))/r1 = ln(N2/N2(0))/r2     (f) the verdict never depends on the growth rates
 * (a'): alpha = beta = 0 gives two logistics.
 */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { integrate } from '@/lib/dynamics/integrate';
import { classifyOutcome } from '@/lib/dynamics/outcome';
import { type CompetitionSystem, fillGrowth, type State, swapFirms } from '@/lib/dynamics/system';

fc.configureGlobal({ seed: 1926, numRuns: 60, endOnFailure: true });

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const rate = number(0.02, 0.5);
const level = number(10, 1e6);
const coefficient = number(0, 3);
const share = number(0.01, 1.5);
const month = number(0.5, 60);
const anySystem: fc.Arbitrary<CompetitionSystem> = fc.record({
  r1: rate,
  r2: rate,
  k1: level,
  k2: level,
  alpha: coefficient,
  beta: coefficient,
});
/** Local tolerance 1e-12 over at most some hundred steps; paths that part can stretch an error a hundredfold. */
const PATH_TOLERANCE = 1e-8;

function usersAt(system: CompetitionSystem, start: State, t: number): State {
  const run = integrate((_, y, out) => fillGrowth(system, y, out), 0, start, t, {
    relativeTolerance: 1e-12,
    absoluteTolerance: 0,
  });
  expect(run.status).toBe('reached-end');
  return [run.y[0], run.y[1]];
}

function logistic(r: number, k: number, start: number, t: number): number {
  return k / (1 + (k / start - 1) * Math.exp(-r * t));
}

function expectRatio(found: number, wanted: number): void {
  expect(Math.abs(found / wanted - 1)).toBeLessThan(PATH_TOLERANCE);
}

describe('exact invariants', () => {
  it('(a) a firm without a rival follows the closed logistic', () => {
    fc.assert(
      fc.property(anySystem, share, month, (system, x, t) => {
        const [n1, n2] = usersAt(system, [x * system.k1, 0], t);
        expectRatio(n1, logistic(system.r1, system.k1, x * system.k1, t));
        expect(n2).toBe(0);
      }),
    );
  });

  it("(a') firms that do not compete follow two logistics", () => {
    fc.assert(
      fc.property(anySystem, share, share, month, (raw, x, y, t) => {
        const system = { ...raw, alpha: 0, beta: 0 };
        const [n1, n2] = usersAt(system, [x * system.k1, y * system.k2], t);
        expectRatio(n1, logistic(system.r1, system.k1, x * system.k1, t));
        expectRatio(n2, logistic(system.r2, system.k2, y * system.k2, t));
      }),
    );
  });

  it('(b) twins follow the logistic with K/(1 + alpha)', () => {
    fc.assert(
      fc.property(anySystem, share, month, (raw, x, t) => {
        // Below 1 twins stay twins; above 1 the smallest rounding grows until one of them wins.
        const alpha = raw.alpha / 3;
        const system = { r1: raw.r1, r2: raw.r1, k1: raw.k1, k2: raw.k1, alpha, beta: alpha };
        const [n1, n2] = usersAt(system, [x * system.k1, x * system.k1], t);
        expectRatio(n1, logistic(system.r1, system.k1 / (1 + alpha), x * system.k1, t));
        expectRatio(n2, n1);
      }),
    );
  });

  it('(b) has the published values: r 0.25, K 1000, a 0.6, N(0) 30', () => {
    const system = { r1: 0.25, r2: 0.25, k1: 1000, k2: 1000, alpha: 0.6, beta: 0.6 };
    expect(usersAt(system, [30, 30], 12)[0]).toBeCloseTo(314.474345, 6);
    expect(usersAt(system, [30, 30], 24)[1]).toBeCloseTo(595.713578, 6);
  });

  it('(c) full mutual competition keeps ln N1/r1 - ln N2/r2', () => {
    fc.assert(
      fc.property(anySystem, share, share, month, (raw, x, y, t) => {
        const system = { ...raw, k2: raw.k1, alpha: 1, beta: 1 };
        const start: State = [x * system.k1, y * system.k2];
        const [n1, n2] = usersAt(system, start, t);
        const difference = Math.log(n1 / start[0]) / system.r1 - Math.log(n2 / start[1]) / system.r2;
        expect(Math.abs(difference) * Math.min(system.r1, system.r2)).toBeLessThan(PATH_TOLERANCE);
      }),
    );
  });

  it('(d) with equal growth rates the ray through the shared point is invariant', () => {
    fc.assert(
      fc.property(anySystem, number(0, 0.95), number(0, 0.95), share, month, (raw, alpha, beta, x, t) => {
        const system = { ...raw, r2: raw.r1, alpha, beta };
        const ratio = ((1 - beta) * system.k2) / ((1 - alpha) * system.k1);
        const [n1, n2] = usersAt(system, [x * system.k1, x * system.k1 * ratio], t);
        expectRatio(n2 / n1, ratio);
      }),
    );
  });

  it('(e) swapping the firms swaps the path', () => {
    fc.assert(
      fc.property(anySystem, share, share, month, (system, x, y, t) => {
        const start: State = [x * system.k1, y * system.k2];
        const [n1, n2] = usersAt(system, start, t);
        const [m2, m1] = usersAt(swapFirms(system), [start[1], start[0]], t);
        expectRatio(m1, n1);
        expectRatio(m2, n2);
      }),
    );
  });

  it('(e) the unit of users and the unit of time change nothing else', () => {
    fc.assert(
      fc.property(anySystem, share, share, month, number(0.01, 100), (system, x, y, t, scale) => {
        const start: State = [x * system.k1, y * system.k2];
        const [n1, n2] = usersAt(system, start, t);
        const more = { ...system, k1: scale * system.k1, k2: scale * system.k2 };
        const inMore = usersAt(more, [scale * start[0], scale * start[1]], t);
        const slower = { ...system, r1: system.r1 / scale, r2: system.r2 / scale };
        const inSlower = usersAt(slower, start, t * scale);
        expectRatio(inMore[0], scale * n1);
        expectRatio(inMore[1], scale * n2);
        expectRatio(inSlower[0], n1);
        expectRatio(inSlower[1], n2);
      }),
    );
  });

  it('(e) starting later is the same path seen later', () => {
    fc.assert(
      fc.property(anySystem, share, share, month, number(0.1, 0.9), (system, x, y, t, part) => {
        const start: State = [x * system.k1, y * system.k2];
        const whole = usersAt(system, start, t);
        const twice = usersAt(system, usersAt(system, start, part * t), (1 - part) * t);
        expectRatio(twice[0], whole[0]);
        expectRatio(twice[1], whole[1]);
      }),
    );
  });

  it('(f) the verdict is the same for all growth rates', () => {
    fc.assert(
      fc.property(anySystem, rate, rate, (system, r1, r2) => {
        expect(classifyOutcome({ ...system, r1, r2 })).toBe(classifyOutcome(system));
      }),
    );
  });
});
