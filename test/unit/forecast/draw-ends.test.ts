import { describe, expect, it } from 'vitest';
import { findDestination } from '@/lib/dynamics/destination';
import { findDrawEnds, WINDOW_MONTHS } from '@/lib/forecast/draw-ends';
import { readDrawTable } from '@/lib/forecast/draw-table';
import { computeNearDestination, computeOvertaking } from '@/lib/forecast/milestones';
import { createStream } from '@/lib/numeric/random';
import { drawSet, repeat } from './draw-sets';

const endsOf = (rows: Record<string, number>[]) =>
  findDrawEnds(readDrawTable(drawSet('process-noise', rows)));

describe('where draws end', () => {
  it('is the shared equilibrium, or one firm alone', () => {
    const ends = endsOf([
      { alpha: 0.5, beta: 0.4 },
      { alpha: 0.5, beta: 1.4 },
      { alpha: 1.5, beta: 0.4 },
    ]);
    expect(ends.n1End[0]).toBeCloseTo((9e5 * 0.5) / 0.8, 4);
    expect(ends.n2End[0]).toBeCloseTo((7e5 * 0.6) / 0.8, 4);
    expect([ends.n1End[1], ends.n2End[1]]).toEqual([9e5, 0]);
    expect([ends.n1End[2], ends.n2End[2]]).toEqual([0, 7e5]);
    expect(ends.headStartCount).toBe(0);
  });

  it('agrees with the traced separatrix when the head start decides', () => {
    const stream = createStream(8, 0);
    const rows = Array.from({ length: 60 }, () => ({
      alpha: 1.05 + stream.uniform(),
      beta: 1.05 + stream.uniform(),
      n1: 9e5 * (0.05 + stream.uniform()),
      n2: 7e5 * (0.05 + stream.uniform()),
    }));
    const ends = endsOf(rows);
    let firstWins = 0;
    rows.forEach(({ alpha, beta, n1, n2 }, i) => {
      const system = { r1: 0.15, r2: 0.19, k1: 9e5, k2: 7e5, alpha, beta };
      const place = findDestination(system, [n1, n2])?.place;
      if (!place) return;
      expect(ends.n1End[i] > 0).toBe(place === 'firstAlone');
      if (place === 'firstAlone') firstWins++;
    });
    expect(ends.headStartCount).toBe(60);
    expect(ends.headStartFocalWins).toBe(firstWins);
    expect(firstWins).toBeGreaterThan(10);
    expect(firstWins).toBeLessThan(50);
  });

  it('has the half-life of return of a logistic curve when the firms are apart', () => {
    const [halfLife] = endsOf([{ alpha: 1e-9, beta: 1e-9 }]).halfLife;
    // the slower of the two growth rates
    expect(halfLife).toBeCloseTo(Math.LN2 / 0.15, 6);
  });
});

describe('milestones', () => {
  it('name the month in which the firm behind takes the lead', () => {
    // both firms alone and equal but for the start: N2 leads until N1, growing faster, passes it
    const rows = repeat(30, {
      r1: 0.3,
      r2: 0.1,
      k1: 1e6,
      k2: 1e6,
      alpha: 1e-9,
      beta: 1e-9,
      n1: 1e4,
      n2: 2e4,
    });
    const { monthsAhead, chance, overtaker } = computeOvertaking(endsOf(rows), 'focal');
    const logistic = (r: number, n: number, t: number) => 1e6 / (1 + (1e6 / n - 1) * Math.exp(-r * t));
    const month = monthsAhead!.q50;
    expect(logistic(0.3, 1e4, month) / logistic(0.1, 2e4, month)).toBeCloseTo(1, 2);
    expect([chance, overtaker]).toEqual([1, 'focal']);
  });

  it('say never when it never comes', () => {
    const { monthsAhead, chance } = computeOvertaking(
      endsOf(repeat(30, { n1: 1e4, n2: 6e5, alpha: 1.5 })),
      'focal',
    );
    expect([monthsAhead, chance]).toEqual([null, 0]);
  });

  it('count the months until the market stays near its destination', () => {
    const near = computeNearDestination(endsOf(repeat(30, { n1: (9e5 * 0.5) / 0.8, n2: (7e5 * 0.6) / 0.8 })));
    expect(near).toMatchObject({ chance: 1, windowMonths: WINDOW_MONTHS, monthsAhead: { q50: 0 } });
    const far = computeNearDestination(endsOf(repeat(30, { r1: 1e-3, r2: 1e-3 })));
    expect([far.chance, far.monthsAhead]).toEqual([0, null]);
  });
});
