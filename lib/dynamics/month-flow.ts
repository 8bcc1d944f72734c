/**
 * One month of the competitive growth system as a map with exact derivatives: the innermost loop of every fit.
 *
 * Scaled state x = N1/K1, y = N2/K2 (K leaves the right-hand side):
 *   x' = r1 x (1 - x - alpha y),   y' = r2 y (1 - y - beta x)              (Murray, Mathematical Biology I, 3.5)
 * Classical Runge-Kutta of order 4 (Kutta 1901); each month is cut into as many equal steps as its fastest rate asks for
 * (`countSteps`). The stage states go on a tape, so that derivatives are those of the discrete map itself:
 *   forward  S' = J S + df/dp, variational equations                                 (pushForward)
 *   reverse  lambda' = -J^T lambda along the stored stages (Griewank & Walther 2008)  (pullBack)
 * Time unit: month. Nothing is allocated after creation but a longer tape when a path needs one.
 */

/**
 * Largest (rate x step): RATE_STEP (1 + rate), at most LARGEST_RATE_STEP. At the rates of markets, below 0.3 a month, a step errs by
 * (0.2)^5 / 120 = 3e-6 of the level or less. A rate above 1 runs its course within a month or two and leaves the firm on a slow path, which
 * longer steps follow as well; up to 2.8 they stay stable.
 */
const RATE_STEP = 0.17;
const LARGEST_RATE_STEP = 0.8;

/** A rate above 16 per month is none that a monthly count can show: the path is refused. */
export const MAX_STEPS_PER_MONTH = 20;

/** Steps per month the tape has room for at first. */
const FIRST_TAPE_STEPS = 4;

/** Doubles per taped step: the four stage states (x, y). */
const TAPE_WIDTH = 8;

/** Columns of the tangent: ln r1, ln r2, ln alpha, ln beta, then two directions of the start. */
export const TANGENT_COLUMNS = 6;
const FORCED_COLUMNS = 4;

export interface MonthFlow {
  /** The state (x, y) that `advance` moves. */
  readonly state: Float64Array;
  /** Column c of the tangent: d x at [2 c], d y at [2 c + 1]. Columns in the order of TANGENT_COLUMNS. */
  readonly tangent: Float64Array;
  /** The adjoint (lambda_x, lambda_y) that `pullBack` moves. */
  readonly adjoint: Float64Array;
  /** Sums of the adjoint with d f / d ln r1, ln r2, ln alpha, ln beta; cleared by `clearGradient`. */
  readonly gradient: Float64Array;
  /** Steps taken since creation: the measure of work. */
  readonly steps: number;
  setParameters(r1: number, r2: number, alpha: number, beta: number): void;
  /** Moves `state` on by month `slot`, the months of a path being taped in ascending order. @returns false when too fast or not finite */
  advance(slot: number): boolean;
  /** Moves `tangent` through month `slot` as taped. */
  pushForward(slot: number): void;
  /** The same, filling `out` at `at` with the derivative of the state after the month by the state before, row-major (2 x 2). */
  advanceWithPropagator(slot: number, out: Float64Array, at: number): boolean;
  /** Moves `adjoint` back through month `slot` as taped, adding to `gradient`. */
  pullBack(slot: number): void;
  clearGradient(): void;
}

