import { describe, expect, it } from 'vitest';
import { blendRows, judgeBlend, type WeightedDraws } from '@/lib/estimate/blend';
import type { DrawStore } from '@/lib/estimate/draw-store';
import { columnIndex, readColumn, thinDraws } from '@/lib/estimate/draws';
import type { DrawSet } from '@/lib/estimate/types';

const draws: DrawSet = {
  errorModel: 'ar1',
  columns: ['a', 'b'],
  count: 10,
  values: Float64Array.from({ length: 20 }, (_, i) => i),
};

describe('draws', () => {
  it('are thinned evenly and keep their rows together', () => {
    const thinned = thinDraws(draws, 5);
    expect(Array.from(thinned.values)).toEqual([0, 1, 4, 5, 8, 9, 12, 13, 16, 17]);
    expect(thinned.count).toBe(5);
    expect(thinDraws(draws, 100)).toBe(draws);
  });

  it('are read by column', () => {
    expect(Array.from(readColumn(draws, 'b')).slice(0, 3)).toEqual([1, 3, 5]);
    expect(columnIndex(draws, 'a')).toBe(0);
    expect(() => readColumn(draws, 'c')).toThrow('column must be one of a, b, got c');
    expect(() => thinDraws(draws, 0)).toThrow('count must be a positive integer, got 0');
  });
});

describe('the blend of components', () => {
  const part = (weight: number, count: number, ess: number, rHat = 1.002): WeightedDraws => ({
    weight,
    result: { hasConverged: true, rHat, ess, store: { count, chains: 4, perChain: count / 4 } as DrawStore },
  });

  it('gives each component its share in every stretch, from all over its draws', () => {
    const parts = [part(0.7, 3000, 1000), part(0.25, 2000, 500), part(0.05, 2000, 500)];
    const rows = blendRows(parts, 4000);
    for (const stretch of [rows, rows.slice(0, 400), rows.slice(3600)]) {
      parts.forEach(({ weight, result }) => {
        const own = stretch.filter(({ store }) => store === result.store);
        expect(Math.abs(own.length - weight * stretch.length)).toBeLessThanOrEqual(1.5);
      });
    }
    const first = rows.filter(({ store }) => store === parts[0].result.store).map(({ draw }) => draw);
    expect(Math.max(...first)).toBeGreaterThan(2990);
    for (const stride of [1, 2, 4]) {
      const kept = first.filter((_, i) => i % stride === 0);
      for (const chain of [0, 1, 2, 3]) {
        const share = kept.filter((draw) => draw % 4 === chain).length / kept.length;
        expect(Math.abs(share - 0.25)).toBeLessThan(0.01);
      }
    }
  });

  it('of one component is that component', () => {
    expect(judgeBlend([part(1, 2000, 700, 1.004)])).toEqual({
      rHat: expect.closeTo(1.004, 10) as number,
      ess: expect.closeTo(700, 8) as number,
    });
  });

  it('counts a poorly sampled component by the square of its share', () => {
    const { rHat, ess } = judgeBlend([part(0.9, 2000, 1000), part(0.1, 2000, 100, 1.05)]);
    expect(ess).toBeCloseTo(1 / (0.81 / 1000 + 0.01 / 100), 6);
    expect(rHat).toBeLessThan(1.01);
  });
});
