/**
 * Monthly path of a market under pushes, fast enough to run on hundreds of draws while a slider moves.
 *
 *   dN1/dt = N1 (r1 G1 - b11/R1 N1 - b12 P2 N2) + S1      G growth lift, R room, P pull (factors), S recruits (users per month)
 *   dN2/dt = N2 (r2 G2 - b22/R2 N2 - b21 P1 N1) + S2
 *
 * Dormand & Prince 5(4) (`dormand-prince-tableau.ts`), written out for two firms: each step is checked by its embedded error estimate,
 * and steps end at every month and at every breakpoint of the forcing. Users, not their logarithms, are integrated: the right-hand
 * side is a polynomial. Nothing is allocated after construction.
 */
import { A, ERROR, STAGES } from './dormand-prince-tableau';
import { EFFECT_COUNT, type Forcing, GROWTH, PULL, RECRUITS, ROOM, STAGE_SHARES } from './forcing';
import { type CompetitionSystem, type State, toCrowdingForm } from './system';

export type ForcedStatus = 'complete' | 'not-finite' | 'too-many-steps';

/** Error allowed in one step as a share of the level, far below what a chart or a score can show; the share of K only guards a firm at 0. */
export const FORCED_RELATIVE_TOLERANCE = 1e-7;
const FORCED_ABSOLUTE_SHARE = 1e-16;
/** Steps in one segment of at most a month before the path is given up: parameters far outside anything a market shows. */
const MAX_STEPS_PER_SEGMENT = 5_000;
/** Coefficients in force at one stage. */
const WIDTH = 8;
const SAFETY = 0.9;
const MIN_FACTOR = 0.2;
const MAX_FACTOR = 4;

const row = (stage: number) => A.subarray(stage * STAGES, (stage + 1) * STAGES);
const [A21] = row(1);
const [A31, A32] = row(2);
const [A41, A42, A43] = row(3);
const [A51, A52, A53, A54] = row(4);
const [A61, A62, A63, A64, A65] = row(5);
const [B1, , B3, B4, B5, B6] = row(6);
const [E1, , E3, E4, E5, E6, E7] = ERROR;

/**
 * Fills `out` with the states of months 0 to `months`: out[2 m] and out[2 m + 1] are the users of firm 1 and firm 2 in month m, month 0
 * being `start`. Months after a failure hold NaN.
 * @throws RangeError when `out` is shorter than 2 (months + 1)
 */
export function fillForcedTrajectory(
  system: CompetitionSystem,
  start: State,
  forcing: Forcing,
  months: number,
  out: Float64Array,
): ForcedStatus {
  if (!(out.length >= 2 * (months + 1))) {
    throw new RangeError(`fillForcedTrajectory: out needs ${2 * (months + 1)} entries, got ${out.length}`);
  }
  const integrator = new ForcedIntegrator(system, start, forcing);
  out[0] = start[0];
  out[1] = start[1];
  for (let month = 1; month <= months; month++) {
    const status = integrator.advanceFrom(month - 1);
    if (status !== 'complete') {
      out.fill(Number.NaN, 2 * month, 2 * (months + 1));
      return status;
    }
    out[2 * month] = integrator.users1;
    out[2 * month + 1] = integrator.users2;
  }
  return 'complete';
}

/** A path that can be moved on month by month, and whose state may be changed in between (shocks). */
export class ForcedIntegrator {
  users1: number;
  users2: number;
  private readonly r1: number;
  private readonly r2: number;
  private readonly b11: number;
  private readonly b12: number;
  private readonly b21: number;
  private readonly b22: number;
  private readonly absolute1: number;
  private readonly absolute2: number;
  /** Length of the next step, months. */
  private h = 1;
  /** Result of the last trial step. */
  private readonly next = new Float64Array(2);
  /** rate1, own1, taken1, recruits1, rate2, own2, taken2, recruits2 in force at each stage. */
  private readonly coefficients = new Float64Array(STAGE_SHARES.length * WIDTH);
  /** Effects at the stages of a step that is not a whole segment. */
  private readonly ownEffects = new Float64Array(STAGE_SHARES.length * EFFECT_COUNT);

