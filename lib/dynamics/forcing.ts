/**
 * Pushes as a function of time, ready for the integrator.
 *
 * Strength of one push, from start s, length L, ramp R, carry-over half-life H, size u_max (t in months after the last observed one):
 *
 *   0                                     t < s
 *   u_max (t - s)/R                       s <= t < s + R            (a step when R = 0)
 *   u_max                                 s + R <= t < s + L        (for ever when L is null)
 *   u_end 2^-((t - s - L)/H)              t >= s + L                (0 at once when H = 0; u_end = strength reached, R may exceed L)
 *
 * What the pushes together do to the crowding form dN_i/dt = N_i (r_i - b_ii N_i - b_ij N_j), with products and sum over pushes:
 *
 *   growth lift  r_i times prod(1 + u)        room      b_ii divided by prod(1 + u)
 *   pull         b_ji times prod(1 + u)       recruits  + sum(u) users per month
 *
 * The strength jumps and bends only at the breakpoints; between two of them every push has one smooth form
 * (base + slope dt) exp(-rate dt), so an integrator that stops at each breakpoint never steps across a jump.
 */
import { C } from './dormand-prince-tableau';
import type { Push } from './push';

/**
 * Indices into a row of effects, firm 1 first: add 1 for firm 2. Factors on r_i, b_ii (room: 1/prod(1 + u)) and b_ji, then users per
 * month; factors are 1 and recruits 0 where nothing is pushed.
 */
export const GROWTH = 0;
export const ROOM = 2;
export const PULL = 4;
export const RECRUITS = 6;
export const EFFECT_COUNT = 8;

const EFFECT_OF_KIND = { 'growth-lift': GROWTH, room: ROOM, pull: PULL, recruits: RECRUITS } as const;

/** Segments the table has room for at first; it doubles when full. */
const FIRST_CAPACITY = 64;

/** Stage times of the integrator's step, as shares of it, at which the effects over a whole segment are tabled. */
export const STAGE_SHARES = Float64Array.of(0, C[1], C[2], C[3], C[4], 1);

/**
 * Time is cut into segments that end at every whole month and every breakpoint. The table holds the effects at the stage times of a step
 * over the whole segment, which is what nearly every step is: hundreds of draws share them.
 */
export class Forcing {
  /** Months covered by the table so far. */
  months = 0;
  /** Segments in the table. */
  segments = 0;
  /** First segment of each month; one entry more than months. */
  firstSegment = new Int32Array(FIRST_CAPACITY + 1);
  /** End of each segment, in months; segment s starts at ends[s - 1], the first at 0. */
  ends = new Float64Array(FIRST_CAPACITY);
  /** 1 when nothing changes inside the segment. */
  isSteady = new Uint8Array(FIRST_CAPACITY);
  /** Effects of segment s at stage i: EFFECT_COUNT numbers from (s * STAGE_SHARES.length + i) * EFFECT_COUNT. */
  stageEffects = new Float64Array(FIRST_CAPACITY * STAGE_SHARES.length * EFFECT_COUNT);

  private readonly breakpoints: Float64Array;
  private readonly effectIndex: Int32Array;
  /** The smooth form of each push in the segment being looked at. */
  private readonly base: Float64Array;
  private readonly slope: Float64Array;
  private readonly rate: Float64Array;
  private formStart = 0;

  constructor(private readonly pushes: readonly Push[]) {
    this.breakpoints = Float64Array.from(new Set(pushes.flatMap(listBreakpoints))).sort();
    this.effectIndex = Int32Array.from(pushes, (push) => EFFECT_OF_KIND[push.kind] + push.firm - 1);
    this.base = new Float64Array(pushes.length);
    this.slope = new Float64Array(pushes.length);
    this.rate = new Float64Array(pushes.length);
  }

  startOf(segment: number): number {
    return segment === 0 ? 0 : this.ends[segment - 1];
  }

  /** Extends the table to months 0 .. months. */
  cover(months: number): void {
    for (; this.months < months; this.months++) {
      let from = this.months;
      for (const breakpoint of this.breakpoints) {
        if (breakpoint <= from || breakpoint >= this.months + 1) continue;
        this.addSegment(from, breakpoint);
        from = breakpoint;
      }
      this.addSegment(from, this.months + 1);
      this.firstSegment = withRoom(this.firstSegment, this.months + 2);
      this.firstSegment[this.months + 1] = this.segments;
    }
  }

  /** Writes the effects at the stage times of a step from t of length h inside a segment, one row after the other. */
  fillStageEffects(segment: number, t: number, h: number, out: Float64Array): void {
    this.setForms(this.startOf(segment), this.ends[segment]);
    for (let stage = 0; stage < STAGE_SHARES.length; stage++) {
      this.writeEffects(t + STAGE_SHARES[stage] * h, out, stage * EFFECT_COUNT);
    }
  }

