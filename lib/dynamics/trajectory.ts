/**
 * The path of a market on the monthly grid in log users, with derivatives in both directions: the hot path of every fit.
 *
 * Parameters, in this order everywhere: ln r1, ln r2, ln K1, ln K2, ln alpha, ln beta, ln N1(start), ln N2(start);
 * N_i(start) is the level in the month in which firm i enters; before it the firm has no users. The months are those of
 * `month-flow.ts`, in scaled state x = N1/K1, y = N2/K2: ln N = ln K + ln x, and ln x(start) = ln N(start) - ln K.
 */
import { createMonthFlow, TANGENT_COLUMNS } from './month-flow';

export const PARAMETER_COUNT = 8;

export interface TrajectoryGrid {
  /** Months on the grid; output index 0 .. months - 1. */
  months: number;
  /** Month index in which each firm enters. The smaller one must be 0. */
  entry1: number;
  entry2: number;
  /** Month index from which on a firm has no users; absent: it stays. */
  exit1?: number;
  exit2?: number;
}

export interface Trajectory {
  readonly grid: TrajectoryGrid;
  /** Integration steps taken since creation: the measure of work. */
  readonly steps: number;
  /** ln users of each firm per month after `run`; -Infinity before its entry and from its exit on. */
  readonly logLevel1: Float64Array;
  readonly logLevel2: Float64Array;
  /**
   * Integrates. `theta`: eight log parameters; a start of -Infinity is a firm without users, which stays so.
   * @returns false when the path is not finite, not positive, or too fast to follow; the levels are then meaningless
   */
  run(theta: ArrayLike<number>): boolean;
  /**
   * Adds to `gradient` (8) the derivative of sum_t (weight1[t] ln N1(t) + weight2[t] ln N2(t)) with respect to theta,
   * along the path of the last successful `run`.
   */
  pullBack(weight1: Float64Array, weight2: Float64Array, gradient: Float64Array): void;
  /**
   * Integrates like `run` and fills d ln N_i(t) / d theta_j.
   * @param out length 2 x months x 8: firm-major, then month, then parameter; 0 before a firm's entry and from its exit on
   */
  fillSensitivities(theta: ArrayLike<number>, out: Float64Array): boolean;
}

/**
 * A reusable integrator for one grid.
 * @throws RangeError when the grid has no month or no firm enters in month 0
 */