  constructor(
    system: CompetitionSystem,
    start: State,
    private readonly forcing: Forcing,
  ) {
    const { b11, b12, b21, b22 } = toCrowdingForm(system);
    this.users1 = start[0];
    this.users2 = start[1];
    this.r1 = system.r1;
    this.r2 = system.r2;
    this.b11 = b11;
    this.b12 = b12;
    this.b21 = b21;
    this.b22 = b22;
    this.absolute1 = FORCED_ABSOLUTE_SHARE * system.k1;
    this.absolute2 = FORCED_ABSOLUTE_SHARE * system.k2;
  }

  /** Moves from a whole month (0, 1, ...) to the next. */
  advanceFrom(month: number): ForcedStatus {
    const { forcing } = this;
    if (month >= forcing.months) forcing.cover(month + 1);
    const end = forcing.firstSegment[month + 1];
    for (let segment = forcing.firstSegment[month]; segment < end; segment++) {
      const status = this.crossSegment(segment);
      if (status !== 'complete') return status;
    }
    return 'complete';
  }

  private crossSegment(segment: number): ForcedStatus {
    const from = this.forcing.startOf(segment);
    const to = this.forcing.ends[segment];
    let t = from;
    for (let step = 0; step < MAX_STEPS_PER_SEGMENT; step++) {
      const left = to - t;
      const isLast = this.h >= left;
      const h = isLast ? left : this.h;
      const error = this.tryStep(segment, t, h, t === from && isLast);
      if (error <= 1) {
        this.users1 = this.next[0];
        this.users2 = this.next[1];
        if (isLast) return 'complete';
        t += h;
        this.h = h * scaleFactor(error);
      } else {
        // NaN comes here as well and takes the strongest cut.
        this.h = h * (error < Number.POSITIVE_INFINITY ? scaleFactor(error) : MIN_FACTOR);
        if (!(this.h > Number.EPSILON * Math.max(1, t))) return 'not-finite';
      }
    }
    return 'too-many-steps';
  }

  /** One trial step from t of length h; only a step over the whole segment finds its effects in the shared table. */
  private tryStep(segment: number, t: number, h: number, isWhole: boolean): number {
    const { forcing } = this;
    const first = segment * STAGE_SHARES.length * EFFECT_COUNT;
    if (forcing.isSteady[segment] === 1) {
      this.setCoefficients(forcing.stageEffects, first, 1);
      return this.computeStep(h, 0);
    }
    if (isWhole) {
      this.setCoefficients(forcing.stageEffects, first, STAGE_SHARES.length);
    } else {
      forcing.fillStageEffects(segment, t, h, this.ownEffects);
      this.setCoefficients(this.ownEffects, 0, STAGE_SHARES.length);
    }
    return this.computeStep(h, WIDTH);
  }

  /** Rows of coefficients from rows of effects. */
  private setCoefficients(effects: Float64Array, first: number, rows: number): void {
    const { coefficients: c, r1, r2, b11, b12, b21, b22 } = this;
    for (let stage = 0; stage < rows; stage++) {
      const at = stage * WIDTH;
      const from = first + stage * EFFECT_COUNT;
      c[at] = r1 * effects[from + GROWTH];
      c[at + 1] = b11 * effects[from + ROOM];
      c[at + 2] = b12 * effects[from + PULL + 1];
      c[at + 3] = effects[from + RECRUITS];
      c[at + 4] = r2 * effects[from + GROWTH + 1];
      c[at + 5] = b22 * effects[from + ROOM + 1];
      c[at + 6] = b21 * effects[from + PULL];
      c[at + 7] = effects[from + RECRUITS + 1];
    }
  }

