/**
 * The plain least-squares fit: eight parameters, no prior, errors independent on the log scale or on the scale of the counts.
 *
 * It is worked in the crowding form N_i (r_i - b_ii N_i - b_ij N_j), b >= 0, and says what that form can say. A firm that only falls or
 * only grows in the window has b_ii = 0 as well as any small b_ii: its saturation level does not exist, and with it goes one of
 *
 *   alpha = r2 b12/(r1 b22),   beta = r1 b21/(r2 b11).
 *
 * The formula would give infinity there and a classifier would read a race; the answer is 'notIdentified'.
 * Which of the two error scales is right, the data seldom tell, and the outcome may hang on it (Pascual & Kareiva 1996, Ecology 77:337):
 * fit both.
 */
import { classifyOutcome, type Outcome } from '../dynamics/outcome';
import { type CrowdingForm, fromCrowdingForm } from '../dynamics/system';
import { fitNonNegativeInSteps, type NonNegativeFit } from '../numeric/non-negative-fit';
import { runToEnd } from '../numeric/run-to-end';
import type { Termination } from '../numeric/termination';
import {
  createPlainProblem,
  type ErrorScale,
  FIRST_CROWDING,
  PLAIN_PARAMETER_COUNT,
  type PlainProblem,
  type PlainSeries,
} from './plain-problem';
import { createPlainStarts } from './plain-starts';

type PlainParameterId = 'r1' | 'r2' | 'n1Start' | 'n2Start' | 'b11' | 'b12' | 'b21' | 'b22';

const IDS: readonly PlainParameterId[] = ['r1', 'r2', 'n1Start', 'n2Start', 'b11', 'b12', 'b21', 'b22'];

export interface PlainFitOptions {
  errorScale: ErrorScale;
  starts: number;
  seed: number;
  /** No further start is tried after so many evaluations: counts that follow no path would take them all to their limit. */
  maxWork: number;
}

const DEFAULT_PLAIN_FIT_OPTIONS: Readonly<PlainFitOptions> = {
  errorScale: 'log',
  starts: 12,
  seed: 1,
  maxWork: Number.POSITIVE_INFINITY,
};

export interface PlainFit {
  /** Why the polish of the best start stopped. */
  status: Termination;
  /** Sum of squared residuals, and their number. */
  rss: number;
  observations: number;
  /** Estimates: rates per unit of time, b per user and unit of time, start levels in users. */
  estimates: Record<PlainParameterId, number>;
  /** Gauss-Newton standard errors with RSS/(n - free parameters); null for all when not available, and for one at its bound. */
  standardErrors: Record<PlainParameterId, number | null>;
  /** Coefficients at their bound 0. */
  atZero: PlainParameterId[];
  /** Whether each firm would grow alone: one that only falls fits with r = 0 as well. */
  growsAlone: readonly [boolean, boolean];
  /** null where the data do not bend the firm's growth (see `MAX_SATURATION_RATIO`), or it does not grow. */
  k1: number | null;
  k2: number | null;
  alpha: number | null;
  beta: number | null;
  outcome: Outcome | 'notIdentified';
  /** One row per start after the first pass: its RSS (null when nothing finite was found) and why it stopped. */
  starts: { rss: number | null; status: Termination }[];
  /** Starts that came within `SAME_VALUE` of the best. */
  startsAtBest: number;
}

/** A saturation level this many times the largest count is none: the counts cannot bend towards it. */
const MAX_SATURATION_RATIO = 1000;
/** A firm whose rate lets it grow by less than this share over all the months, alone, does not grow by itself: it only falls. */
const LEAST_GROWTH = 1e-3;
/** Relative difference of RSS below which two starts found the same. */
const SAME_VALUE = 1e-4;
/** Evaluations of one pass: counts of a market take some hundreds; what takes more follows no path. */
const maxEvaluations = 1500;
/** First pass: the value to about 1e-6 of itself, enough to tell which starts go on. */
const FIRST_PASS = {
  noise: 'estimated',
  gradientTolerance: 1e-3,
  maxIterations: 60,
  maxEvaluations,
} as const;
/** Second pass: integration at 1e-10 leaves a rounding of about this in the gradient. */
const SECOND_PASS = {
  noise: 'estimated',
  gradientTolerance: 1e-7,
  maxIterations: 150,
  bursts: 0,
  maxEvaluations,
} as const;

/**
 * Fits from several starts and polishes the best.
 * @throws RangeError when times do not rise, a firm has no positive count, or there are fewer counts than parameters
 */
export function fitPlain(series: PlainSeries, options: Partial<PlainFitOptions> = {}): PlainFit {
  return runToEnd(fitPlainInSteps(series, options));
}

