/**
 * The hot path of every fit: the competitive growth system on the monthly grid, with derivatives in both directions.
 *
 * Scaled state x = N1/K1, y = N2/K2 (K leaves the right-hand side):
 *   x' = r1 x (1 - x - alpha y),   y' = r2 y (1 - y - beta x)              (Murray, Mathematical Biology I, 3.5)
 * Classical Runge-Kutta of order 4 (Kutta 1901); each month is cut into as many equal steps as its fastest rate asks for, so that
 * rate x step <= MAX_RATE_STEP. The derivatives are those of the discrete map itself: exact gradients of what is computed.
 *   forward  S' = J S + df/dp, variational equations, all eight log parameters      (fillSensitivities)
 *   reverse  lambda' = -J^T lambda along the stored stages (Griewank & Walther 2008)  (pullBack)
 *
 * Parameters, in this order everywhere: ln r1, ln r2, ln K1, ln K2, ln alpha, ln beta, ln N1(start), ln N2(start);
 * N_i(start) is the level in the month in which firm i enters. Time unit: month. Nothing is allocated after creation.
 */

export const PARAMETER_COUNT = 8;

/** Largest (rate x step): the local error of a step is then about (0.2)^5 / 120 = 3e-6 of the level, mostly far less. */
export const MAX_RATE_STEP = 0.2;

/** More steps than this in one month: parameters far outside anything a market shows; the path is refused. */
export const MAX_STEPS_PER_MONTH = 200;

/** Substeps the tape has room for at first; it grows when a path asks for more. */
const FIRST_TAPE_STEPS_PER_MONTH = 4;

/** Doubles per taped step: the four stage states (x, y). */
const TAPE_WIDTH = 8;

/** Columns of the scaled sensitivities: ln r1, ln r2, ln alpha, ln beta, ln x(start), ln y(start). */
const SCALED_COLUMNS = 6;

export interface TrajectoryGrid {
  /** Months on the grid; output index 0 .. months - 1. */
  months: number;
  /** Month index in which each firm enters; before it the firm has no users. The smaller one must be 0. */
  entry1: number;
  entry2: number;
}

export interface Trajectory {
  readonly grid: TrajectoryGrid;
  /** ln users of each firm per month after `run`; -Infinity before its entry. */
  readonly logLevel1: Float64Array;
  readonly logLevel2: Float64Array;
  /**
   * Integrates. `theta`: eight log parameters.
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
   * @param out length 2 x months x 8: firm-major, then month, then parameter; 0 before a firm's entry
   */
  fillSensitivities(theta: ArrayLike<number>, out: Float64Array): boolean;
}

/**
 * A reusable integrator for one grid.
 * @throws RangeError when the grid has no month or no firm enters in month 0
 */
