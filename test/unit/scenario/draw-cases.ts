/** Draw sets made of chosen systems, for tests of scenarios. */
import type { Push } from '@/lib/dynamics/push';
import type { CompetitionSystem } from '@/lib/dynamics/system';
import type { DrawSet } from '@/lib/estimate/types';

export type Draw = CompetitionSystem & { n1: number; n2: number };

export const COEXISTENCE: Draw = {
  r1: 0.2,
  r2: 0.15,
  k1: 1000,
  k2: 800,
  alpha: 0.5,
  beta: 0.6,
  n1: 300,
  n2: 200,
};
export const EXCLUSION_BY_FOCAL: Draw = { ...COEXISTENCE, alpha: 0.6, beta: 1.5 };
export const EXCLUSION_BY_RIVAL: Draw = { ...COEXISTENCE, alpha: 1.5, beta: 0.6 };
/** Equal growth rates: the separatrix is the ray n2/n1 = (k2/k1) (1 - beta)/(1 - alpha) = 0.8. */
export const HEAD_START: Draw = { ...COEXISTENCE, r2: 0.2, alpha: 1.5, beta: 1.5, n1: 300, n2: 200 };

export interface DrawErrors {
  size: number;
  persistence: number;
}

/** AR(1) draws with the same errors for both firms. */
export function drawSetOf(
  draws: Draw[],
  { size, persistence }: DrawErrors = { size: 0.05, persistence: 0.3 },
): DrawSet {
  const errors = {
    size1: size,
    size2: size,
    persistence1: persistence,
    persistence2: persistence,
    residual1: 0,
    residual2: 0,
  };
  return tableOf(
    draws.map((draw) => ({ ...draw, ...errors })),
    'ar1',
  );
}

export function processNoiseSetOf(draws: Draw[], noise: number): DrawSet {
  return tableOf(
    draws.map((draw) => ({ ...draw, size1: 0.05, size2: 0.05, noise1: noise, noise2: noise })),
    'process-noise',
  );
}

function tableOf(rows: Record<string, number>[], errorModel: DrawSet['errorModel']): DrawSet {
  const columns = Object.keys(rows[0]!);
  return {
    errorModel,
    columns,
    count: rows.length,
    values: rows.flatMap((row) => columns.map((column) => row[column]!)),
  };
}

/** Draws spread around one, deterministic: parameters move by up to a tenth. */
export function spreadAround(draw: Draw, count: number): Draw[] {
  const wave = (i: number, k: number) => 1 + 0.1 * Math.sin(1 + i * (k + 1.37));
  return Array.from({ length: count }, (_, i) => ({
    r1: draw.r1 * wave(i, 1),
    r2: draw.r2 * wave(i, 2),
    k1: draw.k1 * wave(i, 3),
    k2: draw.k2 * wave(i, 4),
    alpha: draw.alpha * wave(i, 5),
    beta: draw.beta * wave(i, 6),
    n1: draw.n1 * wave(i, 7),
    n2: draw.n2 * wave(i, 8),
  }));
}

export function swapDraw({ r1, r2, k1, k2, alpha, beta, n1, n2 }: Draw): Draw {
  return { r1: r2, r2: r1, k1: k2, k2: k1, alpha: beta, beta: alpha, n1: n2, n2: n1 };
}

export function pushOf(change: Partial<Push> = {}): Push {
  return {
    firm: 2,
    kind: 'growth-lift',
    startMonth: 2,
    lengthMonths: 6,
    size: 0.3,
    rampMonths: 1,
    carryOverHalfLifeMonths: 3,
    ...change,
  };
}
