import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findSharedEquilibrium } from '@/lib/dynamics/equilibria';
import { separatrixHeight, sideOfSeparatrix, traceSeparatrix } from '@/lib/dynamics/separatrix';
import { type CompetitionSystem, swapFirms } from '@/lib/dynamics/system';
import { anyShares, anySystem, coexistingSystem, headStartSystem, stateOf } from './arbitrary';

const RACE: CompetitionSystem = { r1: 0.3, r2: 0.15, k1: 1000, k2: 800, alpha: 1.28, beta: 1.5 };
/** The trace runs at 1e-11 and starts 1e-6 beside the saddle: 1e-8 leaves room for both. */
const TRACE_TOLERANCE = 1e-8;
/** A state this far off the curve, more of one firm and less of the other, must be told apart by going forwards. */
const SIDE_GAP = 1e-6;

function tracePoints(system: CompetitionSystem, share = 1.5): (readonly [number, number])[] {
  const trace = traceSeparatrix(system, { n1Max: share * system.k1, n2Max: share * system.k2 });
  if (trace.status !== 'traced') throw new Error('the head start decides here');
  return trace.points;
}

describe('separatrixHeight', () => {
  it('is the straight ray y/x = (1 - beta)/(1 - alpha) at equal growth rates', () => {
    fc.assert(
      fc.property(headStartSystem, fc.double({ min: 0.01, max: 2, noNaN: true }), (system, x) => {
        const equal = { ...system, r2: system.r1 };
        const height = separatrixHeight(equal, x * equal.k1)! / equal.k2;
        const ray = (x * (1 - equal.beta)) / (1 - equal.alpha);
        expect(Math.abs(height / ray - 1)).toBeLessThan(TRACE_TOLERANCE);
      }),
    );
  });

  it('agrees with the side told by going forwards, on both sides of the curve', () => {
    fc.assert(
      fc.property(headStartSystem, fc.double({ min: 0.02, max: 1.5, noNaN: true }), (system, x) => {
        const n1 = x * system.k1;
        const height = separatrixHeight(system, n1)!;
        const [more, less] = [1 + SIDE_GAP, 1 - SIDE_GAP];
        expect(sideOfSeparatrix(system, [n1 * more, height * less])).toBe('firstWins');
        expect(sideOfSeparatrix(system, [n1 * less, height * more])).toBe('secondWins');
      }),
    );
  });

  it('passes through the saddle', () => {
    const [n1, n2] = findSharedEquilibrium(RACE)!.point;
    expect(separatrixHeight(RACE, n1)! / n2).toBeCloseTo(1, 12);
    // Left and right of the piece that is taken from the tangent.
    expect(separatrixHeight(RACE, n1 * (1 - 2e-6))!).toBeLessThan(n2);
    expect(separatrixHeight(RACE, n1 * (1 + 2e-6))!).toBeGreaterThan(n2);
  });

  it('is followed to heights that no market has, where the curve is nearly upright', () => {
    const upright = { ...RACE, r1: 0.02, r2: 0.5, alpha: 1.05, beta: 1.7 };
    const height = separatrixHeight(upright, 0.7 * upright.k1)!;
    // Far out dy/dx tends to rho y / (alpha x), so the height grows like x^(rho/alpha), here x^23.8.
    const further = separatrixHeight(upright, 0.77 * upright.k1)!;
    expect(Math.log(further / height) / Math.log(1.1)).toBeCloseTo(25 / 1.05, 3);
  });

  it('belongs to the swapped market with its axes exchanged', () => {
    const height = separatrixHeight(RACE, 400)!;
    expect(separatrixHeight(swapFirms(RACE), height)! / 400).toBeCloseTo(1, 8);
  });

  it('scales with the users and not with the unit of time', () => {
    const height = separatrixHeight(RACE, 400)!;
    expect(separatrixHeight({ ...RACE, k1: 1e6, k2: 8e5 }, 4e5)! / height).toBeCloseTo(1000, 6);
    expect(separatrixHeight({ ...RACE, r1: 3.6, r2: 1.8 }, 400)! / height).toBeCloseTo(1, 8);
  });

  it('is null unless the head start decides', () => {
    fc.assert(
      fc.property(coexistingSystem, (system) => {
        expect(separatrixHeight(system, system.k1 / 2)).toBeNull();
      }),
    );
    expect(separatrixHeight({ ...RACE, alpha: 1 }, 400)).toBeNull();
  });

  it('refuses a number of users that is not positive', () => {
    expect(() => separatrixHeight(RACE, 0)).toThrow('n1');
    expect(() => separatrixHeight(RACE, Number.NaN)).toThrow('n1');
  });
});