export function createTrajectory(grid: TrajectoryGrid): Trajectory {
  const { months, entry1, entry2 } = grid;
  if (!(Number.isInteger(months) && months >= 1))
    throw new RangeError(`months must be a positive integer, got ${months}`);
  if (!(Math.min(entry1, entry2) === 0))
    throw new RangeError(`one firm must enter in month 0, got ${entry1} and ${entry2}`);

  const logLevel1 = new Float64Array(months);
  const logLevel2 = new Float64Array(months);
  const levelX = new Float64Array(months);
  const levelY = new Float64Array(months);
  const stepsOfMonth = new Int32Array(months);
  let tape = new Float64Array(months * FIRST_TAPE_STEPS_PER_MONTH * TAPE_WIDTH);
  const tangent = new Float64Array(2 * SCALED_COLUMNS);
  const stages = new Float64Array(4 * 8);

  let r1 = 0;
  let r2 = 0;
  let alpha = 0;
  let beta = 0;

  const readParameters = (theta: ArrayLike<number>) => {
    r1 = Math.exp(theta[0]);
    r2 = Math.exp(theta[1]);
    alpha = Math.exp(theta[4]);
    beta = Math.exp(theta[5]);
  };

  const run = (theta: ArrayLike<number>): boolean => {
    readParameters(theta);
    const startX = Math.exp(theta[6] - theta[2]);
    const startY = Math.exp(theta[7] - theta[3]);
    let x = 0;
    let y = 0;
    let at = 0;
    for (let t = 0; t < months; t++) {
      if (t === entry1) x = startX;
      if (t === entry2) y = startY;
      levelX[t] = x;
      levelY[t] = y;
      if (!isUsable(x, t >= entry1) || !isUsable(y, t >= entry2)) return false;
      logLevel1[t] = theta[2] + Math.log(x);
      logLevel2[t] = theta[3] + Math.log(y);
      if (t === months - 1) break;

      const steps = countSteps(r1, r2, alpha, beta, x, y);
      if (steps === 0) return false;
      stepsOfMonth[t] = steps;
      if (tape.length < at + steps * TAPE_WIDTH) tape = grow(tape, at + steps * TAPE_WIDTH);
      const h = 1 / steps;
      const half = 0.5 * h;
      const sixth = h / 6;
      for (let s = 0; s < steps; s++) {
        const ax = r1 * x * (1 - x - alpha * y);
        const ay = r2 * y * (1 - y - beta * x);
        const x2 = x + half * ax;
        const y2 = y + half * ay;
        const bx = r1 * x2 * (1 - x2 - alpha * y2);
        const by = r2 * y2 * (1 - y2 - beta * x2);
        const x3 = x + half * bx;
        const y3 = y + half * by;
        const cx = r1 * x3 * (1 - x3 - alpha * y3);
        const cy = r2 * y3 * (1 - y3 - beta * x3);
        const x4 = x + h * cx;
        const y4 = y + h * cy;
        const dx = r1 * x4 * (1 - x4 - alpha * y4);
        const dy = r2 * y4 * (1 - y4 - beta * x4);
        tape[at] = x;
        tape[at + 1] = y;
        tape[at + 2] = x2;
        tape[at + 3] = y2;
        tape[at + 4] = x3;
        tape[at + 5] = y3;
        tape[at + 6] = x4;
        tape[at + 7] = y4;
        at += TAPE_WIDTH;
        x += sixth * (ax + 2 * (bx + cx) + dx);
        y += sixth * (ay + 2 * (by + cy) + dy);
      }
    }
    return true;
  };

  const pullBack = (weight1: Float64Array, weight2: Float64Array, gradient: Float64Array): void => {
    const r1Alpha = r1 * alpha;
    const r2Beta = r2 * beta;
    let gr1 = 0;
    let gr2 = 0;
    let gAlpha = 0;
    let gBeta = 0;
    let gStartX = 0;
    let gStartY = 0;
    let gK1 = 0;
    let gK2 = 0;
    let lx = 0;
    let ly = 0;
    let at = 0;
    for (let t = 0; t < months - 1; t++) at += stepsOfMonth[t] * TAPE_WIDTH;

    for (let t = months - 1; t >= 0; t--) {
      if (t < months - 1) {
        const steps = stepsOfMonth[t];
        const h = 1 / steps;
        const half = 0.5 * h;
        const sixth = h / 6;
        const third = h / 3;
        for (let s = 0; s < steps; s++) {
          at -= TAPE_WIDTH;
          let sumX = lx;
          let sumY = ly;
          let kx = sixth * lx;
          let ky = sixth * ly;
          for (let stage = 3; stage >= 0; stage--) {
            const x = tape[at + 2 * stage];
            const y = tape[at + 2 * stage + 1];
            const kxx = kx * x;
            const kyy = ky * y;
            const roomX = 1 - x - alpha * y;
            const roomY = 1 - y - beta * x;
            gr1 += kxx * roomX;
            gr2 += kyy * roomY;
            gAlpha -= kxx * y;
            gBeta -= kyy * x;
            const vx = kx * r1 * (roomX - x) - r2Beta * kyy;
            const vy = ky * r2 * (roomY - y) - r1Alpha * kxx;
            sumX += vx;
            sumY += vy;
            if (stage > 0) {
              const weight = stage === 1 ? sixth : third;
              const reach = stage === 3 ? h : half;
              kx = weight * lx + reach * vx;
              ky = weight * ly + reach * vy;
            }
          }
          lx = sumX;
          ly = sumY;
        }
      }
      if (t >= entry1) {
        lx += weight1[t] / levelX[t];
        gK1 += weight1[t];
      }
      if (t >= entry2) {
        ly += weight2[t] / levelY[t];
        gK2 += weight2[t];
      }
      if (t === entry1) {
        gStartX = lx * levelX[t];
        lx = 0;
      }
      if (t === entry2) {
        gStartY = ly * levelY[t];
        ly = 0;
      }
    }
    gradient[0] += gr1 * r1;
    gradient[1] += gr2 * r2;
    gradient[2] += gK1 - gStartX;
    gradient[3] += gK2 - gStartY;
    gradient[4] += gAlpha * r1Alpha;
    gradient[5] += gBeta * r2Beta;
    gradient[6] += gStartX;
    gradient[7] += gStartY;
  };

  /** One step of the variational equations for every column, given the stage states on the tape. */
  const stepTangent = (at: number, h: number) => {
    const half = 0.5 * h;
    const sixth = h / 6;
    for (let stage = 0; stage < 4; stage++) {
      const x = tape[at + 2 * stage];
      const y = tape[at + 2 * stage + 1];
      const roomX = 1 - x - alpha * y;
      const roomY = 1 - y - beta * x;
      const base = 8 * stage;
      stages[base] = r1 * (roomX - x);
      stages[base + 1] = -r1 * alpha * x;
      stages[base + 2] = -r2 * beta * y;
      stages[base + 3] = r2 * (roomY - y);
      stages[base + 4] = r1 * x * roomX;
      stages[base + 5] = r2 * y * roomY;
      stages[base + 6] = -r1 * alpha * x * y;
      stages[base + 7] = -r2 * beta * x * y;
    }
    const a11 = stages[0];
    const a12 = stages[1];
    const a21 = stages[2];
    const a22 = stages[3];
    const b11 = stages[8];
    const b12 = stages[9];
    const b21 = stages[10];
    const b22 = stages[11];
    const c11 = stages[16];
    const c12 = stages[17];
    const c21 = stages[18];
    const c22 = stages[19];
    const d11 = stages[24];
    const d12 = stages[25];
    const d21 = stages[26];
    const d22 = stages[27];
    for (let column = 0; column < SCALED_COLUMNS; column++) {
      const sx = tangent[2 * column];
      const sy = tangent[2 * column + 1];
      // columns 0 and 2 force firm 1's equation, 1 and 3 firm 2's, the start columns neither
      const isForced = column < 4;
      const slot = 4 + column;
      const onX = isForced && (column & 1) === 0;
      const onY = isForced && (column & 1) === 1;
      const ax = a11 * sx + a12 * sy + (onX ? stages[slot] : 0);
      const ay = a21 * sx + a22 * sy + (onY ? stages[slot] : 0);
      const sx2 = sx + half * ax;
      const sy2 = sy + half * ay;
      const bx = b11 * sx2 + b12 * sy2 + (onX ? stages[8 + slot] : 0);
      const by = b21 * sx2 + b22 * sy2 + (onY ? stages[8 + slot] : 0);
      const sx3 = sx + half * bx;
      const sy3 = sy + half * by;
      const cx = c11 * sx3 + c12 * sy3 + (onX ? stages[16 + slot] : 0);
      const cy = c21 * sx3 + c22 * sy3 + (onY ? stages[16 + slot] : 0);
      const sx4 = sx + h * cx;
      const sy4 = sy + h * cy;
      const dx = d11 * sx4 + d12 * sy4 + (onX ? stages[24 + slot] : 0);
      const dy = d21 * sx4 + d22 * sy4 + (onY ? stages[24 + slot] : 0);
      tangent[2 * column] = sx + sixth * (ax + 2 * (bx + cx) + dx);
      tangent[2 * column + 1] = sy + sixth * (ay + 2 * (by + cy) + dy);
    }
  };

  const fillSensitivities = (theta: ArrayLike<number>, out: Float64Array): boolean => {
    if (!run(theta)) return false;
    tangent.fill(0);
    let at = 0;
    for (let t = 0; t < months; t++) {
      if (t === entry1) enter(tangent, 0, levelX[t]);
      if (t === entry2) enter(tangent, 1, levelY[t]);
      writeLogSensitivities(tangent, 0, t >= entry1 ? 1 / levelX[t] : 0, out, t * PARAMETER_COUNT);
      writeLogSensitivities(tangent, 1, t >= entry2 ? 1 / levelY[t] : 0, out, (months + t) * PARAMETER_COUNT);
      if (t === months - 1) break;
      const steps = stepsOfMonth[t];
      for (let s = 0; s < steps; s++) {
        stepTangent(at, 1 / steps);
        at += TAPE_WIDTH;
      }
    }
    return true;
  };

  return { grid, logLevel1, logLevel2, run, pullBack, fillSensitivities };
}

