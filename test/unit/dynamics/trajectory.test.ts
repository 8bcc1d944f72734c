import { describe, expect, it } from 'vitest';
import { integrate } from '@/lib/dynamics/integrate';
import { type CompetitionSystem, fillGrowth } from '@/lib/dynamics/system';
import { createTrajectory, PARAMETER_COUNT } from '@/lib/dynamics/trajectory';
import { createStream } from '@/lib/numeric/random';

const logs = (...values: number[]) => Float64Array.from(values, Math.log);
/** M1 of the published checks: r, K, per-user effects as alpha = a12 K2/K1, beta = a21 K1/K2. */
const M1 = logs(0.25, 0.2, 1000, 800, 0.56, 1.125, 50, 20);

function runLevels(theta: Float64Array, months: number, entry1 = 0, entry2 = 0) {
  const trajectory = createTrajectory({ months, entry1, entry2 });
  expect(trajectory.run(theta)).toBe(true);
  return { first: trajectory.logLevel1.map(Math.exp), second: trajectory.logLevel2.map(Math.exp) };
}

/** Parameters in the range that markets show. */
function randomTheta(seed: number): Float64Array {
  const stream = createStream(seed, 0);
  const sds = [0.5, 0.5, 0.6, 0.6, 0.5, 0.5, 0.5, 0.5];
  const means = [Math.log(0.15), Math.log(0.15), 12, 12, 0, 0, 10.5, 10.5];
  return Float64Array.from(means, (mean, j) => mean + sds[j] * stream.normal());
}

describe('the path', () => {
  it('is the logistic curve of each firm when there is no competition', () => {
    const theta = logs(0.3, 0.1, 1000, 500, 1e-30, 1e-30, 20, 400);
    const { first, second } = runLevels(theta, 61);
    for (const t of [0, 1, 12, 60]) {
      const logistic = (r: number, k: number, n: number) => k / (1 + (k / n - 1) * Math.exp(-r * t));
      // the step is chosen for a local error of 3e-6 of the level where rates are below 0.3
      expect(Math.abs(first[t] / logistic(0.3, 1000, 20) - 1)).toBeLessThan(1e-5);
      expect(Math.abs(second[t] / logistic(0.1, 500, 400) - 1)).toBeLessThan(1e-5);
    }
  });

  it('meets the published trajectory to 5 digits', () => {
    const { first, second } = runLevels(M1, 61);
    expect(Math.abs(first[24] / 862.639162861704 - 1)).toBeLessThan(1e-5);
    expect(Math.abs(second[24] / 116.809655933353 - 1)).toBeLessThan(1e-5);
    expect(Math.abs(first[60] / 967.208838209873 - 1)).toBeLessThan(1e-5);
    expect(Math.abs(second[60] / 41.3087984031909 - 1)).toBeLessThan(1e-5);
  });

  it('agrees with the error-checked integrator on random markets', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const theta = randomTheta(seed);
      const [r1, r2, k1, k2, alpha, beta, n1, n2] = theta.map(Math.exp);
      const system: CompetitionSystem = { r1, r2, k1, k2, alpha, beta };
      const { y: end } = integrate((_, state, out) => fillGrowth(system, state, out), 0, [n1, n2], 60, {
        relativeTolerance: 1e-10,
      });
      const { first, second } = runLevels(theta, 61);
      // a declining firm gathers relative error month by month, faster ones more
      expect(Math.abs(first[60] / end[0] - 1)).toBeLessThan(4e-4);
      expect(Math.abs(second[60] / end[1] - 1)).toBeLessThan(4e-4);
    }
  });

  it('has error of order 4: half the rate, twice the months, a sixteenth of the error', () => {
    const errorAt = (r: number) => {
      const months = Math.round(3 / r);
      const { first } = runLevels(logs(r, r, 1, 1, 1e-30, 1e-30, 0.1, 0.1), months + 1);
      return Math.abs(first[months] - 1 / (1 + 9 * Math.exp(-3)));
    };
    const order = Math.log2(errorAt(0.2) / errorAt(0.1));
    expect(order).toBeGreaterThan(3.7);
    expect(order).toBeLessThan(4.3);
  });

  it('exchanges the firms when the parameters are exchanged, to the last digit', () => {
    const swapped = [1, 0, 3, 2, 5, 4, 7, 6].map((j) => M1[j]);
    const straight = runLevels(M1, 40);
    const crossed = runLevels(Float64Array.from(swapped), 40);
    expect(crossed.first).toEqual(straight.second);
    expect(crossed.second).toEqual(straight.first);
  });

  it('scales with the users', () => {
    const scaled = M1.slice();
    for (const j of [2, 3, 6, 7]) scaled[j] += Math.log(1000);
    const { first } = runLevels(scaled, 40);
    const base = runLevels(M1, 40).first;
    for (let t = 0; t < 40; t++) expect(Math.abs(first[t] / base[t] / 1000 - 1)).toBeLessThan(1e-12);
  });

  it('lets a firm enter later with its own start, and grow alone before that', () => {
    const { first, second } = runLevels(M1, 30, 0, 10);
    expect(Array.from(second.slice(0, 10))).toEqual(new Array(10).fill(0));
    expect(second[10]).toBeCloseTo(20, 10);
    const alone = runLevels(logs(0.25, 0.2, 1000, 800, 1e-30, 1e-30, 50, 20), 11).first;
    expect(first[10]).toBeCloseTo(alone[10], 8);
    expect(first[20]).toBeLessThan(1000);
  });

  it('lets a firm leave, and the other one grow alone from then on', () => {
    const trajectory = createTrajectory({ months: 30, entry1: 0, entry2: 0, exit2: 12 });
    expect(trajectory.run(M1)).toBe(true);
    expect(Array.from(trajectory.logLevel2.slice(12))).toEqual(new Array(18).fill(Number.NEGATIVE_INFINITY));
    const alone = M1.slice();
    [alone[6], alone[7]] = [trajectory.logLevel1[12], Number.NEGATIVE_INFINITY];
    // a firm that starts without users stays without
    const rest = createTrajectory({ months: 18, entry1: 0, entry2: 0 });
    expect(rest.run(alone)).toBe(true);
    expect(Math.abs(rest.logLevel1[17] - trajectory.logLevel1[29])).toBeLessThan(1e-12);
    expect(rest.logLevel2[17]).toBe(Number.NEGATIVE_INFINITY);
  });

  it('is refused, not wrong, for parameters that are not finite or far too fast', () => {
    const trajectory = createTrajectory({ months: 24, entry1: 0, entry2: 0 });
    expect(trajectory.run(M1.map((value, j) => (j === 0 ? Number.NaN : value)))).toBe(false);
    expect(trajectory.run(M1.map((value, j) => (j === 0 ? 12 : value)))).toBe(false);
    expect(trajectory.run(M1.map((value, j) => (j === 6 ? 800 : value)))).toBe(false);
    expect(trajectory.run(M1)).toBe(true);
  });

  it('needs a grid with a month and a firm in it', () => {
    expect(() => createTrajectory({ months: 0, entry1: 0, entry2: 0 })).toThrow(
      'months must be a positive integer, got 0',
    );
    expect(() => createTrajectory({ months: 5, entry1: 1, entry2: 2 })).toThrow(
      'one firm must enter in month 0',
    );
  });
});

