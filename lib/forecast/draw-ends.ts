/**
 * Where each draw ends, and when it gets there: follows every draw for WINDOW_MONTHS from the last month of the series.
 *
 * A firm that has left stays away and the other one ends at its K. Else:
 * Coexistence: x* = (1-alpha)/(1-alpha beta), y* = (1-beta)/(1-alpha beta). Exclusion: (K1, 0) or (0, K2). Head start: the winner is
 * firm 1 once x >= x*, y <= y* and firm 2 once x <= x*, y >= y*, for those quarters around the saddle are never left (the system
 * is monotone in the competitive order; Murray, Mathematical Biology I, 3.5).
 */
import { findEquilibria } from '../dynamics/equilibria';
import { halfLifeOfReturn } from '../dynamics/half-life';
import { createTrajectory, type Trajectory } from '../dynamics/trajectory';
import { type DrawTable, fillTheta } from './draw-table';
import { outcomeOf } from './odds';

/** How far ahead milestones are looked for. */
export const WINDOW_MONTHS = 120;

/** Near the destination: the distances of both firms together are at most this share of the users there. */
export const NEAR = 0.05;

/** Windows after which a draw that still sits on the separatrix is given to the firm that is further from the saddle. */
const MAX_WINDOWS = 20;

export interface DrawEnds {
  /** Users of both firms at the destination, per draw. */
  n1End: Float64Array;
  n2End: Float64Array;
  /** Months until the path stays near the destination; NaN: not within the window. */
  nearMonth: Float64Array;
  /** Months until firm 1 leads, and until firm 2 leads, 0 when it leads already; NaN: not within the window. */
  firstLeads: Float64Array;
  secondLeads: Float64Array;
  /** Half-life of return at the destination, months; NaN where nothing returns. */
  halfLife: Float64Array;
  /** Draws whose head start decides, and those of them that firm 1 wins. */
  headStartCount: number;
  headStartFocalWins: number;
}

export function findDrawEnds(table: DrawTable): DrawEnds {
  const column = () => new Float64Array(table.count).fill(Number.NaN);
  const ends: DrawEnds = {
    n1End: column(),
    n2End: column(),
    nearMonth: column(),
    firstLeads: column(),
    secondLeads: column(),
    halfLife: column(),
    headStartCount: 0,
    headStartFocalWins: 0,
  };
  const trajectory = createTrajectory({ months: WINDOW_MONTHS + 1, entry1: 0, entry2: 0 });
  const theta = new Float64Array(8);
  for (let i = 0; i < table.count; i++) {
    fillTheta(table, i, theta);
    if (trajectory.run(theta)) {
      ends.firstLeads[i] = findLead(trajectory.logLevel1, trajectory.logLevel2);
      ends.secondLeads[i] = findLead(trajectory.logLevel2, trajectory.logLevel1);
      placeEnd(table, i, ends, trajectory, theta);
      ends.nearMonth[i] = findNear(trajectory, ends.n1End[i], ends.n2End[i]);
    } else placeEnd(table, i, ends, null, theta);
    ends.halfLife[i] = halfLifeAt(table, i, ends);
  }
  return ends;
}

/** Sets n1End, n2End and the head-start counts. `trajectory` has just run the draw; null when it could not be followed. */
function placeEnd(
  table: DrawTable,
  i: number,
  ends: DrawEnds,
  trajectory: Trajectory | null,
  theta: Float64Array,
): void {
  const alpha = table.alpha[i];
  const beta = table.beta[i];
  const n1 = (table.k1[i] * (1 - alpha)) / (1 - alpha * beta);
  const n2 = (table.k2[i] * (1 - beta)) / (1 - alpha * beta);
  const outcome = outcomeOf(alpha, beta);
  if (isGone(table, i)) {
    ends.n1End[i] = table.n1[i] > 0 ? table.k1[i] : 0;
    ends.n2End[i] = table.n2[i] > 0 ? table.k2[i] : 0;
    return;
  }
  if (outcome === 'coexistence') {
    ends.n1End[i] = n1;
    ends.n2End[i] = n2;
    return;
  }
  let isFirstLeft = outcome === 'exclusionByFocal';
  if (outcome === 'headStartDecides') {
    isFirstLeft = winsHeadStart(trajectory, theta, Math.log(n1), Math.log(n2));
    ends.headStartCount++;
    if (isFirstLeft) ends.headStartFocalWins++;
  }
  ends.n1End[i] = isFirstLeft ? table.k1[i] : 0;
  ends.n2End[i] = isFirstLeft ? 0 : table.k2[i];
}

/** Whether firm 1 is left, from the state at `theta` (already run on `trajectory`) and the saddle. */
function winsHeadStart(
  trajectory: Trajectory | null,
  theta: Float64Array,
  logSaddle1: number,
  logSaddle2: number,
): boolean {
  const at = theta.slice();
  for (let window = 0; trajectory && window < MAX_WINDOWS; window++) {
    if (window > 0 && !trajectory.run(at)) break;
    for (let h = 0; h <= WINDOW_MONTHS; h++) {
      const above1 = trajectory.logLevel1[h] - logSaddle1;
      const above2 = trajectory.logLevel2[h] - logSaddle2;
      if (above1 >= 0 && above2 <= 0) return true;
      if (above1 <= 0 && above2 >= 0) return false;
    }
    at[6] = trajectory.logLevel1[WINDOW_MONTHS];
    at[7] = trajectory.logLevel2[WINDOW_MONTHS];
  }
  return at[6] - logSaddle1 > at[7] - logSaddle2;
}

/** First month in which `own` is above `other`, between months by linear interpolation of the gap. */
function findLead(own: Float64Array, other: Float64Array): number {
  if (own[0] > other[0]) return 0;
  for (let h = 1; h < own.length; h++) {
    const gap = own[h] - other[h];
    if (gap > 0) {
      const before = own[h - 1] - other[h - 1];
      return h - 1 + before / (before - gap);
    }
  }
  return Number.NaN;
}

/** First month from which the path is near (n1, n2) to the end of the window. */
function findNear(trajectory: Trajectory, n1: number, n2: number): number {
  const reach = NEAR * (n1 + n2);
  let month = Number.NaN;
  for (let h = WINDOW_MONTHS; h >= 0; h--) {
    const distance =
      Math.abs(Math.exp(trajectory.logLevel1[h]) - n1) + Math.abs(Math.exp(trajectory.logLevel2[h]) - n2);
    if (!(distance <= reach)) break;
    month = h;
  }
  return month;
}

/** A firm has left: the other one grows alone, whatever the strengths are. */
function isGone({ n1, n2 }: DrawTable, i: number): boolean {
  return !(n1[i] > 0 && n2[i] > 0);
}

function halfLifeAt(table: DrawTable, i: number, ends: DrawEnds): number {
  // alone: a logistic returns to K at rate r
  if (isGone(table, i)) return Math.LN2 / (table.n1[i] > 0 ? table.r1[i] : table.r2[i]);
  const system = {
    r1: table.r1[i],
    r2: table.r2[i],
    k1: table.k1[i],
    k2: table.k2[i],
    alpha: table.alpha[i],
    beta: table.beta[i],
  };
  const place = ends.n1End[i] > 0 ? (ends.n2End[i] > 0 ? 'shared' : 'firstAlone') : 'secondAlone';
  const destination = findEquilibria(system).find((equilibrium) => equilibrium.place === place);
  return (destination && halfLifeOfReturn(destination)) ?? Number.NaN;
}
