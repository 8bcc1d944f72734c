import { describe, expect, it } from 'vitest';
import { A, C, DENSE, ERROR, STAGES } from '@/lib/dynamics/dormand-prince-tableau';

/** Sums of fractions of size up to 400, in doubles. */
const ROUNDING = 13;
const weights = A.slice((STAGES - 1) * STAGES);

function dot(a: ArrayLike<number>, b: (i: number) => number): number {
  return Array.from(a).reduce((sum, value, i) => sum + value * b(i), 0);
}

describe('Dormand-Prince tableau', () => {
  it('has rows that sum to their nodes', () => {
    for (let s = 0; s < STAGES; s++) {
      expect(dot(A.slice(s * STAGES, (s + 1) * STAGES), () => 1)).toBeCloseTo(C[s], ROUNDING);
    }
  });

  it('is strictly lower triangular', () => {
    for (let s = 0; s < STAGES; s++) for (let j = s; j < STAGES; j++) expect(A[s * STAGES + j]).toBe(0);
  });

  it('integrates 1, t, ... t^4 exactly, and t^3 with the embedded order four', () => {
    for (let power = 0; power <= 4; power++) {
      expect(dot(weights, (i) => C[i] ** power)).toBeCloseTo(1 / (power + 1), ROUNDING);
    }
    for (let power = 0; power <= 3; power++) {
      expect(dot(ERROR, (i) => C[i] ** power)).toBeCloseTo(0, ROUNDING);
    }
    expect(Math.abs(dot(ERROR, (i) => C[i] ** 4))).toBeGreaterThan(1e-4);
  });

  it('has a dense output that is exact for 1, t, t^2 and t^3 as slopes', () => {
    // Between the steps y(s) = integral of t^power = s^(power + 1)/(power + 1), with k_i = C_i^power.
    for (let power = 0; power <= 3; power++) {
      const slope = (i: number) => C[i] ** power;
      const change = dot(weights, slope);
      const bend = slope(0) - change;
      const last = change - slope(STAGES - 1) - bend;
      const fourth = dot(DENSE, slope);
      for (const s of [0.2, 0.5, 0.9]) {
        const y = s * (change + (1 - s) * (bend + s * (last + (1 - s) * fourth)));
        expect(y).toBeCloseTo(s ** (power + 1) / (power + 1), 12);
      }
    }
  });
});