export function createTrajectory(grid: TrajectoryGrid): Trajectory {
  const { months, entry1, entry2 } = grid;
  /** Month from which on a firm has no users: its exit, or its entry when it starts without any. */
  let exit1 = months;
  let exit2 = months;
  checkGrid(grid);
  const flow = createMonthFlow(months);
  const { state, tangent, adjoint } = flow;
  const logLevel1 = new Float64Array(months);
  const logLevel2 = new Float64Array(months);
  const levelX = new Float64Array(months);
  const levelY = new Float64Array(months);

  const run = (theta: ArrayLike<number>): boolean => {
    flow.setParameters(Math.exp(theta[0]), Math.exp(theta[1]), Math.exp(theta[4]), Math.exp(theta[5]));
    state[0] = 0;
    state[1] = 0;
    exit1 = theta[6] === Number.NEGATIVE_INFINITY ? entry1 : (grid.exit1 ?? months);
    exit2 = theta[7] === Number.NEGATIVE_INFINITY ? entry2 : (grid.exit2 ?? months);
    for (let t = 0; t < months; t++) {
      if (t === entry1) state[0] = Math.exp(theta[6] - theta[2]);
      if (t === entry2) state[1] = Math.exp(theta[7] - theta[3]);
      if (t === exit1) state[0] = 0;
      if (t === exit2) state[1] = 0;
      if (!isUsable(state[0], t >= entry1 && t < exit1) || !isUsable(state[1], t >= entry2 && t < exit2))
        return false;
      levelX[t] = state[0];
      levelY[t] = state[1];
      logLevel1[t] = theta[2] + Math.log(state[0]);
      logLevel2[t] = theta[3] + Math.log(state[1]);
      if (t < months - 1 && !flow.advance(t)) return false;
    }
    return true;
  };

  const pullBack = (weight1: Float64Array, weight2: Float64Array, gradient: Float64Array): void => {
    flow.clearGradient();
    adjoint.fill(0);
    let start1 = 0;
    let start2 = 0;
    let sum1 = 0;
    let sum2 = 0;
    for (let t = months - 1; t >= 0; t--) {
      if (t < months - 1) flow.pullBack(t);
      if (t >= entry1 && t < exit1) {
        adjoint[0] += weight1[t] / levelX[t];
        sum1 += weight1[t];
      }
      if (t >= entry2 && t < exit2) {
        adjoint[1] += weight2[t] / levelY[t];
        sum2 += weight2[t];
      }
      // before its entry and from its exit on a firm's level is 0 whatever the parameters are
      if (t === exit1) adjoint[0] = 0;
      if (t === exit2) adjoint[1] = 0;
      if (t === entry1) {
        start1 = adjoint[0] * levelX[t];
        adjoint[0] = 0;
      }
      if (t === entry2) {
        start2 = adjoint[1] * levelY[t];
        adjoint[1] = 0;
      }
    }
    gradient[0] += flow.gradient[0];
    gradient[1] += flow.gradient[1];
    gradient[2] += sum1 - start1;
    gradient[3] += sum2 - start2;
    gradient[4] += flow.gradient[2];
    gradient[5] += flow.gradient[3];
    gradient[6] += start1;
    gradient[7] += start2;
  };

  const fillSensitivities = (theta: ArrayLike<number>, out: Float64Array): boolean => {
    if (!run(theta)) return false;
    tangent.fill(0);
    for (let t = 0; t < months; t++) {
      if (t === entry1) enter(tangent, 0, levelX[t]);
      if (t === entry2) enter(tangent, 1, levelY[t]);
      if (t === exit1) leave(tangent, 0);
      if (t === exit2) leave(tangent, 1);
      const has1 = t >= entry1 && t < exit1;
      const has2 = t >= entry2 && t < exit2;
      writeLogSensitivities(tangent, 0, has1 ? 1 / levelX[t] : 0, out, t * PARAMETER_COUNT);
      writeLogSensitivities(tangent, 1, has2 ? 1 / levelY[t] : 0, out, (months + t) * PARAMETER_COUNT);
      if (t < months - 1) flow.pushForward(t);
    }
    return true;
  };

  return {
    grid,
    get steps() {
      return flow.steps;
    },
    logLevel1,
    logLevel2,
    run,
    pullBack,
    fillSensitivities,
  };
}

function checkGrid({ months, entry1, entry2 }: TrajectoryGrid): void {
  if (!(Number.isInteger(months) && months >= 1)) {
    throw new RangeError(`months must be a positive integer, got ${months}`);
  }
  if (Math.min(entry1, entry2) !== 0) {
    throw new RangeError(`one firm must enter in month 0, got ${entry1} and ${entry2}`);
  }
}

/** A firm's scaled level may be 0 only before its entry and from its exit on; NaN and overflow fail. */
function isUsable(level: number, isThere: boolean): boolean {
  return isThere ? level > 0 && level < Number.POSITIVE_INFINITY : level === 0;
}

/** At its entry a firm's level depends on its own start alone. */
function enter(tangent: Float64Array, row: number, level: number): void {
  for (let column = 0; column < TANGENT_COLUMNS; column++) tangent[2 * column + row] = 0;
  tangent[2 * (4 + row) + row] = level;
}

/** From its exit on a firm's level depends on nothing. */
function leave(tangent: Float64Array, row: number): void {
  for (let column = 0; column < TANGENT_COLUMNS; column++) tangent[2 * column + row] = 0;
}

/** d ln N / d theta of one firm from the scaled tangents. */
function writeLogSensitivities(
  tangent: Float64Array,
  row: number,
  inverseLevel: number,
  out: Float64Array,
  to: number,
): void {
  const startX = tangent[8 + row] * inverseLevel;
  const startY = tangent[10 + row] * inverseLevel;
  const own = inverseLevel === 0 ? 0 : 1;
  out[to] = tangent[row] * inverseLevel;
  out[to + 1] = tangent[2 + row] * inverseLevel;
  out[to + 2] = (row === 0 ? own : 0) - startX;
  out[to + 3] = (row === 1 ? own : 0) - startY;
  out[to + 4] = tangent[4 + row] * inverseLevel;
  out[to + 5] = tangent[6 + row] * inverseLevel;
  out[to + 6] = startX;
  out[to + 7] = startY;
}
