/**
 * How likely future counts are under each posterior draw: the weights with which further months would re-weight the draws.
 *
 * ln counts around the draw's own path m(h) from the last month on: y(h) = m(h) + d(h) + v(h), two firms at once.
 *   process noise       d(h) = F(h) d(h-1) + w, F the derivative of the path's month in ln users, w ~ N(0, noise^2), v ~ N(0, size^2):
 *                       the Kalman filter along the path. The draw holds the state of the last month, so d(0) = 0 exactly.
 *   persistent errors   d(h) = phi d(h-1) + w, d(0) the error in the last month, w ~ N(0, size^2 (1 - phi^2)), no v.
 * Gains and covariances do not depend on the counts: they are computed once per draw, after which a count costs a few products.
 */
import { createMonthFlow } from '../../dynamics/month-flow';
import { readColumn } from '../../estimate/draws';
import type { DrawSet } from '../../estimate/types';
import { readDrawTable } from '../draw-table';
import { readSeasonFactors } from '../simulate';

export interface FutureLikelihood {
  readonly months: number;
  /** Draws. */
  readonly count: number;
  /**
   * Log likelihood of the first 1, 2, .. months of ln counts under draw i, into `out` (months); -Infinity where the draw's path cannot
   * be followed.
   * @param logCounts 2 x months: firm 1, then firm 2
   */
  fillLogLikelihood(i: number, logCounts: Float64Array, out: Float64Array): void;
}

/** Per draw and month: m (2), F (4), gain (4), inverse innovation covariance (3), -(ln det)/2. */
const WIDTH = 14;

interface Columns {
  size: readonly [Float64Array, Float64Array];
  /** Process noise, or zeros. */
  noise: readonly [Float64Array, Float64Array];
  /** Persistence and last residual of AR(1) errors; null with process noise. */
  carried: {
    persistence: readonly [Float64Array, Float64Array];
    residual: readonly [Float64Array, Float64Array];
  } | null;
}

export function createFutureLikelihood(draws: DrawSet, months: number): FutureLikelihood {
  const { count } = draws;
  const table = new Float64Array(count * months * WIDTH);
  const isFollowed = new Uint8Array(count);
  const columns = readErrorColumns(draws);
  fillPaths(draws, months, table, isFollowed);
  for (let i = 0; i < count; i++) {
    if (isFollowed[i] === 0) continue;
    if (columns.carried) prepareCarried(table, i, months, columns);
    else prepareFilter(table, i, months, columns);
  }
  const residual = columns.carried?.residual;

  const fillLogLikelihood = (i: number, logCounts: Float64Array, out: Float64Array): void => {
    if (isFollowed[i] === 0) {
      out.fill(Number.NEGATIVE_INFINITY);
      return;
    }
    let d1 = residual ? residual[0][i] : 0;
    let d2 = residual ? residual[1][i] : 0;
    let sum = 0;
    let at = i * months * WIDTH;
    for (let h = 0; h < months; h++, at += WIDTH) {
      const p1 = table[at + 2] * d1 + table[at + 3] * d2;
      const p2 = table[at + 4] * d1 + table[at + 5] * d2;
      const v1 = logCounts[h] - table[at] - p1;
      const v2 = logCounts[months + h] - table[at + 1] - p2;
      sum +=
        table[at + 13] -
        0.5 * (table[at + 10] * v1 * v1 + 2 * table[at + 11] * v1 * v2 + table[at + 12] * v2 * v2);
      out[h] = sum;
      d1 = p1 + table[at + 6] * v1 + table[at + 7] * v2;
      d2 = p2 + table[at + 8] * v1 + table[at + 9] * v2;
    }
  };

  return { months, count, fillLogLikelihood };
}

function readErrorColumns(draws: DrawSet): Columns {
  const pair = (name: string) => [readColumn(draws, `${name}1`), readColumn(draws, `${name}2`)] as const;
  const size = pair('size');
  if (draws.errorModel === 'process-noise') return { size, noise: pair('noise'), carried: null };
  const carried = { persistence: pair('persistence'), residual: pair('residual') };
  return { size, noise: size, carried };
}

