/**
 * Adaptive integration of y' = f(t, y): Dormand & Prince 5(4) with local extrapolation, dense output of order 4, and a step size
 * controller with memory (Hairer, Norsett & Wanner, Solving Ordinary Differential Equations I, sections II.4 to II.6).
 *
 *   error of a step = max_i |e_i| / (absolute_i + relative max(|y_i|, |y1_i|)), accepted when <= 1
 *   h_new = h clamp(0.9 error^-(1/5 - 0.03) error_before^0.04, 0.2, 10)
 *
 * How it went is a returned status, never an exception; a non-finite trial shrinks the step. Runs backwards when tEnd < t0. Nothing is
 * allocated in the loop: the buffers of the dense output double when full.
 */
import { DensePath } from './dense-path';
import { A, C, ERROR, STAGES } from './dormand-prince-tableau';

/** Fills `out` with dy/dt. */
export type RightHandSide = (t: number, y: Float64Array, out: Float64Array) => void;

export interface IntegrateOptions {
  relativeTolerance: number;
  /** Same unit as y; one number for all components, or one for each. */
  absoluteTolerance: number | ArrayLike<number>;
  maxSteps: number;
  /** Length of the first trial step; null lets the slope at the start decide. */
  firstStep: number | null;
  /** Keep what `evaluateAt` needs. */
  isDense: boolean;
  /** Looked at after every accepted step; true ends the run there. */
  shouldStop: ((t: number, y: Float64Array) => boolean) | null;
}

const DEFAULT_INTEGRATE_OPTIONS: Readonly<IntegrateOptions> = {
  relativeTolerance: 1e-9,
  absoluteTolerance: 1e-12,
  maxSteps: 10_000,
  firstStep: null,
  isDense: false,
  shouldStop: null,
};

type IntegrationStatus =
  | 'reached-end'
  | 'stopped' // shouldStop said so
  | 'too-many-steps'
  | 'step-too-small' // the error does not fall any more: a singularity, or a tolerance below rounding
  | 'not-finite'; // the right-hand side has no finite value at the start

export interface Integration {
  status: IntegrationStatus;
  /** Last time reached and the state there. */
  t: number;
  y: Float64Array;
  accepted: number;
  rejected: number;
  /** Calls of the right-hand side. */
  evaluations: number;
  /** The path, when asked for. */
  path: DensePath | null;
}

/** Exponents and limits of the controller: Hairer's defaults for DOPRI5. */
const SAFETY = 0.9;
const MEMORY_EXPONENT = 0.04;
const ERROR_EXPONENT = 0.2 - 0.75 * MEMORY_EXPONENT;
const MIN_FACTOR = 0.2;
const MAX_FACTOR = 10;
/** Factor after a non-finite trial, about which the error estimate says nothing. */
const NON_FINITE_FACTOR = 0.1;
const FIRST_ERROR = 1e-4;

/**
 * Integrates from y0 at t0 to tEnd.
 * @throws RangeError when t0 or tEnd is not finite or a tolerance is not positive
 */
export function integrate(
  rhs: RightHandSide,
  t0: number,
  y0: ArrayLike<number>,
  tEnd: number,
  options: Partial<IntegrateOptions> = {},
): Integration {
  const settings = { ...DEFAULT_INTEGRATE_OPTIONS, ...options };
  checkCall(t0, tEnd, settings);
  const run = new IntegrationRun(rhs, t0, y0, tEnd, settings);
  while (run.status === null) run.step();
  return run.result();
}

function checkCall(t0: number, tEnd: number, settings: IntegrateOptions): void {
  if (!Number.isFinite(t0) || !Number.isFinite(tEnd)) {
    throw new RangeError(`integrate: t0 and tEnd must be finite, got ${t0} and ${tEnd}`);
  }
  if (!(settings.relativeTolerance > 0)) {
    throw new RangeError(`integrate: relativeTolerance must be positive, got ${settings.relativeTolerance}`);
  }
}

class IntegrationRun {
  status: IntegrationStatus | null = null;
  private readonly n: number;
  private readonly y: Float64Array;
  private readonly y1: Float64Array;
  private readonly error: Float64Array;
  /** Stage slopes, one Float64Array each. */
  private readonly k: Float64Array[];
  private readonly absolute: Float64Array;
  private readonly direction: number;
  private readonly path: DensePath | null;
  private t: number;
  private h: number;
  private errorBefore = FIRST_ERROR;
  private wasRejected = false;
  private accepted = 0;
  private rejected = 0;
  private evaluations = 0;

  constructor(
    private readonly rhs: RightHandSide,
    t0: number,
    y0: ArrayLike<number>,
    private readonly tEnd: number,
    private readonly settings: IntegrateOptions,
  ) {
    this.n = y0.length;
    this.t = t0;
    this.y = Float64Array.from(y0);
    this.y1 = new Float64Array(this.n);
    this.error = new Float64Array(this.n);
    this.k = Array.from({ length: STAGES }, () => new Float64Array(this.n));
    this.absolute = spread(settings.absoluteTolerance, this.n);
    this.direction = tEnd >= t0 ? 1 : -1;
    this.path = settings.isDense ? new DensePath(this.n, t0, this.y) : null;
    this.evaluate(t0, this.y, this.k[0]);
    this.h = 0;
    if (!isFiniteVector(this.k[0]) || !isFiniteVector(this.y)) this.status = 'not-finite';
    else if (t0 === tEnd) this.status = 'reached-end';
    else this.h = this.direction * (settings.firstStep ?? this.guessFirstStep());
  }

