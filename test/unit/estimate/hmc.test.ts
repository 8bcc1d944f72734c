import { describe, expect, it } from 'vitest';
import { createHmcChain } from '@/lib/estimate/hmc';
import { createStepSizeTuner } from '@/lib/estimate/step-size';
import { bulkEss } from '@/lib/numeric/convergence';
import { createStream } from '@/lib/numeric/random';

const identity = Float64Array.of(1, 0, 0, 1);

/** Normal with sd 1 and 3, and correlation 0.8. */
function correlated(u: Float64Array, gradient: Float64Array | null): number {
  const [x, y] = [u[0], u[1] / 3];
  const scale = 1 / (1 - 0.64);
  if (gradient) {
    gradient[0] = -(x - 0.8 * y) * scale;
    gradient[1] = (-(y - 0.8 * x) * scale) / 3;
  }
  return -0.5 * (x * x - 1.6 * x * y + y * y) * scale;
}

describe('a Hamiltonian chain', () => {
  it('has the mean, spread and correlation of its density', () => {
    const chain = createHmcChain(2, correlated, createStream(1, 0));
    chain.reset(Float64Array.of(0, 0));
    const stream = createStream(2, 0);
    const draws: number[][] = [[], []];
    for (let i = 0; i < 4000; i++) {
      chain.move(identity, 0.4, 1 + stream.integer(12));
      draws[0].push(chain.position[0]);
      draws[1].push(chain.position[1]);
    }
    const ess = Math.min(bulkEss([draws[0]]), bulkEss([draws[1]]));
    expect(ess).toBeGreaterThan(500);
    const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
    const products = mean(draws[0].map((x, i) => x * draws[1][i]));
    // four standard errors of a mean over `ess` draws
    expect(Math.abs(mean(draws[0]))).toBeLessThan(4 / Math.sqrt(ess));
    expect(Math.abs(mean(draws[0].map((x) => x * x)) - 1)).toBeLessThan(4 * Math.sqrt(2 / ess));
    expect(Math.abs(mean(draws[1].map((x) => x * x)) / 9 - 1)).toBeLessThan(4 * Math.sqrt(2 / ess));
    expect(Math.abs(products / 3 - 0.8)).toBeLessThan(4 * Math.sqrt(1.64 / ess));
  });

  it('stays exact under a force that is not the gradient', () => {
    const wrongForce = (u: Float64Array, gradient: Float64Array | null) => {
      const value = correlated(u, gradient);
      if (gradient) gradient[0] *= 0.8;
      return value;
    };
    const chain = createHmcChain(2, wrongForce, createStream(3, 0));
    chain.reset(Float64Array.of(0, 0));
    const draws: number[] = [];
    for (let i = 0; i < 6000; i++) {
      chain.move(identity, 0.3, 1 + (i % 8));
      draws.push(chain.position[0]);
    }
    const variance = draws.reduce((sum, x) => sum + x * x, 0) / draws.length;
    expect(Math.abs(variance - 1)).toBeLessThan(4 * Math.sqrt(2 / bulkEss([draws])));
  });

  it('does not move where the density does not exist', () => {
    const edge = (u: Float64Array, gradient: Float64Array | null) => {
      if (u[0] > 0.5) return Number.NEGATIVE_INFINITY;
      gradient?.set([1, 0]);
      return u[0];
    };
    const chain = createHmcChain(2, edge, createStream(4, 0));
    expect(chain.reset(Float64Array.of(2, 0))).toBe(false);
    expect(chain.reset(Float64Array.of(0.4, 0))).toBe(true);
    for (let i = 0; i < 50; i++) {
      expect(chain.move(identity, 1, 3)).toBeGreaterThanOrEqual(0);
      expect(chain.position[0]).toBeLessThanOrEqual(0.5);
    }
  });
});

describe('the step size', () => {
  it('settles where the wanted share is accepted', () => {
    const tuner = createStepSizeTuner(10, 0.8);
    // acceptance falls from 1 to 0 as the step grows: 0.8 at a step of 0.5
    for (let i = 0; i < 400; i++) tuner.update(Math.exp(-tuner.current * 2 * Math.log(1 / 0.8)));
    expect(tuner.averaged).toBeGreaterThan(0.4);
    expect(tuner.averaged).toBeLessThan(0.6);
  });
});
