import { describe, expect, it } from 'vitest';
import { ar1LogLikelihood } from '@/lib/estimate/ar1-errors';
import { choleskyOrNull } from '@/lib/numeric/cholesky';
import { createStream } from '@/lib/numeric/random';

const stream = createStream(4, 0);
const months = Int32Array.from([0, 1, 2, 5, 6, 9, 10]);
const firm = { entry: 0, months, logCounts: Float64Array.from(months, () => 10 + 0.1 * stream.normal()) };
const level = new Float64Array(11).map(() => 10 + 0.02 * stream.normal());
const [logSize, logit, floor] = [Math.log(0.08), 0.7, 0.05];

describe('persistent errors', () => {
  it('have the density of the full normal distribution with correlations phi^gap', () => {
    const phi = 1 / (1 + Math.exp(-logit));
    const variance = 0.08 ** 2 + floor ** 2;
    const n = months.length;
    const covariance = new Float64Array(n * n);
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) covariance[i * n + j] = variance * phi ** Math.abs(months[i] - months[j]);
    const lower = choleskyOrNull(covariance, n)!;
    let expected = 0;
    const z: number[] = [];
    for (let i = 0; i < n; i++) {
      let sum = firm.logCounts[i] - level[months[i]];
      for (let k = 0; k < i; k++) sum -= lower[i * n + k] * z[k];
      z.push(sum / lower[i * n + i]);
      expected -= Math.log(lower[i * n + i]) + 0.5 * z[i] ** 2;
    }
    expect(ar1LogLikelihood(firm, level, logSize, logit, floor, null)).toBeCloseTo(expected, 9);
  });

  it('have a gradient that agrees with differences', () => {
    const gradient = { level: new Float64Array(level.length), logSize: 0, logitPersistence: 0 };
    ar1LogLikelihood(firm, level, logSize, logit, floor, gradient);
    const slope = (at: (step: number) => number) => (at(1e-6) - at(-1e-6)) / 2e-6;
    const bySize = slope((step) => ar1LogLikelihood(firm, level, logSize + step, logit, floor, null));
    const byLogit = slope((step) => ar1LogLikelihood(firm, level, logSize, logit + step, floor, null));
    expect(Math.abs(gradient.logSize - bySize)).toBeLessThan(1e-6);
    expect(Math.abs(gradient.logitPersistence - byLogit)).toBeLessThan(1e-6);
    for (let t = 0; t < level.length; t++) {
      const byLevel = slope((step) =>
        ar1LogLikelihood(
          firm,
          level.map((value, k) => (k === t ? value + step : value)),
          logSize,
          logit,
          floor,
          null,
        ),
      );
      expect(Math.abs(gradient.level[t] - byLevel)).toBeLessThan(1e-5);
    }
  });
});
