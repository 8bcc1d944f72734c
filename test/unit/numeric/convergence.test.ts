import { describe, expect, it } from 'vitest';
import { bulkEss, splitRHat } from '@/lib/numeric/convergence';
import { createStream } from '@/lib/numeric/random';

/** Autoregressive chains x' = rho x + noise, stationary from the first draw. */
function autoregressiveChains(count: number, length: number, rho: number, shift = 0): Float64Array[] {
  return Array.from({ length: count }, (_, c) => {
    const stream = createStream(42, c);
    const chain = new Float64Array(length);
    let x = stream.normal();
    for (let i = 0; i < length; i++) {
      chain[i] = x + shift * c;
      x = rho * x + Math.sqrt(1 - rho * rho) * stream.normal();
    }
    return chain;
  });
}

describe('split R-hat', () => {
  it('is close to 1 for independent draws from one distribution', () => {
    expect(splitRHat(autoregressiveChains(4, 1000, 0))).toBeLessThan(1.005);
  });

  it('sees chains that sit in different places', () => {
    expect(splitRHat(autoregressiveChains(4, 1000, 0, 0.5))).toBeGreaterThan(1.1);
  });

  it('sees a drift inside one chain', () => {
    const drifting = Float64Array.from({ length: 500 }, (_, i) => i + Math.sin(i * 12.9898));
    expect(splitRHat([drifting])).toBeGreaterThan(1.5);
  });

  it('sees chains with one centre but different spread', () => {
    const [a, b] = autoregressiveChains(2, 1000, 0);
    expect(splitRHat([a, b.map((x) => 4 * x)])).toBeGreaterThan(1.05);
  });

  it('depends on ranks alone: a monotone change of scale leaves it as it is', () => {
    const chains = autoregressiveChains(3, 400, 0.5);
    const heavy = chains.map((chain) => chain.map((x) => Math.sinh(3 * x)));
    // the folded half depends on distances, so only the bulk part is exactly invariant; ESS is bulk only
    expect(bulkEss(heavy)).toBeCloseTo(bulkEss(chains), 8);
  });
});

describe('bulk effective sample size', () => {
  it('is about the number of draws when they are independent', () => {
    const ess = bulkEss(autoregressiveChains(4, 2000, 0));
    expect(ess).toBeGreaterThan(0.85 * 8000);
    expect(ess).toBeLessThan(1.15 * 8000);
  });

  it('is S (1 - rho) / (1 + rho) for autoregressive chains', () => {
    for (const rho of [0.5, 0.9]) {
      const expected = (4 * 5000 * (1 - rho)) / (1 + rho);
      const ess = bulkEss(autoregressiveChains(4, 5000, rho));
      // the correlation time of 20,000 draws is known to some 10 %
      expect(Math.abs(ess / expected - 1)).toBeLessThan(0.2);
    }
  });

  it('falls when chains disagree', () => {
    expect(bulkEss(autoregressiveChains(4, 1000, 0, 1))).toBeLessThan(30);
  });
});

describe('degenerate chains', () => {
  it('have R-hat 1 when every draw is the same', () => {
    const flat = [new Float64Array(20).fill(3), new Float64Array(20).fill(3)];
    expect(splitRHat(flat)).toBe(1);
    expect(bulkEss(flat)).toBe(40);
  });

  it('fail both checks when too short or not finite', () => {
    expect(splitRHat([[1, 2, 3]])).toBe(Infinity);
    expect(bulkEss([[1, 2, 3]])).toBe(0);
    const broken = Float64Array.from({ length: 40 }, (_, i) => (i === 7 ? Number.NaN : i % 5));
    expect(splitRHat([broken])).toBe(Infinity);
    expect(bulkEss([broken])).toBe(0);
  });

  it('refuse no chains and unequal chains', () => {
    expect(() => splitRHat([])).toThrow('at least one chain');
    expect(() => bulkEss([[1, 2], [1]])).toThrow('equal lengths, got 2, 1');
  });
});