/** @param slots months that a path may have */
export function createMonthFlow(slots: number): MonthFlow {
  const state = new Float64Array(2);
  const tangent = new Float64Array(2 * TANGENT_COLUMNS);
  const adjoint = new Float64Array(2);
  const gradient = new Float64Array(4);
  const stages = new Float64Array(4 * 8);
  const stepsOf = new Int32Array(slots);
  const tapeStart = new Int32Array(slots + 1);
  let tape = new Float64Array(slots * FIRST_TAPE_STEPS * TAPE_WIDTH);
  let stepsTaken = 0;
  let r1 = 0;
  let r2 = 0;
  let alpha = 0;
  let beta = 0;

  const advance = (slot: number): boolean => {
    let x = state[0];
    let y = state[1];
    const steps = countSteps(r1, r2, alpha, beta, x, y);
    if (steps === 0) return false;
    let at = tapeStart[slot];
    const end = at + steps * TAPE_WIDTH;
    stepsTaken += steps;
    stepsOf[slot] = steps;
    tapeStart[slot + 1] = end;
    if (tape.length < end) tape = lengthen(tape, end);
    const h = 1 / steps;
    const half = 0.5 * h;
    const sixth = h / 6;
    for (; at < end; at += TAPE_WIDTH) {
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
      x += sixth * (ax + 2 * (bx + cx) + dx);
      y += sixth * (ay + 2 * (by + cy) + dy);
    }
    state[0] = x;
    state[1] = y;
    return x < Number.POSITIVE_INFINITY && y < Number.POSITIVE_INFINITY;
  };

  const pullBack = (slot: number): void => {
    const h = 1 / stepsOf[slot];
    const half = 0.5 * h;
    const sixth = h / 6;
    const third = h / 3;
    const r1Alpha = r1 * alpha;
    const r2Beta = r2 * beta;
    let lx = adjoint[0];
    let ly = adjoint[1];
    let sumR1 = 0;
    let sumR2 = 0;
    let sumAlpha = 0;
    let sumBeta = 0;
    for (let at = tapeStart[slot + 1] - TAPE_WIDTH; at >= tapeStart[slot]; at -= TAPE_WIDTH) {
      // stages 4 to 1, written out: a loop with its choice of weights takes half as long again
      let nextX = lx;
      let nextY = ly;
      let kx = sixth * lx;
      let ky = sixth * ly;
      let x = tape[at + 6];
      let y = tape[at + 7];
      let roomX = 1 - x - alpha * y;
      let roomY = 1 - y - beta * x;
      let kxx = kx * x;
      let kyy = ky * y;
      sumR1 += kxx * roomX;
      sumR2 += kyy * roomY;
      sumAlpha -= kxx * y;
      sumBeta -= kyy * x;
      let vx = kx * r1 * (roomX - x) - r2Beta * kyy;
      let vy = ky * r2 * (roomY - y) - r1Alpha * kxx;
      nextX += vx;
      nextY += vy;
      kx = third * lx + h * vx;
      ky = third * ly + h * vy;
      x = tape[at + 4];
      y = tape[at + 5];
      roomX = 1 - x - alpha * y;
      roomY = 1 - y - beta * x;
      kxx = kx * x;
      kyy = ky * y;
      sumR1 += kxx * roomX;
      sumR2 += kyy * roomY;
      sumAlpha -= kxx * y;
      sumBeta -= kyy * x;
      vx = kx * r1 * (roomX - x) - r2Beta * kyy;
      vy = ky * r2 * (roomY - y) - r1Alpha * kxx;
      nextX += vx;
      nextY += vy;
      kx = third * lx + half * vx;
      ky = third * ly + half * vy;
      x = tape[at + 2];
      y = tape[at + 3];
      roomX = 1 - x - alpha * y;
      roomY = 1 - y - beta * x;
      kxx = kx * x;
      kyy = ky * y;
      sumR1 += kxx * roomX;
      sumR2 += kyy * roomY;
      sumAlpha -= kxx * y;
      sumBeta -= kyy * x;
      vx = kx * r1 * (roomX - x) - r2Beta * kyy;
      vy = ky * r2 * (roomY - y) - r1Alpha * kxx;
      nextX += vx;
      nextY += vy;
      kx = sixth * lx + half * vx;
      ky = sixth * ly + half * vy;
      x = tape[at + 0];
      y = tape[at + 1];
      roomX = 1 - x - alpha * y;
      roomY = 1 - y - beta * x;
      kxx = kx * x;
      kyy = ky * y;
      sumR1 += kxx * roomX;
      sumR2 += kyy * roomY;
      sumAlpha -= kxx * y;
      sumBeta -= kyy * x;
      vx = kx * r1 * (roomX - x) - r2Beta * kyy;
      vy = ky * r2 * (roomY - y) - r1Alpha * kxx;
      nextX += vx;
      nextY += vy;
      lx = nextX;
      ly = nextY;
    }
    adjoint[0] = lx;
    adjoint[1] = ly;
    gradient[0] += sumR1 * r1;
    gradient[1] += sumR2 * r2;
    gradient[2] += sumAlpha * r1Alpha;
    gradient[3] += sumBeta * r2Beta;
  };

  /** Per stage: the Jacobian by rows, then d f / d ln r1, ln r2, ln alpha, ln beta (each in one equation only). */
  const fillStages = (at: number): void => {
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
  };

  const stepColumn = (column: number, h: number): void => {
    const half = 0.5 * h;
    const sixth = h / 6;
    const sx = tangent[2 * column];
    const sy = tangent[2 * column + 1];
    const slot = 4 + column;
    const onX = column < FORCED_COLUMNS && (column & 1) === 0;
    const onY = column < FORCED_COLUMNS && (column & 1) === 1;
    const ax = stages[0] * sx + stages[1] * sy + (onX ? stages[slot] : 0);
    const ay = stages[2] * sx + stages[3] * sy + (onY ? stages[slot] : 0);
    const sx2 = sx + half * ax;
    const sy2 = sy + half * ay;
    const bx = stages[8] * sx2 + stages[9] * sy2 + (onX ? stages[8 + slot] : 0);
    const by = stages[10] * sx2 + stages[11] * sy2 + (onY ? stages[8 + slot] : 0);
    const sx3 = sx + half * bx;
    const sy3 = sy + half * by;
    const cx = stages[16] * sx3 + stages[17] * sy3 + (onX ? stages[16 + slot] : 0);
    const cy = stages[18] * sx3 + stages[19] * sy3 + (onY ? stages[16 + slot] : 0);
    const sx4 = sx + h * cx;
    const sy4 = sy + h * cy;
    const dx = stages[24] * sx4 + stages[25] * sy4 + (onX ? stages[24 + slot] : 0);
    const dy = stages[26] * sx4 + stages[27] * sy4 + (onY ? stages[24 + slot] : 0);
    tangent[2 * column] = sx + sixth * (ax + 2 * (bx + cx) + dx);
    tangent[2 * column + 1] = sy + sixth * (ay + 2 * (by + cy) + dy);
  };

  /** `advance` with the derivative of each step: P = I + (h/6) (K1 + 2 K2 + 2 K3 + K4), K1 = J1, K2 = J2 (I + h/2 K1), and so on. */
  const advanceWithPropagator = (slot: number, out: Float64Array, to: number): boolean => {
    if (!advance(slot)) return false;
    const h = 1 / stepsOf[slot];
    const half = 0.5 * h;
    const sixth = h / 6;
    const r1Alpha = r1 * alpha;
    const r2Beta = r2 * beta;
    const end = tapeStart[slot + 1];
    let p11 = 1;
    let p12 = 0;
    let p21 = 0;
    let p22 = 1;
    for (let at = tapeStart[slot]; at < end; at += TAPE_WIDTH) {
      let x = tape[at];
      let y = tape[at + 1];
      const a11 = r1 * (1 - 2 * x) - r1Alpha * y;
      const a12 = -r1Alpha * x;
      const a21 = -r2Beta * y;
      const a22 = r2 * (1 - 2 * y) - r2Beta * x;
      x = tape[at + 2];
      y = tape[at + 3];
      let j11 = r1 * (1 - 2 * x) - r1Alpha * y;
      let j12 = -r1Alpha * x;
      let j21 = -r2Beta * y;
      let j22 = r2 * (1 - 2 * y) - r2Beta * x;
      const b11 = j11 + half * (j11 * a11 + j12 * a21);
      const b12 = j12 + half * (j11 * a12 + j12 * a22);
      const b21 = j21 + half * (j21 * a11 + j22 * a21);
      const b22 = j22 + half * (j21 * a12 + j22 * a22);
      x = tape[at + 4];
      y = tape[at + 5];
      j11 = r1 * (1 - 2 * x) - r1Alpha * y;
      j12 = -r1Alpha * x;
      j21 = -r2Beta * y;
      j22 = r2 * (1 - 2 * y) - r2Beta * x;
      const c11 = j11 + half * (j11 * b11 + j12 * b21);
      const c12 = j12 + half * (j11 * b12 + j12 * b22);
      const c21 = j21 + half * (j21 * b11 + j22 * b21);
      const c22 = j22 + half * (j21 * b12 + j22 * b22);
      x = tape[at + 6];
      y = tape[at + 7];
      j11 = r1 * (1 - 2 * x) - r1Alpha * y;
      j12 = -r1Alpha * x;
      j21 = -r2Beta * y;
      j22 = r2 * (1 - 2 * y) - r2Beta * x;
      const s11 = 1 + sixth * (a11 + 2 * (b11 + c11) + j11 + h * (j11 * c11 + j12 * c21));
      const s12 = sixth * (a12 + 2 * (b12 + c12) + j12 + h * (j11 * c12 + j12 * c22));
      const s21 = sixth * (a21 + 2 * (b21 + c21) + j21 + h * (j21 * c11 + j22 * c21));
      const s22 = 1 + sixth * (a22 + 2 * (b22 + c22) + j22 + h * (j21 * c12 + j22 * c22));
      const before11 = p11;
      const before12 = p12;
      p11 = s11 * before11 + s12 * p21;
      p12 = s11 * before12 + s12 * p22;
      p21 = s21 * before11 + s22 * p21;
      p22 = s21 * before12 + s22 * p22;
    }
    out[to] = p11;
    out[to + 1] = p12;
    out[to + 2] = p21;
    out[to + 3] = p22;
    return true;
  };

  const pushForward = (slot: number): void => {
    const h = 1 / stepsOf[slot];
    for (let at = tapeStart[slot]; at < tapeStart[slot + 1]; at += TAPE_WIDTH) {
      fillStages(at);
      for (let column = 0; column < TANGENT_COLUMNS; column++) stepColumn(column, h);
    }
  };

  return {
    state,
    tangent,
    adjoint,
    gradient,
    get steps() {
      return stepsTaken;
    },
    setParameters(growth1, growth2, onFirst, onSecond) {
      r1 = growth1;
      r2 = growth2;
      alpha = onFirst;
      beta = onSecond;
    },
    advance,
    pushForward,
    advanceWithPropagator,
    pullBack,
    clearGradient() {
      gradient.fill(0);
    },
  };
}

/**
 * Steps for one month from the fastest local rate of either firm (its own growth and the diagonal of the Jacobian);
 * 0 when that is too fast or not a number.
 */
function countSteps(r1: number, r2: number, alpha: number, beta: number, x: number, y: number): number {
  const rate1 = r1 * Math.max(1, 2 * x + alpha * y - 1);
  const rate2 = r2 * Math.max(1, 2 * y + beta * x - 1);
  const rate = Math.max(rate1, rate2);
  const steps = Math.ceil(rate / Math.min(RATE_STEP * (1 + rate), LARGEST_RATE_STEP));
  return steps <= MAX_STEPS_PER_MONTH ? Math.max(steps, 1) : 0;
}

function lengthen(tape: Float64Array<ArrayBuffer>, needed: number): Float64Array<ArrayBuffer> {
  const longer = new Float64Array(2 * needed);
  longer.set(tape);
  return longer;
}
