import { describe, expect, it } from 'vitest';
import { fitLogScale } from '@/lib/estimate/log-scale';
import { createStream } from '@/lib/numeric/random';

describe('fitLogScale', () => {
  it('finds middle and slopes of a spread that depends on a covariate, and none where there is none', () => {
    const stream = createStream(4, 0);
    const weights = Array.from({ length: 4000 }, () => Float64Array.of(stream.normal(), stream.normal()));
    const values = Float64Array.from(weights, ([w]) => 3 + Math.exp(-1 + 0.4 * w) * stream.normal());
    const { middle, slopes } = fitLogScale(values, weights);
    // four standard errors: 0.4 / sqrt(4000) of the middle, 1 / sqrt(2 x 4000) of a slope; cut squares and the prior cost a little
    expect(Math.abs(middle - 3)).toBeLessThan(0.03);
    expect(Math.abs(slopes[0] - 0.4)).toBeLessThan(0.06);
    expect(Math.abs(slopes[1])).toBeLessThan(0.05);
  });

  it('gives slopes of 0 for values that do not vary', () => {
    const weights = [1, 2, 3].map((w) => Float64Array.of(w));
    expect([...fitLogScale(Float64Array.of(5, 5, 5), weights).slopes]).toEqual([0]);
  });
});
