import { describe, expect, it } from 'vitest';
import { computeBands, shareOf } from '@/lib/forecast/bands';
import { computeOdds, DECIDED_ABOVE, decideOutcome, outcomeOf } from '@/lib/forecast/odds';

describe('the odds', () => {
  it('are the shares of draws in the four quarters', () => {
    const alpha = Float64Array.of(0.5, 0.5, 1.5, 1.5, 0.9);
    const beta = Float64Array.of(0.5, 1.5, 0.5, 1.5, 0.9);
    expect(computeOdds(alpha, beta)).toEqual({
      coexistence: 0.4,
      exclusionByFocal: 0.2,
      exclusionByRival: 0.2,
      headStartDecides: 0.2,
    });
  });

  it('exchange the firms with the coefficients', () => {
    expect(outcomeOf(0.5, 1.5)).toBe('exclusionByFocal');
    expect(outcomeOf(1.5, 0.5)).toBe('exclusionByRival');
  });

  it('decide only above two thirds', () => {
    const even = { coexistence: 0.34, exclusionByFocal: 0.33, exclusionByRival: 0.33, headStartDecides: 0 };
    expect(decideOutcome(even)).toBeNull();
    const edge = {
      ...even,
      coexistence: DECIDED_ABOVE,
      exclusionByFocal: 1 - DECIDED_ABOVE,
      exclusionByRival: 0,
    };
    expect(decideOutcome(edge)).toBeNull();
    expect(decideOutcome({ ...edge, coexistence: DECIDED_ABOVE + 0.001 })).toBe('coexistence');
  });
});

describe('the bands', () => {
  it('are the quantiles of each month', () => {
    const values = Float64Array.from({ length: 202 }, (_, i) => (i < 101 ? 100 - i : 1000 + (i - 101)));
    const bands = computeBands(values, { months: 2, count: 101 });
    expect(bands.q05).toEqual([5, 1005]);
    expect(bands.q25).toEqual([25, 1025]);
    expect(bands.q50).toEqual([50, 1050]);
    expect(bands.q75).toEqual([75, 1075]);
    expect(bands.q95).toEqual([95, 1095]);
  });

  it('give half the share to each when nobody is left', () => {
    expect(shareOf(0, 0)).toBe(0.5);
    expect(shareOf(3, 1)).toBe(0.75);
  });
});
