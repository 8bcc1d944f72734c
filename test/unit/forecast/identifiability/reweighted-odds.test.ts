import { describe, expect, it } from 'vitest';
import { createReweighter, MIN_EFFECTIVE } from '@/lib/forecast/identifiability/reweighted-odds';
import { normalCdf } from '@/lib/numeric/normal';
import { createStream } from '@/lib/numeric/random';

const COUNT = 20000;
const stream = createStream(7, 0);
const z = [0, 1].map(() => Float64Array.from({ length: COUNT }, () => 0.5 * stream.normal()));
const reweighter = createReweighter(z[0].map(Math.exp), z[1].map(Math.exp));

/** ln alpha seen as `seen` with an error of sd `error`. */
const likelihood = (seen: number, error: number) => z[0].map((value) => -0.5 * ((value - seen) / error) ** 2);
/** Chance that ln alpha < 0 then: normal prior N(0, 0.5), normal error. */
const below = (seen: number, error: number) => {
  const precision = 4 + error ** -2;
  return normalCdf(-(seen * error ** -2) / precision / Math.sqrt(1 / precision));
};

describe('reweighted odds', () => {
  it('are the shares of draws when nothing was learnt', () => {
    const { odds, effective } = reweighter.odds(new Float64Array(COUNT));
    expect(effective).toBeCloseTo(COUNT, 6);
    // four standard errors of a share of 20,000 draws
    for (const share of Object.values(odds)) expect(Math.abs(share - 0.25)).toBeLessThan(0.0125);
  });

  it('follow Bayes where enough draws carry them', () => {
    const { odds, effective } = reweighter.odds(likelihood(-0.2, 0.3));
    expect(effective).toBeGreaterThan(MIN_EFFECTIVE);
    expect(Math.abs(odds.coexistence + odds.exclusionByFocal - below(-0.2, 0.3))).toBeLessThan(0.02);
  });

  it.each([
    [-0.003, 0.002],
    [-0.001, 0.001],
    [1.8, 0.2],
  ])('follow Bayes where too few draws are left to count: seen %f with error %f', (seen, error) => {
    const { odds, effective } = reweighter.odds(likelihood(seen, error).map((value) => 3 * value));
    if (seen < 1) expect(effective).toBeLessThan(MIN_EFFECTIVE * 2);
    const wanted = below(seen, error / Math.sqrt(3));
    expect(Math.abs(odds.coexistence + odds.exclusionByFocal - wanted)).toBeLessThan(0.12);
  });

  it('give chances that add to 1, also from the normal', () => {
    const { odds } = reweighter.odds(likelihood(2.2, 0.01));
    expect(Object.values(odds).reduce((a, b) => a + b, 0)).toBeCloseTo(1, 10);
  });
});