  private addSegment(from: number, to: number): void {
    const segment = this.segments++;
    const width = STAGE_SHARES.length * EFFECT_COUNT;
    this.ends = withRoom(this.ends, this.segments);
    this.isSteady = withRoom(this.isSteady, this.segments);
    this.stageEffects = withRoom(this.stageEffects, this.segments * width);
    this.ends[segment] = to;
    this.setForms(from, to);
    this.isSteady[segment] = this.slope.some((v) => v !== 0) || this.rate.some((v) => v !== 0) ? 0 : 1;
    for (let stage = 0; stage < STAGE_SHARES.length; stage++) {
      const t = from + STAGE_SHARES[stage] * (to - from);
      this.writeEffects(t, this.stageEffects, segment * width + stage * EFFECT_COUNT);
    }
  }

  private writeEffects(t: number, out: Float64Array, offset: number): void {
    for (let at = 0; at < EFFECT_COUNT; at++) out[offset + at] = at < RECRUITS ? 1 : 0;
    const elapsed = t - this.formStart;
    for (let i = 0; i < this.pushes.length; i++) {
      const strength = (this.base[i] + this.slope[i] * elapsed) * Math.exp(-this.rate[i] * elapsed);
      const at = this.effectIndex[i];
      if (at >= RECRUITS) out[offset + at] += strength;
      else if (at >= ROOM && at < PULL) out[offset + at] /= 1 + strength;
      else out[offset + at] *= 1 + strength;
    }
  }

  /** The form of every push in [from, to], which holds no breakpoint inside: its middle tells which. */
  private setForms(from: number, to: number): void {
    this.formStart = from;
    for (let i = 0; i < this.pushes.length; i++) {
      const push = this.pushes[i];
      const middle = (from + to) / 2 - push.startMonth;
      const elapsed = from - push.startMonth;
      this.base[i] = 0;
      this.slope[i] = 0;
      this.rate[i] = 0;
      if (middle < 0) continue;
      if (push.lengthMonths !== null && middle >= push.lengthMonths) {
        this.setFadingForm(i, elapsed - push.lengthMonths);
      } else if (middle < push.rampMonths) {
        this.base[i] = (push.size * elapsed) / push.rampMonths;
        this.slope[i] = push.size / push.rampMonths;
      } else {
        this.base[i] = push.size;
      }
    }
  }

  private setFadingForm(i: number, sinceEnd: number): void {
    const { carryOverHalfLifeMonths: halfLife } = this.pushes[i];
    if (halfLife === 0) return;
    this.rate[i] = Math.LN2 / halfLife;
    this.base[i] = strengthAtEnd(this.pushes[i]) * Math.exp(-this.rate[i] * sinceEnd);
  }
}

/**
 * The forcing of a set of pushes. A push of size 0 changes nothing and is left out, so that the path is the unforced one to the last digit.
 * @throws RangeError when a push has a negative or non-finite number
 */
export function createForcing(pushes: readonly Push[]): Forcing {
  for (const push of pushes) assertPush(push);
  return new Forcing(pushes.filter((push) => push.size > 0));
}

/** Strength of one push at time t, months after the last observed one; on a jump the value after it. */
export function pushStrength(push: Push, t: number): number {
  const elapsed = t - push.startMonth;
  if (!(elapsed >= 0)) return 0;
  if (push.lengthMonths === null || elapsed < push.lengthMonths) return rampStrength(push, elapsed);
  if (push.carryOverHalfLifeMonths === 0) return 0;
  return strengthAtEnd(push) * 2 ** ((push.lengthMonths - elapsed) / push.carryOverHalfLifeMonths);
}

/** Throws a RangeError naming the first number of a push that is out of its range. */
export function assertPush(push: Push): void {
  const numbers = {
    size: push.size,
    rampMonths: push.rampMonths,
    carryOverHalfLifeMonths: push.carryOverHalfLifeMonths,
    lengthMonths: push.lengthMonths ?? 0,
  };
  for (const [name, value] of Object.entries(numbers)) {
    if (!(value >= 0 && value < Number.POSITIVE_INFINITY)) {
      throw new RangeError(`push.${name} must be finite and not negative, got ${value}`);
    }
  }
  if (!Number.isFinite(push.startMonth)) {
    throw new RangeError(`push.startMonth must be finite, got ${push.startMonth}`);
  }
}

function rampStrength(push: Push, elapsed: number): number {
  return elapsed < push.rampMonths ? (push.size * elapsed) / push.rampMonths : push.size;
}

/** Strength reached when the push ends: less than its size when the ramp is longer than the push. */
function strengthAtEnd(push: Push): number {
  return rampStrength(push, push.lengthMonths ?? Number.POSITIVE_INFINITY);
}

function listBreakpoints(push: Push): number[] {
  const end = push.lengthMonths === null ? Number.POSITIVE_INFINITY : push.startMonth + push.lengthMonths;
  const rampEnd = push.startMonth + push.rampMonths;
  return [push.startMonth, rampEnd, end].filter((t) => t <= end && t < Number.POSITIVE_INFINITY);
}

/** The array itself, or a copy twice as long when it has no room for `count` entries. */
function withRoom<T extends Int32Array | Uint8Array | Float64Array>(array: T, count: number): T {
  if (count <= array.length) return array;
  const longer = new (array.constructor as new (length: number) => T)(Math.max(count, 2 * array.length));
  longer.set(array);
  return longer;
}