  /** One trial step. */
  step(): void {
    if (this.accepted + this.rejected >= this.settings.maxSteps) {
      this.status = 'too-many-steps';
      return;
    }
    const left = this.tEnd - this.t;
    const isLast = Math.abs(this.h) * (1 + 1e-12) >= Math.abs(left);
    const h = isLast ? left : this.h;
    if (!(Math.abs(h) > 2 * Number.EPSILON * Math.abs(this.t))) {
      this.status = 'step-too-small';
      return;
    }
    const error = this.trial(h);
    if (error <= 1) this.accept(h, error, isLast);
    else this.reject(h, error);
  }

  result(): Integration {
    return {
      status: this.status!,
      t: this.t,
      y: this.y,
      accepted: this.accepted,
      rejected: this.rejected,
      evaluations: this.evaluations,
      path: this.path,
    };
  }

  /** Computes all stages and y1; returns the scaled error, NaN when the trial is not finite. */
  private trial(h: number): number {
    const { k, y, y1, n, t } = this;
    for (let s = 1; s < STAGES; s++) {
      y1.fill(0);
      for (let j = 0; j < s; j++) addScaled(y1, A[s * STAGES + j], k[j]);
      for (let i = 0; i < n; i++) y1[i] = y[i] + h * y1[i];
      this.evaluate(t + C[s] * h, y1, k[s]);
    }
    return this.scaledError(h);
  }

  private scaledError(h: number): number {
    const { k, y, y1, error, n } = this;
    error.fill(0);
    for (let s = 0; s < STAGES; s++) addScaled(error, ERROR[s], k[s]);
    let largest = 0;
    for (let i = 0; i < n; i++) {
      // A component that is exactly 0 and stays there may have no tolerance at all.
      if (error[i] === 0) continue;
      const scaled = Math.abs(h * error[i]) / this.tolerance(i, Math.max(Math.abs(y[i]), Math.abs(y1[i])));
      if (!(scaled >= 0)) return Number.NaN;
      if (scaled > largest) largest = scaled;
    }
    return largest;
  }

  private accept(h: number, error: number, isLast: boolean): void {
    this.accepted++;
    this.path?.append(this.t, h, this.y, this.y1, this.k);
    this.t = isLast ? this.tEnd : this.t + h;
    this.y.set(this.y1);
    this.k[0].set(this.k[STAGES - 1]);
    const growth = SAFETY * Math.max(error, 1e-10) ** -ERROR_EXPONENT * this.errorBefore ** MEMORY_EXPONENT;
    // Right after a rejection the step must not grow: it would be rejected again.
    const limit = this.wasRejected ? 1 : MAX_FACTOR;
    this.h = h * Math.min(limit, Math.max(MIN_FACTOR, growth));
    this.errorBefore = Math.max(error, FIRST_ERROR);
    this.wasRejected = false;
    if (this.settings.shouldStop?.(this.t, this.y)) this.status = 'stopped';
    else if (isLast) this.status = 'reached-end';
  }

  private reject(h: number, error: number): void {
    this.rejected++;
    this.wasRejected = true;
    const factor = Number.isFinite(error)
      ? Math.max(MIN_FACTOR, SAFETY * error ** -ERROR_EXPONENT)
      : NON_FINITE_FACTOR;
    this.h = h * factor;
  }

  /** First step after Hairer, Norsett & Wanner, section II.4: a Euler step changes y by 1 % and its error is in the tolerance. */
  private guessFirstStep(): number {
    const { k, y, y1, n } = this;
    const span = Math.abs(this.tEnd - this.t);
    const size = this.scaledNorm(y);
    const slope = this.scaledNorm(k[0]);
    const tiny = 1e-5;
    const guess = Math.min(size < tiny || slope < tiny ? 1e-6 : (0.01 * size) / slope, span);
    for (let i = 0; i < n; i++) y1[i] = y[i] + this.direction * guess * k[0][i];
    this.evaluate(this.t + this.direction * guess, y1, k[1]);
    for (let i = 0; i < n; i++) y1[i] = k[1][i] - k[0][i];
    const curvature = this.scaledNorm(y1) / guess;
    const steepest = Math.max(slope, curvature);
    const byError = steepest > 1e-15 ? (0.01 / steepest) ** 0.2 : Math.max(1e-6, guess * 1e-3);
    const h = Math.min(100 * guess, byError, span);
    return Number.isFinite(h) ? h : guess;
  }

  private scaledNorm(values: Float64Array): number {
    let largest = 0;
    for (let i = 0; i < this.n; i++) {
      const size = Math.abs(values[i]);
      if (size > 0) largest = Math.max(largest, size / this.tolerance(i, Math.abs(this.y[i])));
    }
    return largest;
  }

  private tolerance(i: number, size: number): number {
    return this.absolute[i] + this.settings.relativeTolerance * size;
  }

  private evaluate(t: number, y: Float64Array, out: Float64Array): void {
    this.evaluations++;
    this.rhs(t, y, out);
  }
}

/** to += factor from */
function addScaled(to: Float64Array, factor: number, from: Float64Array): void {
  for (let i = 0; i < to.length; i++) to[i] += factor * from[i];
}

function spread(value: number | ArrayLike<number>, n: number): Float64Array {
  const spreadOut = typeof value === 'number' ? new Float64Array(n).fill(value) : Float64Array.from(value);
  if (spreadOut.length !== n || !spreadOut.every((tolerance) => tolerance >= 0)) {
    throw new RangeError(`integrate: absoluteTolerance must be ${n} values of at least 0, got ${value}`);
  }
  return spreadOut;
}

function isFiniteVector(values: Float64Array): boolean {
  for (let i = 0; i < values.length; i++) if (!Number.isFinite(values[i])) return false;
  return true;
}
