/**
 * Profile likelihood intervals on the plain least-squares fit (Raue et al. 2009, Bioinformatics 25:1923): all values psi of a quantity at
 * which the best fit of everything else stays within a threshold of the best fit of all,
 *
 *   chi2:  RSS(psi) <= RSS_min exp(q/n)              F:  RSS(psi) <= RSS_min (1 + q/(n - 8))
 *
 * q the quantile of chi2(1), or of F(1, n - 8) = t^2. An end may be missing: the threshold is then not reached however far psi goes, and
 * the data do not bound it.
 *
 * Searched on one axis that holds infinity: psi = unit t for t <= 1, psi = unit/(2 - t) for 1 <= t <= 2. Along it the root deviance
 * sqrt(n ln(RSS/RSS_min)) is nearly straight, so that its crossing of sqrt(threshold) takes a handful of fits.
 */
import { PLAIN_PARAMETER_COUNT, type PlainProblem } from '../../estimate/plain-problem';
import { fitNonNegativeInSteps } from '../../numeric/non-negative-fit';
import { runToEnd } from '../../numeric/run-to-end';
import {
  constrainProblem,
  type Held,
  type ProfiledQuantity,
  readQuantity,
  unitOf,
} from './profile-constraint';

/** chi2(.95; 1). */
export const CHI2_95 = 3.841458821;

export interface ProfileOptions {
  threshold: 'chi2' | 'f';
  /** Quantile of chi2(1), or of F(1, n - 8). */
  quantile: number;
  /** Coefficients between the firms may be negative; else an interval of one that holds 0 ends there. */
  allowsHelp: boolean;
}

export const DEFAULT_PROFILE_OPTIONS: Readonly<ProfileOptions> = {
  threshold: 'chi2',
  quantile: CHI2_95,
  allowsHelp: false,
};

export interface ProfileInterval {
  quantity: ProfiledQuantity;
  /** null: infinite, since the best fit has no own crowding, or undefined (0/0). */
  estimate: number | null;
  /** null: open, the data give no bound on that side. */
  low: number | null;
  high: number | null;
}

/** The constrained fits start beside their answer. */
const FIT = { noise: 'estimated', gradientTolerance: 1e-5, bursts: 0, maxIterations: 60 } as const;
/** Root deviance at an end, relative: 1e-3 of it is some 1e-3 of the interval's half-width. */
const END_TOLERANCE = 1e-3;
const MAX_FITS = 25;
/** The axis: its lower bound for a coefficient that may help, and for a level (K = unit/(2 - t)); infinity is at 2. */
const FURTHEST_HELP = -50;
const SMALLEST_LEVEL = -1000;
const INFINITE = 2;
/** First step along the axis. */
const FIRST_STEP = 0.05;
const LARGEST_GROWTH = 4;

/** Evaluations of the problem for one quantity: several times what counts of a market take, seconds at the most. */
const MAX_EVALUATIONS = 4000;

interface Profile {
  /** Root deviance at t; Infinity where nothing finite was found. */
  rootDeviance(t: number): Generator<void, number>;
  /** More work has gone into it than the quantity is worth. */
  readonly isDear: boolean;
}

/**
 * @param best the point of least RSS of the plain problem, `rss` its value
 * @returns null where an end was not settled within the limit of work
 */
export function profileQuantity(...input: Parameters<typeof profileInSteps>): ProfileInterval | null {
  return runToEnd(profileInSteps(...input));
}

