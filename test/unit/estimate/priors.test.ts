import { describe, expect, it } from 'vitest';
import {
  buildPriors,
  computePriorCells,
  createLogPrior,
  drawFromPrior,
  USUAL_PRIORS,
} from '@/lib/estimate/priors';
import { createStream } from '@/lib/numeric/random';
import { COEXISTING, observe, simulateSeries, toTheta } from './simulated-market';

const priors = buildPriors(observe(simulateSeries(COEXISTING, 36, 0.03, 1)));

describe('the prior', () => {
  it('centres growth and saturation where the method says', () => {
    expect(priors.parameters.r1).toEqual({ meanLog: Math.log(0.15), sdLog: 0.8 });
    const largest = Math.max(...simulateSeries(COEXISTING, 36, 0.03, 1).focal.map(Number));
    expect(priors.parameters.k1.meanLog).toBeCloseTo(Math.log(largest) + 0.5, 12);
  });

  it('has a gradient that agrees with differences, on both sides of the mixture', () => {
    const logPrior = createLogPrior(priors);
    for (const shift of [0, -1.2, -2.5]) {
      const theta = toTheta(COEXISTING);
      theta[4] += shift;
      theta[5] += shift / 2;
      const gradient = new Float64Array(8);
      logPrior(theta, gradient);
      for (let j = 0; j < 8; j++) {
        const at = (step: number) =>
          logPrior(
            theta.map((value, k) => (k === j ? value + step : value)),
            null,
          );
        expect(Math.abs(gradient[j] - (at(1e-5) - at(-1e-5)) / 2e-5)).toBeLessThan(1e-7);
      }
    }
  });

  it('gives the cells of the odds that its draws have', () => {
    const cells = computePriorCells(priors);
    expect(cells.bothBelow + cells.alphaBelow + cells.betaBelow + cells.bothAbove).toBeCloseTo(1, 12);
    expect(cells.alphaBelow).toBeCloseTo(cells.betaBelow, 12);
    const stream = createStream(1, 0);
    const theta = new Float64Array(8);
    const draws = 20_000;
    let both = 0;
    for (let i = 0; i < draws; i++) {
      drawFromPrior(priors, stream, theta);
      if (theta[4] < 0 && theta[5] < 0) both++;
    }
    // four standard errors of a share of 20,000 draws
    expect(Math.abs(both / draws - cells.bothBelow)).toBeLessThan(4 * Math.sqrt(0.25 / draws));
  });

  it('keeps hardly any competition reachable: a tenth or more of the prior has alpha and beta below 0.2', () => {
    const stream = createStream(2, 0);
    const theta = new Float64Array(8);
    let low = 0;
    for (let i = 0; i < 10_000; i++) {
      drawFromPrior(priors, stream, theta);
      if (theta[4] < Math.log(0.2) && theta[5] < Math.log(0.2)) low++;
    }
    expect(low / 10_000).toBeGreaterThan(0.1);
  });

  it('takes settings where somebody gives them, and the usual ones otherwise', () => {
    const observations = observe(simulateSeries(COEXISTING, 36, 0.03, 1));
    expect(buildPriors(observations, { priors: USUAL_PRIORS })).toEqual(priors);
    const growth = { meanLog: Math.log(0.05), sdLog: 0.3 };
    const set = buildPriors(observations, { priors: { ...USUAL_PRIORS, growth, noCompetition: 0.6 } });
    expect([set.parameters.r1, set.parameters.r2]).toEqual([growth, growth]);
    // the more of the prior lies near no competition, the likelier both coefficients are below 1
    expect(computePriorCells(set).bothBelow).toBeGreaterThan(computePriorCells(priors).bothBelow + 0.2);
  });

  it('puts an estimate of the addressable market in the place of the saturation level, firm by firm', () => {
    const observations = observe(simulateSeries(COEXISTING, 36, 0.03, 1));
    const addressable = { focal: 2e6, rival: null, relativeError: 0.5 };
    const { parameters } = buildPriors(observations, { addressable });
    expect(parameters.k1).toEqual({ meanLog: Math.log(2e6), sdLog: Math.log(1.5) });
    expect(parameters.k2).toEqual(priors.parameters.k2);
  });

  it('stays a density without any weight near no competition', () => {
    const observations = observe(simulateSeries(COEXISTING, 36, 0.03, 1));
    const logPrior = createLogPrior(
      buildPriors(observations, { priors: { ...USUAL_PRIORS, noCompetition: 0 } }),
    );
    const gradient = new Float64Array(8);
    expect(logPrior(toTheta(COEXISTING), gradient)).toBeGreaterThan(-1e3);
    expect(gradient.every(Number.isFinite)).toBe(true);
  });
});