/** A firm's scaled level may be 0 only before its entry; NaN and overflow fail. */
function isUsable(level: number, hasEntered: boolean): boolean {
  return hasEntered ? level > 0 && level < Infinity : level === 0;
}

/**
 * Steps for one month from the fastest local rate of either firm (its own growth and the diagonal of the Jacobian);
 * 0 when that is too fast or not a number.
 */
function countSteps(r1: number, r2: number, alpha: number, beta: number, x: number, y: number): number {
  const rate1 = r1 * Math.max(1, 2 * x + alpha * y - 1);
  const rate2 = r2 * Math.max(1, 2 * y + beta * x - 1);
  const steps = Math.ceil(Math.max(rate1, rate2) / MAX_RATE_STEP);
  return steps <= MAX_STEPS_PER_MONTH ? Math.max(steps, 1) : 0;
}

function grow(tape: Float64Array, needed: number): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(2 * needed);
  larger.set(tape);
  return larger;
}

/** At its entry a firm's level depends on its own start alone. */
function enter(tangent: Float64Array, row: number, level: number): void {
  for (let column = 0; column < SCALED_COLUMNS; column++) tangent[2 * column + row] = 0;
  tangent[2 * (4 + row) + row] = level;
}

/** d ln N / d theta from the scaled tangents: ln N_i = ln K_i + ln x_i and ln x_i(start) = ln N_i(start) - ln K_i. */
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