  /**
   * The stages of the pair from the current state, the coefficients of stage i in row i (or all in row 0 when `stride` is 0); fills
   * `next` and returns the scaled error. Written out: calls of a growth function here cost more than the arithmetic.
   */
  private computeStep(h: number, stride: number): number {
    const { users1: x, users2: y, coefficients: c } = this;
    let o = 0;
    const k1 = x * (c[o] - c[o + 1] * x - c[o + 2] * y) + c[o + 3];
    const l1 = y * (c[o + 4] - c[o + 5] * y - c[o + 6] * x) + c[o + 7];

    o += stride;
    let u = x + h * A21 * k1;
    let v = y + h * A21 * l1;
    const k2 = u * (c[o] - c[o + 1] * u - c[o + 2] * v) + c[o + 3];
    const l2 = v * (c[o + 4] - c[o + 5] * v - c[o + 6] * u) + c[o + 7];

    o += stride;
    u = x + h * (A31 * k1 + A32 * k2);
    v = y + h * (A31 * l1 + A32 * l2);
    const k3 = u * (c[o] - c[o + 1] * u - c[o + 2] * v) + c[o + 3];
    const l3 = v * (c[o + 4] - c[o + 5] * v - c[o + 6] * u) + c[o + 7];

    o += stride;
    u = x + h * (A41 * k1 + A42 * k2 + A43 * k3);
    v = y + h * (A41 * l1 + A42 * l2 + A43 * l3);
    const k4 = u * (c[o] - c[o + 1] * u - c[o + 2] * v) + c[o + 3];
    const l4 = v * (c[o + 4] - c[o + 5] * v - c[o + 6] * u) + c[o + 7];

    o += stride;
    u = x + h * (A51 * k1 + A52 * k2 + A53 * k3 + A54 * k4);
    v = y + h * (A51 * l1 + A52 * l2 + A53 * l3 + A54 * l4);
    const k5 = u * (c[o] - c[o + 1] * u - c[o + 2] * v) + c[o + 3];
    const l5 = v * (c[o + 4] - c[o + 5] * v - c[o + 6] * u) + c[o + 7];

    o += stride;
    u = x + h * (A61 * k1 + A62 * k2 + A63 * k3 + A64 * k4 + A65 * k5);
    v = y + h * (A61 * l1 + A62 * l2 + A63 * l3 + A64 * l4 + A65 * l5);
    const k6 = u * (c[o] - c[o + 1] * u - c[o + 2] * v) + c[o + 3];
    const l6 = v * (c[o + 4] - c[o + 5] * v - c[o + 6] * u) + c[o + 7];

    u = x + h * (B1 * k1 + B3 * k3 + B4 * k4 + B5 * k5 + B6 * k6);
    v = y + h * (B1 * l1 + B3 * l3 + B4 * l4 + B5 * l5 + B6 * l6);
    this.next[0] = u;
    this.next[1] = v;
    const k7 = u * (c[o] - c[o + 1] * u - c[o + 2] * v) + c[o + 3];
    const l7 = v * (c[o + 4] - c[o + 5] * v - c[o + 6] * u) + c[o + 7];
    const error1 = h * (E1 * k1 + E3 * k3 + E4 * k4 + E5 * k5 + E6 * k6 + E7 * k7);
    const error2 = h * (E1 * l1 + E3 * l3 + E4 * l4 + E5 * l5 + E6 * l6 + E7 * l7);
    return Math.max(
      Math.abs(error1) / (this.absolute1 + FORCED_RELATIVE_TOLERANCE * Math.max(x, u)),
      Math.abs(error2) / (this.absolute2 + FORCED_RELATIVE_TOLERANCE * Math.max(y, v)),
    );
  }
}

function scaleFactor(error: number): number {
  return Math.min(MAX_FACTOR, Math.max(MIN_FACTOR, SAFETY * error ** -0.2));
}
