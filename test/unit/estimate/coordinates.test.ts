import { describe, expect, it } from 'vitest';
import { createWorkingCoordinates } from '@/lib/estimate/coordinates';
import { fitCoordinates } from '@/lib/estimate/fitted-coordinates';
import { buildPriors } from '@/lib/estimate/priors';
import { createStatePosterior } from '@/lib/estimate/state-posterior';
import { createStream } from '@/lib/numeric/random';
import { COEXISTING, observe, simulateSeries, toTheta } from './simulated-market';

const observations = observe(simulateSeries(COEXISTING, 36, 0.03, 1));
const posterior = createStatePosterior(
  observations,
  buildPriors(observations),
  { focal: 0, rival: 0 },
  {
    harmonics: 1,
    hasBreak: true,
  },
);
posterior.breakMonth = 15;
const q = posterior.place(toTheta(COEXISTING), [
  { size: 0.03, persistence: 0 },
  { size: 0.03, persistence: 0 },
]);
const n = posterior.dimension;
const stream = createStream(1, 0);
/** Any covariance with correlations. */
const covariance = new Float64Array(n * n);
const factor = new Float64Array(n * n).map(() => 0.05 * stream.normal());
for (let i = 0; i < n; i++)
  for (let j = 0; j < n; j++)
    for (let k = 0; k < n; k++)
      covariance[i * n + j] += factor[i * n + k] * factor[j * n + k] + (i === j ? 1e-4 : 0);
/** A smooth density with an exact gradient, so that only the change of coordinates is tested. */
function quartic(at: Float64Array, gradient: Float64Array | null): number {
  let value = 0;
  for (let j = 0; j < n; j++) {
    const d = at[j] - q[j];
    value -= d * d + 0.1 * d ** 4 + 0.3 * d * (at[(j + 1) % n] - q[(j + 1) % n]);
  }
  if (gradient) {
    for (let j = 0; j < n; j++) {
      const d = at[j] - q[j];
      const next = at[(j + 1) % n] - q[(j + 1) % n];
      const before = at[(j + n - 1) % n] - q[(j + n - 1) % n];
      gradient[j] = -(2 * d + 0.4 * d ** 3 + 0.3 * (next + before));
    }
  }
  return value;
}
const target = { logDensity: quartic, segments: posterior.segments, errors: posterior.errors };
const { coordinates: anchored } = createWorkingCoordinates(target, { q, covariance });
/** Points whose spread depends on their errors, so that the widths of the fitted map are at work. */
const visited = Array.from({ length: 300 }, () => {
  const point = q.slice();
  for (const j of posterior.errors) point[j] += 0.5 * stream.normal();
  const width = Math.exp(0.5 * (point[posterior.errors[0]] - q[posterior.errors[0]]));
  for (let j = 0; j < n; j++) if (!posterior.errors.includes(j)) point[j] += 0.1 * width * stream.normal();
  return point;
});
const fitted = fitCoordinates(target, visited);

describe.each([
  ['anchored', anchored],
  ['fitted', fitted],
])('%s working coordinates', (_, coordinates) => {
  it('go there and back', () => {
    const u = new Float64Array(n);
    const back = new Float64Array(n);
    const moved = q.map((value, j) => value + 0.3 * Math.sin(j));
    coordinates.fromParameters(moved, u);
    coordinates.toParameters(u, back);
    for (let j = 0; j < n; j++) expect(Math.abs(back[j] - moved[j])).toBeLessThan(1e-10);
  });

  it('carry the gradient, bends and triangle included', () => {
    const u = new Float64Array(n);
    coordinates.fromParameters(
      q.map((value, j) => value + 0.2 * Math.cos(j)),
      u,
    );
    const gradient = new Float64Array(n);
    coordinates.logDensity(u, gradient);
    for (let j = 0; j < n; j++) {
      const at = (step: number) =>
        coordinates.logDensity(
          u.map((value, k) => (k === j ? value + step : value)),
          null,
        );
      const expected = (at(1e-6) - at(-1e-6)) / 2e-6;
      expect(Math.abs(gradient[j] - expected)).toBeLessThan(1e-6 * (1 + Math.abs(expected)) + 1e-5);
    }
  });

  it('keep probability: the change of volume is that of the map', () => {
    const u = new Float64Array(n);
    coordinates.fromParameters(q, u);
    const jacobian = numericJacobian((from, to) => coordinates.toParameters(from, to), u);
    const logVolume = logDeterminant(jacobian);
    expect(coordinates.logDensity(u, null) - quartic(q, null)).toBeCloseTo(logVolume, 4);
  });
});

function numericJacobian(map: (from: Float64Array, to: Float64Array) => void, at: Float64Array): number[][] {
  const above = new Float64Array(n);
  const below = new Float64Array(n);
  const columns = Array.from(at, (_, j) => {
    map(
      at.map((value, k) => (k === j ? value + 1e-6 : value)),
      above,
    );
    map(
      at.map((value, k) => (k === j ? value - 1e-6 : value)),
      below,
    );
    return Array.from(above, (value, i) => (value - below[i]) / 2e-6);
  });
  return Array.from({ length: n }, (_, i) => columns.map((column) => column[i]));
}

function logDeterminant(matrix: number[][]): number {
  const a = matrix.map((row) => row.slice());
  let sum = 0;
  for (let k = 0; k < n; k++) {
    const pivot = a
      .slice(k)
      .reduce((best, row, i) => (Math.abs(row[k]) > Math.abs(a[best][k]) ? k + i : best), k);
    [a[k], a[pivot]] = [a[pivot], a[k]];
    sum += Math.log(Math.abs(a[k][k]));
    for (let i = k + 1; i < n; i++) {
      const ratio = a[i][k] / a[k][k];
      for (let j = k; j < n; j++) a[i][j] -= ratio * a[k][j];
    }
  }
  return sum;
}
