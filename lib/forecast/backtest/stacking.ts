/**
 * Weights of a linear pool of forecasts that minimise its mean CRPS over past cases. With w on the simplex (w >= 0, sum 1), a_k the mean
 * distance of method k's members from the outcome and D_kl the mean distance between members of k and l,
 *
 *   CRPS(w) = a . w - w' D w / 2
 *
 * which is convex on the simplex (the energy distance; Gneiting & Raftery 2007, Szekely & Rizzo 2013). Stacking of predictive distributions
 * under CRPS: Yao, Vehtari, Simpson & Gelman 2018. Minimised by projected gradient steps with halving.
 */

/** One case: the outcome and the members of each method, all of one length. */
export interface StackingCase {
  /** Cases of one group are left out together. */
  group: number;
  actual: number;
  members: readonly Float64Array[];
}

/** Sums over cases: a and D, with the number of cases. */
interface Distances {
  count: number;
  toOutcome: Float64Array;
  /** Row-major. */
  between: Float64Array;
}

const MAX_STEPS = 2000;
const SMALLEST_GAIN = 1e-12;

export interface Stacking {
  /** From all cases, in the order of the methods. */
  weights: number[];
  /** Mean CRPS of each method alone. */
  single: number[];
  /** Weights learnt without the group, for each group. */
  weightsWithout: Map<number, number[]>;
  /** Mean CRPS over all cases, each scored with the weights learnt without its group. */
  leftOut: number;
}

/** @param cases at least two groups, each case with the members of every method */
export function stack(cases: readonly StackingCase[]): Stacking {
  const byGroup = new Map<number, Distances>();
  for (const item of cases) addCase(byGroup, item);
  const groups = [...byGroup];
  const all = sumDistances(groups.map(([, distances]) => distances));
  const weightsWithout = new Map<number, number[]>();
  let total = 0;
  for (const [group, distances] of groups) {
    const others = sumDistances(groups.filter(([other]) => other !== group).map(([, rest]) => rest));
    const weights = minimise(others);
    weightsWithout.set(group, weights);
    total += poolCrps(distances, weights) * distances.count;
  }
  const methods = all.toOutcome.length;
  return {
    weights: minimise(all),
    single: Array.from({ length: methods }, (_, k) => poolCrps(all, unitWeights(methods, k))),
    weightsWithout,
    leftOut: total / all.count,
  };
}

/** CRPS of one case under a pool of its members. */
export function casePoolCrps(item: StackingCase, weights: readonly number[]): number {
  const single = new Map<number, Distances>();
  addCase(single, item);
  return poolCrps(sumDistances([...single.values()]), weights);
}

function addCase(byGroup: Map<number, Distances>, { group, actual, members }: StackingCase): void {
  const n = members.length;
  const sums = byGroup.get(group) ?? {
    count: 0,
    toOutcome: new Float64Array(n),
    between: new Float64Array(n * n),
  };
  byGroup.set(group, sums);
  sums.count += 1;
  for (let k = 0; k < n; k++) {
    sums.toOutcome[k] += meanDistanceTo(members[k], actual);
    for (let l = k; l < n; l++) {
      const distance = meanDistance(members[k], members[l]);
      sums.between[k * n + l] += distance;
      if (l !== k) sums.between[l * n + k] += distance;
    }
  }
}

function meanDistanceTo(members: Float64Array, y: number): number {
  let sum = 0;
  for (const x of members) sum += Math.abs(x - y);
  return sum / members.length;
}

/** Mean |x - z| over all pairs of two ascending sets, in one pass: the integral of F (1 - G) + G (1 - F). */
function meanDistance(first: Float64Array, second: Float64Array): number {
  const [n, m] = [first.length, second.length];
  let [i, j] = [0, 0];
  let before = Math.min(first[0], second[0]);
  let sum = 0;
  while (i < n || j < m) {
    const isFirst = j >= m || (i < n && first[i] <= second[j]);
    const here = isFirst ? first[i] : second[j];
    sum += (here - before) * ((i / n) * (1 - j / m) + (j / m) * (1 - i / n));
    before = here;
    if (isFirst) i++;
    else j++;
  }
  return sum;
}

function sumDistances(parts: readonly Distances[]): Distances {
  const n = parts[0].toOutcome.length;
  const sum = { count: 0, toOutcome: new Float64Array(n), between: new Float64Array(n * n) };
  for (const part of parts) {
    sum.count += part.count;
    part.toOutcome.forEach((value, k) => {
      sum.toOutcome[k] += value;
    });
    part.between.forEach((value, k) => {
      sum.between[k] += value;
    });
  }
  return sum;
}

function poolCrps({ count, toOutcome, between }: Distances, weights: readonly number[]): number {
  const n = weights.length;
  let value = 0;
  for (let k = 0; k < n; k++) {
    value += weights[k] * toOutcome[k];
    for (let l = 0; l < n; l++) value -= 0.5 * weights[k] * weights[l] * between[k * n + l];
  }
  return value / count;
}

function minimise(distances: Distances): number[] {
  const { count, toOutcome, between } = distances;
  const n = toOutcome.length;
  let weights: number[] = Array.from({ length: n }, () => 1 / n);
  let value = poolCrps(distances, weights);
  const scale = between.reduce((most, distance) => Math.max(most, distance), 0) / count || 1;
  let step = 1 / scale;
  for (let i = 0; i < MAX_STEPS; i++) {
    const gradient = weights.map((_, k) => {
      const pull = weights.reduce((sum, weight, l) => sum + weight * between[k * n + l], 0);
      return (toOutcome[k] - pull) / count;
    });
    const trial = projectOnSimplex(weights.map((weight, k) => weight - step * gradient[k]));
    const here = poolCrps(distances, trial);
    if (here <= value) {
      const gain = value - here;
      weights = trial;
      value = here;
      if (gain <= SMALLEST_GAIN * scale) break;
      step *= 1.5;
    } else {
      step /= 2;
    }
  }
  return weights;
}

/** Nearest point with non-negative entries that add to 1 (Held, Wolfe & Crowder 1974). */
export function projectOnSimplex(point: readonly number[]): number[] {
  const sorted = [...point].sort((a, b) => b - a);
  let sum = 0;
  let shift = 0;
  sorted.forEach((value, k) => {
    sum += value;
    const candidate = (sum - 1) / (k + 1);
    if (value > candidate) shift = candidate;
  });
  return point.map((value) => Math.max(0, value - shift));
}

function unitWeights(length: number, at: number): number[] {
  return Array.from({ length }, (_, k) => (k === at ? 1 : 0));
}