/** The same as a generator that yields after every bounded piece of work. */
export function* fitPlainInSteps(
  series: PlainSeries,
  options: Partial<PlainFitOptions> = {},
): Generator<void, PlainFit> {
  const { errorScale, starts, seed, maxWork } = { ...DEFAULT_PLAIN_FIT_OPTIONS, ...options };
  const problem = createPlainProblem(series, errorScale);
  if (!(problem.residualCount >= PLAIN_PARAMETER_COUNT)) {
    throw new RangeError(
      `fitPlain: ${PLAIN_PARAMETER_COUNT} counts are needed, got ${problem.residualCount}`,
    );
  }
  const isBounded = IDS.map((_, j) => j >= FIRST_CROWDING);
  const ends: NonNegativeFit[] = [];
  let work = 0;
  for (const start of createPlainStarts(series, problem, starts, seed)) {
    const end = yield* fitNonNegativeInSteps(problem, start, isBounded, FIRST_PASS);
    ends.push(end);
    work += end.evaluations;
    if (work > maxWork) break;
  }
  const first = ends.reduce((a, b) => (b.fit.cost < a.fit.cost ? b : a));
  const best = yield* fitNonNegativeInSteps(problem, first.theta, isBounded, SECOND_PASS);
  return describe(best, ends, problem);
}

function describe(best: NonNegativeFit, ends: NonNegativeFit[], problem: PlainProblem): PlainFit {
  const units = unitsOf(problem.scales);
  const natural = best.theta.map((value, j) => (j < FIRST_CROWDING ? Math.exp(value) : value) * units[j]);
  const estimates = Object.fromEntries(IDS.map((id, j) => [id, natural[j]])) as PlainFit['estimates'];
  const rssOf = (end: NonNegativeFit) => (Number.isFinite(end.fit.cost) ? 2 * end.fit.cost : null);
  return {
    status: best.fit.status,
    rss: 2 * best.fit.cost,
    observations: problem.residualCount,
    estimates,
    standardErrors: standardErrorsOf(best, natural, units),
    atZero: best.atZero.map((j) => IDS[j]),
    ...readMarket(estimates, problem),
    starts: ends.map((end) => ({ rss: rssOf(end), status: end.fit.status })),
    startsAtBest: ends.filter((end) => end.fit.cost <= (1 + SAME_VALUE) * best.fit.cost).length,
  };
}

/** Factor from the scaled to the natural value of each parameter. */
function unitsOf([s1, s2]: readonly [number, number]): number[] {
  return [1, 1, s1, s2, 1 / s1, 1 / s2, 1 / s1, 1 / s2];
}

/** By the delta method: the first four are fitted as logarithms, se(v) = v se(ln v). */
function standardErrorsOf(
  best: NonNegativeFit,
  natural: Float64Array,
  units: number[],
): PlainFit['standardErrors'] {
  const { covariance } = best.fit;
  const size = best.free.length;
  const errorOf = (j: number): number | null => {
    const i = best.free.indexOf(j);
    if (!covariance || i < 0) return null;
    return Math.sqrt(covariance[i * size + i]) * (j < FIRST_CROWDING ? natural[j] : units[j]);
  };
  return Object.fromEntries(IDS.map((id, j) => [id, errorOf(j)])) as PlainFit['standardErrors'];
}

/**
 * Saturation levels, competition coefficients and outcome, each only as far as it exists. A firm that only falls may have r = 0 as well as
 * any small r: alone it would grow to nowhere, and what the other takes of that room has no meaning either.
 */
function readMarket(
  form: CrowdingForm,
  { scales, span }: Pick<PlainProblem, 'scales' | 'span'>,
): Pick<PlainFit, 'growsAlone' | 'k1' | 'k2' | 'alpha' | 'beta' | 'outcome'> {
  const { r1, r2, b11, b12, b21, b22 } = form;
  const grows1 = r1 * span > LEAST_GROWTH;
  const grows2 = r2 * span > LEAST_GROWTH;
  const hasRoom1 = grows1 && b11 * scales[0] * MAX_SATURATION_RATIO > r1;
  const hasRoom2 = grows2 && b22 * scales[1] * MAX_SATURATION_RATIO > r2;
  const system = hasRoom1 && hasRoom2 ? fromCrowdingForm(form) : null;
  return {
    growsAlone: [grows1, grows2],
    k1: hasRoom1 ? r1 / b11 : null,
    k2: hasRoom2 ? r2 / b22 : null,
    alpha: hasRoom2 && grows1 ? (r2 * b12) / (r1 * b22) : null,
    beta: hasRoom1 && grows2 ? (r1 * b21) / (r2 * b11) : null,
    outcome: system ? classifyOutcome(system) : 'notIdentified',
  };
}
