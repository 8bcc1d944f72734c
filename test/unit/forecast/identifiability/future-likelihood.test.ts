import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { createFutureLikelihood } from '@/lib/forecast/identifiability/future-likelihood';
import { createStream } from '@/lib/numeric/random';
import { CENTRE, drawSetAround, withPersistentErrors } from './draw-sets';

const MONTHS = 6;

/** Log density of a normal vector by Gaussian elimination, the constant of 2 pi left out as in the module. */
function logNormal(residual: number[], covariance: number[][]): number {
  const n = residual.length;
  const a = covariance.map((row, i) => [...row, residual[i]]);
  let logDeterminant = 0;
  for (let k = 0; k < n; k++) {
    logDeterminant += Math.log(a[k][k]);
    for (let i = k + 1; i < n; i++) {
      const factor = a[i][k] / a[k][k];
      for (let j = k; j <= n; j++) a[i][j] -= factor * a[k][j];
    }
  }
  const x = new Array<number>(n).fill(0);
  for (let i = n - 1; i >= 0; i--) {
    let sum = a[i][n];
    for (let j = i + 1; j < n; j++) sum -= a[i][j] * x[j];
    x[i] = sum / a[i][i];
  }
  return -0.5 * (residual.reduce((sum, value, i) => sum + value * x[i], 0) + logDeterminant);
}

const path = createTrajectory({ months: MONTHS + 1, entry1: 0, entry2: 0 });
const theta = Float64Array.from(Object.values(CENTRE), Math.log);

/** d ln N(h) / d ln N(from), 2 x 2, by central differences of the path itself. */
function propagate(from: number, to: number): number[][] {
  path.run(theta);
  const at = [path.logLevel1[from], path.logLevel2[from]];
  const step = 1e-5;
  const end = (d1: number, d2: number) => {
    path.run([...theta.slice(0, 6), at[0] + d1, at[1] + d2]);
    return [path.logLevel1[to - from], path.logLevel2[to - from]];
  };
  const columns = [
    [step, 0],
    [0, step],
  ].map(([d1, d2]) => {
    const [above, below] = [end(d1, d2), end(-d1, -d2)];
    return above.map((value, i) => (value - below[i]) / (2 * step));
  });
  return [
    [columns[0][0], columns[1][0]],
    [columns[0][1], columns[1][1]],
  ];
}

const stream = createStream(3, 0);
path.run(theta);
const noisy = (levels: Float64Array) =>
  Array.from(levels.subarray(1), (value) => value + 0.03 * stream.normal());
const logCounts = Float64Array.from([...noisy(path.logLevel1), ...noisy(path.logLevel2)]);
const means = [...path.logLevel1.subarray(1), ...path.logLevel2.subarray(1)];

describe('with process noise', () => {
  it('is the normal density of the whole stretch, covariance built from the propagated shocks', () => {
    const covariance = Array.from({ length: 2 * MONTHS }, () => new Array<number>(2 * MONTHS).fill(0));
    for (let shock = 1; shock <= MONTHS; shock++) {
      const reach = Array.from({ length: MONTHS }, (_, h) =>
        h + 1 < shock ? null : propagate(shock, h + 1),
      );
      reach.forEach((a, h) => {
        reach.forEach((b, g) => {
          if (!a || !b) return;
          for (let i = 0; i < 2; i++) {
            for (let j = 0; j < 2; j++) {
              covariance[i * MONTHS + h][j * MONTHS + g] +=
                0.02 ** 2 * (a[i][0] * b[j][0] + a[i][1] * b[j][1]);
            }
          }
        });
      });
    }
    for (let k = 0; k < 2 * MONTHS; k++) covariance[k][k] += 0.02 ** 2;
    const out = new Float64Array(MONTHS);
    createFutureLikelihood(drawSetAround({}, 1), MONTHS).fillLogLikelihood(0, logCounts, out);
    const wanted = logNormal(
      Array.from(logCounts, (value, k) => value - means[k]),
      covariance,
    );
    // derivatives by differences: 1e-6 of a log density of some 40
    expect(Math.abs(out[MONTHS - 1] - wanted)).toBeLessThan(1e-5);
  });
});

describe('with persistent errors', () => {
  it('is the density of first-order autoregressive errors that go on from the last one', () => {
    const out = new Float64Array(MONTHS);
    createFutureLikelihood(withPersistentErrors(drawSetAround({}, 1)), MONTHS).fillLogLikelihood(
      0,
      logCounts,
      out,
    );
    let sum = 0;
    [0.6, 0.3].forEach((phi, firm) => {
      const variance = 0.02 ** 2 * (1 - phi * phi);
      let before = [0.01, -0.02][firm];
      for (let h = 0; h < MONTHS; h++) {
        const error = logCounts[firm * MONTHS + h] - means[firm * MONTHS + h];
        sum -= 0.5 * ((error - phi * before) ** 2 / variance + Math.log(variance));
        before = error;
      }
    });
    expect(out[MONTHS - 1]).toBeCloseTo(sum, 8);
  });

  it('grows month by month from one likelihood: the first months do not depend on how many follow', () => {
    const draws = withPersistentErrors(drawSetAround({}, 1));
    const long = new Float64Array(MONTHS);
    createFutureLikelihood(draws, MONTHS).fillLogLikelihood(0, logCounts, long);
    const short = new Float64Array(2);
    const firstMonths = Float64Array.from([
      ...logCounts.subarray(0, 2),
      ...logCounts.subarray(MONTHS, MONTHS + 2),
    ]);
    createFutureLikelihood(draws, 2).fillLogLikelihood(0, firstMonths, short);
    expect(short[1]).toBeCloseTo(long[1], 10);
  });
});