/** Fills m and F. */
function fillPaths(draws: DrawSet, months: number, table: Float64Array, isFollowed: Uint8Array): void {
  const { count, r1, r2, k1, k2, alpha, beta, n1, n2 } = readDrawTable(draws);
  const seasons = [readSeasonFactors(draws, 1, months), readSeasonFactors(draws, 2, months)];
  const flow = createMonthFlow(1);
  const { state, tangent } = flow;
  for (let i = 0; i < count; i++) {
    flow.setParameters(r1[i], r2[i], alpha[i], beta[i]);
    state[0] = n1[i] / k1[i];
    state[1] = n2[i] / k2[i];
    isFollowed[i] = 1;
    for (let h = 0; h < months; h++) {
      // columns 4 and 5 of the tangent are the two directions of the start
      tangent.fill(0);
      tangent[8] = state[0];
      tangent[11] = state[1];
      if (!flow.advance(0) || !(state[0] > 0 && state[1] > 0)) {
        isFollowed[i] = 0;
        break;
      }
      flow.pushForward(0);
      const at = (i * months + h) * WIDTH;
      table[at] = Math.log(state[0] * k1[i] * (seasons[0] ? seasons[0][h * count + i] : 1));
      table[at + 1] = Math.log(state[1] * k2[i] * (seasons[1] ? seasons[1][h * count + i] : 1));
      table[at + 2] = tangent[8] / state[0];
      table[at + 3] = tangent[10] / state[0];
      table[at + 4] = tangent[9] / state[1];
      table[at + 5] = tangent[11] / state[1];
    }
  }
}

function prepareFilter(table: Float64Array, i: number, months: number, { size, noise }: Columns): void {
  const [q1, q2] = [noise[0][i] ** 2, noise[1][i] ** 2];
  const [r1, r2] = [size[0][i] ** 2, size[1][i] ** 2];
  let p11 = 0;
  let p12 = 0;
  let p22 = 0;
  for (let h = 0; h < months; h++) {
    const at = (i * months + h) * WIDTH;
    const f11 = table[at + 2];
    const f12 = table[at + 3];
    const f21 = table[at + 4];
    const f22 = table[at + 5];
    const a11 = f11 * p11 + f12 * p12;
    const a12 = f11 * p12 + f12 * p22;
    const a21 = f21 * p11 + f22 * p12;
    const a22 = f21 * p12 + f22 * p22;
    p11 = a11 * f11 + a12 * f12 + q1;
    p12 = a11 * f21 + a12 * f22;
    p22 = a21 * f21 + a22 * f22 + q2;
    setInnovation(table, at, p11 + r1, p12, p22 + r2);
    const g11 = p11 * table[at + 10] + p12 * table[at + 11];
    const g12 = p11 * table[at + 11] + p12 * table[at + 12];
    const g21 = p12 * table[at + 10] + p22 * table[at + 11];
    const g22 = p12 * table[at + 11] + p22 * table[at + 12];
    table[at + 6] = g11;
    table[at + 7] = g12;
    table[at + 8] = g21;
    table[at + 9] = g22;
    const next11 = (1 - g11) * p11 - g12 * p12;
    const next12 = (1 - g11) * p12 - g12 * p22;
    const next22 = (1 - g22) * p22 - g21 * p12;
    p11 = next11;
    p12 = next12;
    p22 = next22;
  }
}

function prepareCarried(table: Float64Array, i: number, months: number, { size, carried }: Columns): void {
  const [phi1, phi2] = carried!.persistence.map((column) => column[i]);
  const [s1, s2] = size.map((column) => column[i]);
  for (let h = 0; h < months; h++) {
    const at = (i * months + h) * WIDTH;
    table[at + 2] = phi1;
    table[at + 3] = 0;
    table[at + 4] = 0;
    table[at + 5] = phi2;
    table[at + 6] = 1;
    table[at + 7] = 0;
    table[at + 8] = 0;
    table[at + 9] = 1;
    setInnovation(table, at, s1 * s1 * (1 - phi1 * phi1), 0, s2 * s2 * (1 - phi2 * phi2));
  }
}

function setInnovation(table: Float64Array, at: number, s11: number, s12: number, s22: number): void {
  const determinant = s11 * s22 - s12 * s12;
  table[at + 10] = s22 / determinant;
  table[at + 11] = -s12 / determinant;
  table[at + 12] = s11 / determinant;
  table[at + 13] = -0.5 * Math.log(determinant);
}
