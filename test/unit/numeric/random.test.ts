import { describe, expect, it } from 'vitest';
import { createStream } from '@/lib/numeric/random';

const take = (n: number, next: () => number) => Array.from({ length: n }, next);
const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

describe('random streams', () => {
  it('give the same numbers for the same seed and stream', () => {
    const a = createStream(7, 3);
    const b = createStream(7, 3);
    expect(take(50, a.normal)).toEqual(take(50, b.normal));
  });

  it('differ between streams and between neighbouring seeds', () => {
    const first = take(20, createStream(7, 0).uniform);
    expect(take(20, createStream(7, 1).uniform)).not.toEqual(first);
    expect(take(20, createStream(8, 0).uniform)).not.toEqual(first);
    // seeds that share their low 32 bits must not share a sequence
    expect(take(20, createStream(7 + 2 ** 33, 0).uniform)).not.toEqual(first);
  });

  it('are uncorrelated between neighbouring streams and seeds', () => {
    const n = 20_000;
    const correlation = (a: number[], b: number[]) => mean(a.map((value, i) => value * b[i]));
    const base = take(n, createStream(1, 0).normal);
    // four standard errors of a correlation of n independent pairs
    const limit = 4 / Math.sqrt(n);
    expect(Math.abs(correlation(base, take(n, createStream(1, 1).normal)))).toBeLessThan(limit);
    expect(Math.abs(correlation(base, take(n, createStream(2, 0).normal)))).toBeLessThan(limit);
  });

  it('have the moments of a uniform and of a standard normal variable', () => {
    const n = 100_000;
    const stream = createStream(11, 0);
    const uniforms = take(n, stream.uniform);
    expect(Math.min(...uniforms.slice(0, 10_000))).toBeGreaterThan(0);
    expect(Math.abs(mean(uniforms) - 0.5)).toBeLessThan(4 * Math.sqrt(1 / 12 / n));
    const normals = take(n, stream.normal);
    expect(Math.abs(mean(normals))).toBeLessThan(4 / Math.sqrt(n));
    expect(Math.abs(mean(normals.map((z) => z * z)) - 1)).toBeLessThan(4 * Math.sqrt(2 / n));
    // kurtosis 3; the fourth power has variance 96
    expect(Math.abs(mean(normals.map((z) => z ** 4)) - 3)).toBeLessThan(4 * Math.sqrt(96 / n));
  });

  it('draw integers from 0 to n-1, each about equally often', () => {
    const stream = createStream(5, 0);
    const counts = new Array(6).fill(0);
    for (let i = 0; i < 60_000; i++) counts[stream.integer(6)]++;
    for (const count of counts) expect(Math.abs(count - 10_000)).toBeLessThan(4 * Math.sqrt(10_000));
  });

  it('refuse a seed that is not a non-negative integer, naming it', () => {
    expect(() => createStream(-1, 0)).toThrow('seed must be a non-negative integer, got -1');
    expect(() => createStream(1, 0.5)).toThrow('stream must be a non-negative integer, got 0.5');
    expect(() => createStream(Number.NaN, 0)).toThrow('seed');
  });
});
