import { describe, expect, it } from 'vitest';
import { estimateEvidence, findLocalMode, followMode } from '@/lib/estimate/local-mode';
import { fitInformation, fitStart, polishMode } from '@/lib/estimate/point-fit';
import { buildPriors } from '@/lib/estimate/priors';
import { createStarts } from '@/lib/estimate/starts';
import { createStatePosterior } from '@/lib/estimate/state-posterior';
import { createStream } from '@/lib/numeric/random';
import { COEXISTING, observe, RIVAL_LOSES, simulateSeries, type Truth } from './simulated-market';

function modeOf(truth: Truth, months: number) {
  const observations = observe(simulateSeries(truth, months, 0.03, 2));
  const priors = buildPriors(observations);
  const [start] = createStarts(observations, priors, 0, createStream(1, 0));
  const point = polishMode(
    observations,
    priors,
    [0.003, 0.003],
    fitStart(observations, priors, start).theta,
    'competition',
  )!;
  const posterior = createStatePosterior(
    observations,
    priors,
    { focal: 0, rival: 0 },
    { harmonics: 0, hasBreak: false },
  );
  const information = fitInformation(point);
  const mode = findLocalMode(posterior, posterior.place(point.theta, point.errors), information)!;
  return { ...mode, posterior, information };
}

describe('a mode', () => {
  it('is a place from which no small step leads up', () => {
    const mode = modeOf(COEXISTING, 48);
    const gradient = new Float64Array(mode.u.length);
    mode.coordinates.logDensity(mode.u, gradient);
    // in units of the spread: the climb stops when it promises less than 1e-3
    const n = gradient.length;
    for (let j = 0; j < n; j++) {
      let slope = 0;
      for (let i = j; i < n; i++) slope += mode.metric[i * n + j] * gradient[i];
      expect(Math.abs(slope)).toBeLessThan(0.3);
    }
  });

  it('is found again from nearby by its shape, and its evidence promised by slope and curvature there', () => {
    const { posterior, information, ...mode } = modeOf(COEXISTING, 48);
    const near = mode.q.map((value, j) => value + (j < 6 ? 0.01 : 0));
    const again = followMode(posterior, { ...mode, q: near }, 2)!;
    // a climb stops when it promises less than 1e-3
    expect(Math.abs(again.density - mode.density)).toBeLessThan(0.01);
    // one-sided differences over a tenth of a spread: a few per cent of each curvature
    expect(Math.abs(estimateEvidence(posterior, mode.q, information) - mode.logEvidence)).toBeLessThan(0.5);
    expect(Math.abs(estimateEvidence(posterior, near, information) - mode.logEvidence)).toBeLessThan(1);
  });

  it('has an evidence that agrees with importance sampling', () => {
    for (const mode of [modeOf(COEXISTING, 48), modeOf(RIVAL_LOSES, 30)]) {
      const n = mode.u.length;
      const stream = createStream(7, 0);
      let logDeterminant = 0;
      for (let j = 0; j < n; j++) logDeterminant += Math.log(mode.metric[j * (n + 1)]);
      // Student t with 6 degrees of freedom around the mode, slightly wider than the metric
      const [freedom, wide, draws] = [6, 1.15, 20_000];
      const u = new Float64Array(n);
      let sum = 0;
      for (let d = 0; d < draws; d++) {
        const z = Float64Array.from({ length: n }, () => stream.normal());
        let chi = 0;
        for (let k = 0; k < freedom; k++) chi += stream.normal() ** 2;
        const stretch = wide * Math.sqrt(freedom / chi);
        let squares = 0;
        for (let i = 0; i < n; i++) {
          u[i] = mode.u[i];
          for (let k = 0; k <= i; k++) u[i] += mode.metric[i * n + k] * z[k] * stretch;
          squares += (z[i] * stretch) ** 2;
        }
        const logProposal = logT(squares / wide ** 2, n, freedom) - logDeterminant - n * Math.log(wide);
        sum += Math.exp(mode.coordinates.logDensity(u, null) - logProposal - mode.logEvidence) / draws;
      }
      // the long tail of the process noise towards 0 adds about a unit, to every model alike
      expect(Math.abs(Math.log(sum))).toBeLessThan(1.5);
    }
  });
});

/** Log density of the n-variate Student t at a squared distance. */
function logT(squared: number, n: number, freedom: number): number {
  return (
    logGammaHalf(freedom + n) -
    logGammaHalf(freedom) -
    (n / 2) * Math.log(freedom * Math.PI) -
    ((freedom + n) / 2) * Math.log1p(squared / freedom)
  );
}

/** ln Gamma(k / 2) for a whole k. */
function logGammaHalf(k: number): number {
  let value = k % 2 === 0 ? 0 : Math.log(Math.PI) / 2;
  for (let at = k % 2 === 0 ? 1 : 0.5; at < k / 2; at++) value += Math.log(at);
  return value;
}