describe('the derivatives', () => {
  it('forward: agree with central differences, late entry and exit included', () => {
    for (const life2 of [{ entry2: 0 }, { entry2: 7 }, { entry2: 0, exit2: 25 }]) {
      const months = 40;
      const trajectory = createTrajectory({ months, entry1: 0, ...life2 });
      const out = new Float64Array(2 * months * PARAMETER_COUNT);
      // r x step stays clear of the next number of steps, where the discrete map changes
      const theta = logs(0.17, 0.13, 1000, 800, 0.56, 1.125, 50, 20);
      expect(trajectory.fillSensitivities(theta, out)).toBe(true);
      for (let j = 0; j < PARAMETER_COUNT; j++) {
        const shift = (sign: number) => {
          const moved = theta.slice();
          moved[j] += sign * 1e-6;
          trajectory.run(moved);
          return [trajectory.logLevel1.slice(), trajectory.logLevel2.slice()];
        };
        const [above, below] = [shift(1), shift(-1)];
        for (const t of [7, 20, 39]) {
          for (const firm of [0, 1]) {
            const isGone = firm === 1 && t >= (life2.exit2 ?? months);
            const slope = isGone ? 0 : (above[firm][t] - below[firm][t]) / 2e-6;
            expect(Math.abs(out[(firm * months + t) * PARAMETER_COUNT + j] - slope)).toBeLessThan(1e-7);
          }
        }
      }
    }
  });

  it.each([{ entry1: 4 }, { entry1: 0, exit1: 20 }])('reverse: equal the forward ones, %o', (life1) => {
    const months = 30;
    const trajectory = createTrajectory({ months, entry2: 0, ...life1 });
    const out = new Float64Array(2 * months * PARAMETER_COUNT);
    const theta = randomTheta(5);
    trajectory.fillSensitivities(theta, out);
    const stream = createStream(9, 0);
    const weights = [0, 1].map(() => new Float64Array(months).map(() => stream.normal()));
    const gradient = new Float64Array(PARAMETER_COUNT);
    trajectory.pullBack(weights[0], weights[1], gradient);
    for (let j = 0; j < PARAMETER_COUNT; j++) {
      let sum = 0;
      for (let i = 0; i < 2 * months; i++)
        sum += weights[i < months ? 0 : 1][i % months] * out[i * PARAMETER_COUNT + j];
      expect(Math.abs(gradient[j] - sum)).toBeLessThan(1e-9 * (1 + Math.abs(sum)));
    }
  });
});
