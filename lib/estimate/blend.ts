/**
 * Draws of several components as one set: each component gives its share of rows, in an order that keeps every stretch of the set a fair
 * sample of all of them (low-discrepancy stratification), so that thinning by stride stays fair.
 */
import type { RandomStream } from '../numeric/random';
import type { DrawStore } from './draw-store';
import type { SamplerResult } from './sampler';

export interface WeightedDraws {
  weight: number;
  result: SamplerResult;
}

/** One row of the blend: which component, which of its draws. */
export interface BlendedRow {
  store: DrawStore;
  draw: number;
}

/**
 * `count` rows; component k has about weight_k of them, evenly spaced over its draws and taken from its chains in turn, the order of the
 * chains rotating, so that every second or fourth row still comes from all chains.
 */
export function blendRows(parts: readonly WeightedDraws[], count: number): BlendedRow[] {
  const owed = parts.map(() => 0);
  const taken = parts.map(() => 0);
  const rows: BlendedRow[] = [];
  for (let i = 0; i < count; i++) {
    parts.forEach(({ weight }, k) => {
      owed[k] += weight;
    });
    const k = owed.indexOf(Math.max(...owed));
    owed[k] -= 1;
    const { store } = parts[k].result;
    const share = taken[k] / Math.max(parts[k].weight * count, 1);
    const chain = (taken[k] + Math.floor(taken[k] / store.chains)) % store.chains;
    const place = Math.min(Math.floor(share * store.perChain), store.perChain - 1);
    rows.push({ store, draw: place * store.chains + chain });
    taken[k]++;
  }
  return rows;
}

/** Limits that every part must keep however small its share: below them neither measure means much. */
const LOOSEST_R_HAT = 1.05;
const SMALLEST_ESS = 100;

/** What a part of a given weight must reach for the blend to reach `whole`, by the sums of `judgeBlend`. */
export function limitsOfPart(
  weight: number,
  whole: { rHat: number; ess: number },
): { rHatLimit: number; essLimit: number } {
  const rHat = Math.sqrt(1 + (whole.rHat ** 2 - 1) / weight);
  return {
    rHatLimit: Math.min(rHat, Math.max(LOOSEST_R_HAT, whole.rHat)),
    essLimit: Math.max(weight * whole.ess, SMALLEST_ESS),
  };
}

/**
 * Convergence of the blend. A mean over it is sum w_k m_k: the variance of its estimate is sum w_k^2 / ESS_k of a draw's, and what the
 * chains disagree about counts with w_k^2 likewise.
 */
export function judgeBlend(parts: readonly WeightedDraws[]): { rHat: number; ess: number } {
  let inverse = 0;
  let excess = 0;
  for (const { weight, result } of parts) {
    inverse += weight ** 2 / result.ess;
    excess += weight ** 2 * (result.rHat ** 2 - 1);
  }
  return { rHat: Math.sqrt(1 + Math.max(excess, 0)), ess: 1 / inverse };
}

/** ln levels of sampled paths, firm-major then month: `paths[p]` has 2 x months values. Rows whose path does not exist are left out. */
export function samplePaths(
  rows: readonly BlendedRow[],
  count: number,
  months: number,
  stream: RandomStream,
): Float64Array[] {
  const paths: Float64Array[] = [];
  const wanted = Math.min(count, rows.length);
  for (let p = 0; p < wanted; p++) {
    const { store, draw } = rows[Math.floor((p * rows.length) / wanted)];
    const path = new Float64Array(2 * months);
    if (store.fillPath(draw, stream, path)) paths.push(path);
  }
  return paths;
}
