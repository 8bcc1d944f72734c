/**
 * Starts of the plain least-squares fit: growth per user between neighbouring counts, regressed on their interval means
 *
 *   ln(N_i(t + h)/N_i(t))/h = r_i - b_ii N_i - b_ij N_j      (gradient matching; any spacing of the times)
 *
 * and lognormal variations around it. What the regression puts below zero starts at zero.
 */
import { factorise } from '../numeric/linear';
import { createStream, type RandomStream } from '../numeric/random';
import type { PlainProblem, PlainSeries } from './plain-problem';

/** Spread (sd of the logarithm) of the variations. */
const RATE_SPREAD = 0.4;
const LEVEL_SPREAD = 0.5;
const CROWDING_SPREAD = 0.7;
/** A coefficient that the regression puts at zero varies around this share of r. */
const SMALL_SHARE = 0.05;

/** Tries of one variation, each half as far from the centre as the one before, until the path can be followed. */
const MAX_TRIES = 8;

/** `count` starts in the parameters of `plain-problem.ts`, the regression itself first. */
export function createPlainStarts(
  series: PlainSeries,
  problem: PlainProblem,
  count: number,
  seed: number,
): Float64Array[] {
  const centre = regress(series, problem.scales);
  const residuals = new Float64Array(problem.residualCount);
  return Array.from({ length: count }, (_, i) => {
    if (i === 0) return centre;
    const random = createStream(seed, i);
    let start = centre;
    for (let tries = 0; tries < MAX_TRIES; tries++) {
      start = vary(centre, random, 2 ** -tries);
      if (problem.evaluate(start, residuals, null)) break;
    }
    return start;
  });
}

function regress(series: PlainSeries, scales: readonly [number, number]): Float64Array {
  const x = series.first.map((count) => count && count / scales[0]);
  const y = series.second.map((count) => count && count / scales[1]);
  const [r1, c11, c12] = regressFirm(series.times, x, y);
  const [r2, c22, c21] = regressFirm(series.times, y, x);
  const level = (counts: (number | null)[]) => Math.log(counts.find((count) => count !== null && count > 0)!);
  return Float64Array.of(Math.log(r1), Math.log(r2), level(x), level(y), c11, c12, c21, c22);
}

/** r > 0, own >= 0, other >= 0 of one firm, in scaled counts. */
function regressFirm(
  times: readonly number[],
  own: (number | null)[],
  other: (number | null)[],
): [number, number, number] {
  const rows: number[] = [];
  const growths: number[] = [];
  for (let i = 0; i + 1 < times.length; i++) {
    const [a, b, c, d] = [own[i], own[i + 1], other[i], other[i + 1]];
    if (a === null || b === null || c === null || d === null || !(a > 0) || !(b > 0)) continue;
    rows.push(1, -(a + b) / 2, -(c + d) / 2);
    growths.push(-Math.log(b / a) / (times[i + 1] - times[i]));
  }
  const solution = growths.length >= 3 ? solve(rows, growths) : [0, 0, 0];
  const slowest = 1 / (times[times.length - 1] - times[0]);
  return [Math.max(solution[0], slowest), Math.max(solution[1], 0), Math.max(solution[2], 0)];
}

/** Least squares of three unknowns; directions the data do not show stay at zero. */
function solve(rows: number[], negated: number[]): number[] {
  const factor = factorise(Float64Array.from(rows), Float64Array.from(negated), new Float64Array(3).fill(1));
  return [0, 1, 2].map((j) => {
    let sum = 0;
    for (let k = 0; k < factor.rank; k++) {
      sum -= (factor.rightVectors[3 * j + k] * factor.projected[k]) / factor.singularValues[k];
    }
    return sum;
  });
}

function vary(centre: Float64Array, random: RandomStream, share: number): Float64Array {
  return centre.map((value, j) => {
    const distance = share * random.normal();
    if (j < 2) return value + RATE_SPREAD * distance;
    if (j < 4) return value + LEVEL_SPREAD * distance;
    const rate = Math.exp(centre[j < 6 ? 0 : 1]);
    return Math.max(value, SMALL_SHARE * rate) * Math.exp(CROWDING_SPREAD * distance);
  });
}