/** The same as a generator that yields after every bounded piece of work. */
export function* profileInSteps(
  problem: PlainProblem,
  best: Float64Array,
  rss: number,
  quantity: ProfiledQuantity,
  options: Partial<ProfileOptions> = {},
): Generator<void, ProfileInterval | null> {
  const chosen = { ...DEFAULT_PROFILE_OPTIONS, ...options };
  const raw = readQuantity(quantity, best, problem.scales);
  if (Number.isNaN(raw)) return { quantity, estimate: null, low: null, high: null };
  const unit = unitOf(quantity, problem.scales);
  const isLevel = quantity === 'k1' || quantity === 'k2';
  const centre = isLevel || raw > unit ? INFINITE - unit / raw : raw / unit;
  const limit = Math.sqrt(thresholdOf(problem.residualCount, chosen));
  const lowest = isLevel ? SMALLEST_LEVEL : chosen.allowsHelp ? FURTHEST_HELP : 0;
  const valueAt = (t: number) => (isLevel || t > 1 ? unit / (INFINITE - t) : unit * t);
  const search = (bound: number) => {
    const profile = createProfile(problem, best, rss, quantity, chosen.allowsHelp);
    return findEnd(profile, centre, bound, limit);
  };
  const low = yield* search(lowest);
  if (low === GIVEN_UP) return null;
  const high = yield* search(INFINITE);
  if (high === GIVEN_UP) return null;
  const lowEnd = low === null && lowest === 0 ? 0 : low;
  return {
    quantity,
    estimate: Number.isFinite(raw) ? raw : null,
    low: lowEnd === null ? null : valueAt(lowEnd),
    high: high === null ? null : valueAt(high),
  };
}

/** Deviance n ln(RSS/RSS_min) at which an interval ends. */
function thresholdOf(n: number, { threshold, quantile }: ProfileOptions): number {
  return threshold === 'chi2' ? quantile : n * Math.log1p(quantile / (n - PLAIN_PARAMETER_COUNT));
}

function createProfile(
  problem: PlainProblem,
  best: Float64Array,
  rss: number,
  quantity: ProfiledQuantity,
  allowsHelp: boolean,
): Profile {
  const unit = unitOf(quantity, problem.scales);
  const isLevel = quantity === 'k1' || quantity === 'k2';
  let near = best;
  let evaluations = 0;
  const holdAt = (t: number): Held =>
    isLevel || t > 1 ? { form: 'inverse', value: (INFINITE - t) / unit } : { form: 'value', value: unit * t };
  return {
    *rootDeviance(t) {
      const constrained = constrainProblem(problem, quantity, holdAt(t), allowsHelp);
      const start = constrained.reduce(near);
      const fit = yield* fitNonNegativeInSteps(constrained, start, constrained.isBounded, FIT);
      evaluations += fit.evaluations;
      const found = 2 * fit.fit.cost;
      if (!(found < Number.POSITIVE_INFINITY)) return Number.POSITIVE_INFINITY;
      near = constrained.expand(fit.theta);
      return Math.sqrt(Math.max(0, problem.residualCount * Math.log(found / rss)));
    },
    get isDear() {
      return evaluations > MAX_EVALUATIONS;
    },
  };
}

/** An end that was not settled within the limit of work. */
const GIVEN_UP = 'given-up';

/**
 * Where the root deviance, 0 at `from`, reaches `limit` on the way to `bound`; null when it does not.
 * Steps out by the straight line through the last point, then closes in on the bracket.
 */
function* findEnd(
  profile: Profile,
  from: number,
  bound: number,
  limit: number,
): Generator<void, number | null | typeof GIVEN_UP> {
  const direction = Math.sign(bound - from);
  if (direction === 0) return null;
  const reach = Math.abs(bound - from);
  let inside = 0;
  let insideValue = 0;
  let outside = Number.NaN;
  let outsideValue = Number.NaN;
  let step = Math.min(FIRST_STEP, reach);
  for (let fits = 0; fits < MAX_FITS; fits++) {
    if (profile.isDear) return GIVEN_UP;
    const value = yield* profile.rootDeviance(from + direction * step);
    if (Math.abs(value - limit) <= END_TOLERANCE * limit) return from + direction * step;
    if (value < limit) {
      if (step >= reach) return null;
      inside = step;
      insideValue = value;
    } else {
      outside = step;
      outsideValue = value;
    }
    step = Number.isNaN(outside)
      ? Math.min(reach, inside * Math.min(LARGEST_GROWTH, Math.max(1.2, (1.05 * limit) / insideValue)))
      : between(inside, insideValue, outside, outsideValue, limit);
  }
  return from + direction * step;
}

/** By the straight line through both, kept off the ends of the bracket. */
function between(
  inside: number,
  insideValue: number,
  outside: number,
  outsideValue: number,
  limit: number,
): number {
  const share = Number.isFinite(outsideValue) ? (limit - insideValue) / (outsideValue - insideValue) : 0.5;
  return inside + Math.min(0.95, Math.max(0.05, share)) * (outside - inside);
}
