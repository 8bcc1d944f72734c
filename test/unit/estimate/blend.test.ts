import { describe, expect, it } from 'vitest';
import { judgeBlend, limitsOfPart, type WeightedDraws } from '@/lib/estimate/blend';

const WHOLE = { rHat: 1.01, ess: 400 };
/** A part that has just reached its limits. */
function partAtItsLimits(weight: number): WeightedDraws {
  const { rHatLimit, essLimit } = limitsOfPart(weight, WHOLE);
  return { weight, result: { rHat: rHatLimit, ess: essLimit } as WeightedDraws['result'] };
}

describe('limitsOfPart', () => {
  it.each([[[1]], [[0.6, 0.4]], [[0.5, 0.3, 0.2]], [[0.95, 0.05]]])(
    'lets a blend of weights %j reach what the whole must reach',
    (weights) => {
      const { rHat, ess } = judgeBlend(weights.map(partAtItsLimits));
      expect(ess).toBeGreaterThanOrEqual(WHOLE.ess * (1 - 1e-12));
      // each part may add as much disagreement as its share of the whole allows
      expect(rHat).toBeLessThanOrEqual(1.01 * (1 + 1e-12));
    },
  );

  it('asks no part for less than a hundred draws or an R-hat above 1.05', () => {
    expect(limitsOfPart(0.05, WHOLE)).toEqual({ rHatLimit: 1.05, essLimit: 100 });
  });
});
