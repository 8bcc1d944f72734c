/** Draw sets with chosen columns, for tests of what rests on draws alone. */
import type { DrawSet } from '@/lib/estimate/types';
import { createStream } from '@/lib/numeric/random';

export const CENTRE = { r1: 0.2, r2: 0.18, k1: 1000, k2: 900, alpha: 1, beta: 0.6, n1: 300, n2: 250 };

/** Lognormal draws around CENTRE with the given spreads (sd of logarithms); process noise and observation error of 2 %. */
export function drawSetAround(
  spreads: Partial<Record<keyof typeof CENTRE, number>>,
  count: number,
  seed = 1,
): DrawSet {
  const columns = [...Object.keys(CENTRE), 'size1', 'size2', 'noise1', 'noise2'];
  const stream = createStream(seed, 0);
  const values = new Float64Array(count * columns.length);
  for (let i = 0; i < count; i++) {
    Object.entries(CENTRE).forEach(([id, centre], c) => {
      values[i * columns.length + c] =
        centre * Math.exp((spreads[id as keyof typeof CENTRE] ?? 0) * stream.normal());
    });
    values.fill(0.02, i * columns.length + 8, (i + 1) * columns.length);
  }
  return { errorModel: 'process-noise', columns, count, values };
}

/** The same set with persistent errors instead. */
export function withPersistentErrors(draws: DrawSet): DrawSet {
  const columns = [...draws.columns.slice(0, 10), 'persistence1', 'persistence2', 'residual1', 'residual2'];
  const width = draws.columns.length;
  const values = new Float64Array(draws.count * columns.length);
  for (let i = 0; i < draws.count; i++) {
    for (let c = 0; c < 10; c++) values[i * columns.length + c] = draws.values[i * width + c];
    values.set([0.6, 0.3, 0.01, -0.02], i * columns.length + 10);
  }
  return { errorModel: 'ar1', columns, count: draws.count, values };
}
