/**
 * Convergence of Markov chains: rank-normalised split R-hat and bulk effective sample size.
 * Vehtari, Gelman, Simpson, Carpenter & Buerkner (2021), Bayesian Analysis 16:667; sums of autocorrelations cut by Geyer's (1992)
 * initial monotone positive sequence.
 */
import { normalQuantile } from './normal';

type Chain = ArrayLike<number>;

/** Draws per half chain below which neither measure means anything. */
const MIN_HALF = 4;

/**
 * Largest of the rank-normalised split R-hat of the values and of their distances from the median (so that chains with the same
 * centre but different spread are caught too). 1 is perfect; 1.01 is the usual limit.
 * @param chains one or more chains of equal length
 * @returns R-hat; 1 when every value is the same; Infinity when chains are too short or a value is not finite
 */
export function splitRHat(chains: readonly Chain[]): number {
  const halves = splitChains(chains);
  if (!halves) return Infinity;
  if (isConstant(halves)) return 1;
  const bulk = plainRHat(rankNormalise(halves));
  const folded = foldAtMedian(halves);
  return isConstant(folded) ? bulk : Math.max(bulk, plainRHat(rankNormalise(folded)));
}

/**
 * Bulk effective sample size: how many independent draws tell the centre of the distribution as well as these chains do.
 * @param chains one or more chains of equal length
 * @returns ESS in draws, at most S log10(S) for S draws; 0 when chains are too short or a value is not finite
 */
export function bulkEss(chains: readonly Chain[]): number {
  const halves = splitChains(chains);
  if (!halves) return 0;
  const draws = halves.length * halves[0].length;
  if (isConstant(halves)) return draws;
  return effectiveSize(rankNormalise(halves));
}

/** First and second half of each chain (the middle draw of an odd chain is left out); null: too short or not finite. */
function splitChains(chains: readonly Chain[]): Float64Array[] | null {
  if (chains.length === 0) throw new RangeError('chains must hold at least one chain, got none');
  const length = chains[0].length;
  if (chains.some((chain) => chain.length !== length)) {
    throw new RangeError(
      `chains must have equal lengths, got ${chains.map((chain) => chain.length).join(', ')}`,
    );
  }
  const half = Math.floor(length / 2);
  if (half < MIN_HALF) return null;
  const halves: Float64Array[] = [];
  for (const chain of chains) {
    const values = Float64Array.from(chain);
    if (!values.every(Number.isFinite)) return null;
    halves.push(values.subarray(0, half), values.subarray(length - half));
  }
  return halves;
}

function isConstant(chains: Float64Array[]): boolean {
  const first = chains[0][0];
  return chains.every((chain) => chain.every((value) => value === first));
}

/** Replaces each value by the normal score of its average rank among all draws: z = Phi^-1((rank - 3/8) / (S + 1/4)). */
function rankNormalise(chains: Float64Array[]): Float64Array[] {
  const length = chains[0].length;
  const total = chains.length * length;
  const all = new Float64Array(total);
  chains.forEach((chain, c) => {
    all.set(chain, c * length);
  });
  const sorted = all.slice().sort();
  const scores = new Float64Array(total);
  for (let start = 0; start < total; ) {
    let end = start + 1;
    while (end < total && sorted[end] === sorted[start]) end++;
    const averageRank = (start + 1 + end) / 2;
    scores.fill(normalQuantile((averageRank - 0.375) / (total + 0.25)), start, end);
    start = end;
  }
  return chains.map((chain) => chain.map((value) => scores[findSorted(sorted, value)]));
}

/** A place of a value that is among the sorted ones. */
function findSorted(sorted: Float64Array, value: number): number {
  let low = 0;
  let high = sorted.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle] < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

function foldAtMedian(chains: Float64Array[]): Float64Array[] {
  const sorted = Float64Array.from(chains.flatMap((chain) => Array.from(chain))).sort();
  const middle = sorted.length >> 1;
  const median = sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
  return chains.map((chain) => chain.map((value) => Math.abs(value - median)));
}

function meanOf(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i];
  return sum / values.length;
}

function varianceOf(values: ArrayLike<number>): number {
  const mean = meanOf(values);
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += (values[i] - mean) ** 2;
  return sum / (values.length - 1);
}

/** Gelman & Rubin's ratio sqrt(((n-1)/n W + B/n) / W) of chains that are already split. */
function plainRHat(chains: Float64Array[]): number {
  const n = chains[0].length;
  const within = meanOf(chains.map(varianceOf));
  const betweenOverN = varianceOf(chains.map(meanOf));
  if (!(within > 0)) return Infinity;
  return Math.sqrt((((n - 1) / n) * within + betweenOverN) / within);
}

/** S / (1 + 2 sum of autocorrelations), the correlations estimated over all chains together. */
function effectiveSize(chains: Float64Array[]): number {
  const n = chains[0].length;
  const total = chains.length * n;
  const within = meanOf(chains.map(varianceOf));
  const pooled = ((n - 1) / n) * within + varianceOf(chains.map(meanOf));
  const centred = chains.map((chain) => {
    const mean = meanOf(chain);
    return chain.map((value) => value - mean);
  });
  const correlationAt = (lag: number) =>
    1 - (within - meanOf(centred.map((chain) => autocovariance(chain, lag)))) / pooled;

  let previousPair = Infinity;
  let pairSum = 0;
  for (let lag = 0; lag + 1 < n; lag += 2) {
    const even = lag === 0 ? 1 : correlationAt(lag);
    const pair = Math.min(even + correlationAt(lag + 1), previousPair);
    if (!(pair > 0)) break;
    pairSum += pair;
    previousPair = pair;
  }
  const correlationTime = Math.max(-1 + 2 * pairSum, 1 / Math.log10(total));
  return total / correlationTime;
}

/** Autocovariance of a centred chain; divisor n, the choice of Geyer. */
function autocovariance(centred: Float64Array, lag: number): number {
  let sum = 0;
  for (let i = 0; i + lag < centred.length; i++) sum += centred[i] * centred[i + lag];
  return sum / centred.length;
}
