import { describe, expect, it } from 'vitest';
import { buildPriors } from '@/lib/estimate/priors';
import { createStarts } from '@/lib/estimate/starts';
import { createStream } from '@/lib/numeric/random';
import { COEXISTING, FIRST_MONTH, observe, simulateSeries, toTheta } from './simulated-market';

function startsOf(series = simulateSeries(COEXISTING, 48, 0, 1)) {
  const observations = observe(series);
  return createStarts(observations, buildPriors(observations), 10, createStream(1, 0));
}

describe('starts', () => {
  it('by gradient matching come within a few percent of the truth on an exact path', () => {
    const start = startsOf().find(({ origin }) => origin === 'gradient-matching')!;
    const truth = toTheta(COEXISTING);
    // interval means stand in for the path between months: 3 % in r and K, a little more in the coefficients
    for (const j of [0, 1, 2, 3]) expect(Math.abs(start.theta[j] - truth[j])).toBeLessThan(0.03);
    for (const j of [4, 5]) expect(Math.abs(start.theta[j] - truth[j])).toBeLessThan(0.1);
  });

  it('by the Leslie form are exact for the discrete map itself', () => {
    // N(t+1) = L N / (1 + b N + c M) with L = e^r, b = (L-1)/K, c = alpha (L-1)/K2
    const { r1, r2, k1, k2, alpha, beta } = COEXISTING;
    const focal = [COEXISTING.n1];
    const rival = [COEXISTING.n2];
    for (let t = 0; t < 30; t++) {
      const crowd1 = focal[t] / k1 + (alpha * rival[t]) / k2;
      const crowd2 = rival[t] / k2 + (beta * focal[t]) / k1;
      focal.push((Math.exp(r1) * focal[t]) / (1 + (Math.exp(r1) - 1) * crowd1));
      rival.push((Math.exp(r2) * rival[t]) / (1 + (Math.exp(r2) - 1) * crowd2));
    }
    const start = startsOf({ firstMonth: FIRST_MONTH, focal, rival }).find(
      ({ origin }) => origin === 'leslie',
    )!;
    const truth = toTheta(COEXISTING);
    // the ridge of 1e-6 is the only error
    for (let j = 0; j < 6; j++) expect(Math.abs(start.theta[j] - truth[j])).toBeLessThan(2e-3);
  });

  it('by Latin hypercube have one point in each tenth of every prior', () => {
    const observations = observe(simulateSeries(COEXISTING, 48, 0.02, 1));
    const priors = buildPriors(observations);
    const cube = startsOf().filter(({ origin }) => origin === 'latin-hypercube');
    expect(cube.length).toBe(10);
    const { meanLog } = priors.parameters.r1;
    expect(cube.filter(({ theta }) => theta[0] < meanLog).length).toBe(5);
  });

  it('stay finite on counts that say nothing', () => {
    for (const focal of [
      new Array(20).fill(3),
      Array.from({ length: 20 }, (_, t) => (t % 2 ? 1e-9 : 1e12)),
    ]) {
      const rival = Array.from({ length: 20 }, (_, t) => 5 + (t % 3));
      for (const { theta } of startsOf({ firstMonth: FIRST_MONTH, focal, rival })) {
        expect(theta.every(Number.isFinite)).toBe(true);
      }
    }
  });
});