describe('traceSeparatrix', () => {
  it('rises from (0, 0) through the saddle to the frame and stays in it', () => {
    fc.assert(
      fc.property(headStartSystem, fc.double({ min: 0.3, max: 3, noNaN: true }), (system, share) => {
        const points = tracePoints(system, share);
        const [endX, endY] = points[points.length - 1];
        expect(points[0]).toEqual([0, 0]);
        expect(Math.max(endX / system.k1, endY / system.k2) / share).toBeCloseTo(1, 9);
        for (let i = 1; i < points.length; i++) {
          expect(points[i][0]).toBeGreaterThanOrEqual(points[i - 1][0]);
          expect(points[i][1]).toBeGreaterThanOrEqual(points[i - 1][1]);
        }
      }),
    );
  });

  it('lies on the separatrix', () => {
    for (const [n1, n2] of tracePoints(RACE).slice(1, -1)) {
      expect(Math.abs(separatrixHeight(RACE, n1)! / n2 - 1)).toBeLessThan(TRACE_TOLERANCE);
    }
  });

  it('is fine enough for a smooth line and short enough to draw', () => {
    const points = tracePoints(RACE);
    expect(points.length).toBeLessThan(300);
    for (let i = 1; i < points.length; i++) {
      const gapX = (points[i][0] - points[i - 1][0]) / (1.5 * RACE.k1);
      const gapY = (points[i][1] - points[i - 1][1]) / (1.5 * RACE.k2);
      expect(Math.max(gapX, gapY)).toBeLessThan(0.03);
    }
  });

  it('stops before the saddle when the frame ends there', () => {
    const [saddleX] = findSharedEquilibrium(RACE)!.point;
    const points = tracePoints(RACE, 0.1);
    expect(points[points.length - 1][0]).toBeLessThan(saddleX);
    expect(points.length).toBeGreaterThan(5);
  });

  it('says which outcome there is when it has nothing to trace', () => {
    expect(traceSeparatrix({ ...RACE, alpha: 0.5 }, { n1Max: 1, n2Max: 1 })).toEqual({
      status: 'none',
      outcome: 'exclusionByFirst',
    });
    expect(traceSeparatrix({ ...RACE, beta: 1 }, { n1Max: 1, n2Max: 1 })).toEqual({
      status: 'none',
      outcome: 'boundary',
    });
  });

  it('refuses a frame without an area', () => {
    expect(() => traceSeparatrix(RACE, { n1Max: 0, n2Max: 1 })).toThrow('n1Max');
    expect(() => traceSeparatrix(RACE, { n1Max: 1, n2Max: Number.NaN })).toThrow('n2Max');
  });
});

describe('sideOfSeparatrix', () => {
  it('exchanges the winner with the firms', () => {
    const swapped = {
      firstWins: 'secondWins',
      secondWins: 'firstWins',
      onSeparatrix: 'onSeparatrix',
    } as const;
    fc.assert(
      fc.property(headStartSystem, anyShares, (system, shares) => {
        const [n1, n2] = stateOf(system, shares);
        const side = sideOfSeparatrix(system, [n1, n2])!;
        fc.pre(side !== 'onSeparatrix');
        expect(sideOfSeparatrix(swapFirms(system), [n2, n1])).toBe(swapped[side]);
      }),
    );
  });

  it('gives the market to the only firm in it', () => {
    expect(sideOfSeparatrix(RACE, [1, 0])).toBe('firstWins');
    expect(sideOfSeparatrix(RACE, [0, 1])).toBe('secondWins');
  });

  it('finds nobody ahead in a market of twins and in an empty one', () => {
    const symmetric = { ...RACE, r2: 0.3, k2: 1000, alpha: 1.5, beta: 1.5 };
    expect(sideOfSeparatrix(symmetric, [100, 100])).toBe('onSeparatrix');
    expect(sideOfSeparatrix(symmetric, [0, 0])).toBe('onSeparatrix');
  });

  it('is null unless the head start decides', () => {
    fc.assert(
      fc.property(anySystem, anyShares, (system, shares) => {
        const side = sideOfSeparatrix(system, stateOf(system, shares));
        expect(side === null).toBe(!(system.alpha > 1 && system.beta > 1));
      }),
    );
  });

  it('refuses negative users', () => {
    expect(() => sideOfSeparatrix(RACE, [-1, 5])).toThrow('state');
    expect(() => sideOfSeparatrix(RACE, [Number.NaN, 5])).toThrow('state');
  });
});
