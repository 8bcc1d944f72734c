/**
 * Nonlinear least squares: minimise F(theta) = |r(theta)|^2 / 2 over n parameters, m residuals.
 *
 * Two stages. Short bursts of `ml-levenberg-marquardt` come down from a rough start (`marquardt-burst.ts`); a scaled trust-region
 * polish with QR of the Jacobian ends at a tested minimum with a reason for stopping (`trust-region.ts`, `termination.ts`).
 * A burst can slide onto a plateau where a parameter has no effect. When the end is not usable, the polish is run from the start
 * itself, cautiously and then boldly, and the best end is kept: the bursts can help but never spoil a fit.
 *
 * Covariance of the parameters: (J'J)^-1 when the residuals are in units of a known noise ('known'), times 2F/(m - n) when the
 * noise is estimated from them ('estimated'). Priors may enter as rows of the residuals; then the noise is 'known'.
 */
import type { LeastSquaresProblem } from './least-squares-problem';
import { conditionNumber, inverseNormalMatrix } from './linear';
import { runBursts } from './marquardt-burst';
import { runToEnd } from './run-to-end';
import { isUsableTermination, type Termination } from './termination';
import { type Polish, polish } from './trust-region';

export interface LeastSquaresOptions {
  /** Whether the residuals are in units of a known noise, or the noise is estimated from them. */
  noise: 'known' | 'estimated';
  /** Bursts of `ml-levenberg-marquardt`, and steps in each. 0 bursts: polish only. */
  bursts: number;
  stepsPerBurst: number;
  /** Trial steps of the polish. */
  maxIterations: number;
  /** Largest cosine of the angle between residuals and tangent plane that counts as converged (no unit). */
  gradientTolerance: number;
  /** Smallest visible step as a share of the scaled size of theta. */
  stepTolerance: number;
}

export const DEFAULT_LEAST_SQUARES_OPTIONS: Readonly<LeastSquaresOptions> = {
  noise: 'known',
  bursts: 4,
  stepsPerBurst: 5,
  maxIterations: 500,
  // The linear model then promises less than 1e-16 of the cost: nothing that rounding would let us see.
  gradientTolerance: 1e-8,
  stepTolerance: 1e-15,
};

/**
 * Polishes tried in turn until one ends at a usable minimum. Chosen on the NIST sets: a first radius of 1 keeps BoxBOD and MGH10 off
 * the plateaus on which the usual 100 loses them, and only 100 brings MGH17 out of its first start.
 */
const ATTEMPTS = [
  { from: 'bursts', firstRadiusShare: 1 },
  { from: 'start', firstRadiusShare: 1 },
  { from: 'start', firstRadiusShare: 100 },
] as const;

type CovarianceReason = 'available' | 'not-converged' | 'flat-direction' | 'no-degrees-of-freedom';

export interface LeastSquaresFit {
  status: Termination;
  theta: Float64Array;
  /** Half the sum of squared residuals at `theta`; Infinity when the start was not finite. */
  cost: number;
  residuals: Float64Array;
  /** m x n row-major. */
  jacobian: Float64Array;
  /** Cosine of the angle between the residuals and the tangent plane: 0 at a minimum, at most 1. */
  gradientNorm: number;
  /** n x n row-major, or null with the reason beside it. */
  covariance: Float64Array | null;
  covarianceReason: CovarianceReason;
  /** Condition number of the Jacobian with columns scaled as in the polish; Infinity when a direction is flat. */
  conditionNumber: number;
  /** Steps of bursts and polish together. */
  iterations: number;
  /** Calls of `evaluate`. */
  evaluations: number;
}

/** Fits from one start (length n). Throws only on a wrong call; how the fit went is `status`. */
export function fitLeastSquares(...input: Parameters<typeof fitLeastSquaresInSteps>): LeastSquaresFit {
  return runToEnd(fitLeastSquaresInSteps(...input));
}

/** The same as a generator that yields after every bounded piece of work. */
export function* fitLeastSquaresInSteps(
  problem: LeastSquaresProblem,
  start: ArrayLike<number>,
  options: Partial<LeastSquaresOptions> = {},
): Generator<void, LeastSquaresFit> {
  const settings = { ...DEFAULT_LEAST_SQUARES_OPTIONS, ...options };
  checkCall(problem, start);
  const counted = new CountedProblem(problem);
  const theta = Float64Array.from(start);
  const residuals = new Float64Array(problem.residualCount);
  const jacobian = new Float64Array(problem.residualCount * problem.parameterCount);
  if (!counted.evaluate(theta, residuals, jacobian)) return describeFailedStart(theta, residuals, jacobian);

  const bursts = yield* runBursts(counted, theta, settings);
  let iterations = bursts.steps;
  let best: Polish | null = null;
  for (const attempt of bursts.steps > 0 ? ATTEMPTS : ATTEMPTS.slice(1)) {
    const from = attempt.from === 'bursts' ? bursts.theta : theta;
    // a burst may end where the derivatives overflow
    if (!counted.evaluate(from, residuals, jacobian)) continue;
    const end = yield* polish(counted, from, { ...settings, firstRadiusShare: attempt.firstRadiusShare });
    iterations += end.iterations;
    if (!best || isBetterEnd(end, best)) best = end;
    if (isUsableTermination(best.status)) break;
  }
  return describeEnd(best!, settings, iterations, counted.evaluations);
}

class CountedProblem implements LeastSquaresProblem {
  readonly parameterCount: number;
  readonly residualCount: number;
  evaluations = 0;

  constructor(private readonly problem: LeastSquaresProblem) {
    this.parameterCount = problem.parameterCount;
    this.residualCount = problem.residualCount;
  }

  evaluate(theta: Float64Array, residuals: Float64Array, jacobian: Float64Array | null): boolean {
    this.evaluations++;
    return this.problem.evaluate(theta, residuals, jacobian);
  }
}

function checkCall(problem: LeastSquaresProblem, start: ArrayLike<number>): void {
  const { parameterCount, residualCount } = problem;
  if (!(parameterCount >= 1)) {
    throw new RangeError(`fitLeastSquares: parameterCount must be at least 1, got ${parameterCount}`);
  }
  if (!(residualCount >= 1)) {
    throw new RangeError(`fitLeastSquares: residualCount must be at least 1, got ${residualCount}`);
  }
  if (start.length !== parameterCount) {
    throw new RangeError(`fitLeastSquares: start must have ${parameterCount} values, got ${start.length}`);
  }
}

/** A usable end beats one that is not; between two of a kind the lower cost wins. */
function isBetterEnd(candidate: Polish, current: Polish): boolean {
  const isCandidateUsable = isUsableTermination(candidate.status);
  if (isCandidateUsable !== isUsableTermination(current.status)) return isCandidateUsable;
  return candidate.cost < current.cost;
}

function describeEnd(
  end: Polish,
  settings: LeastSquaresOptions,
  iterations: number,
  evaluations: number,
): LeastSquaresFit {
  const covarianceReason = findCovarianceReason(end, settings.noise);
  return {
    status: end.status,
    theta: end.theta,
    cost: end.cost,
    residuals: end.residuals,
    jacobian: end.jacobian,
    gradientNorm: end.gradientNorm,
    covariance: covarianceReason === 'available' ? computeCovariance(end, settings.noise) : null,
    covarianceReason,
    conditionNumber: conditionNumber(end.factor),
    iterations,
    evaluations,
  };
}

function findCovarianceReason(end: Polish, noise: LeastSquaresOptions['noise']): CovarianceReason {
  if (end.factor.rank < end.theta.length) return 'flat-direction';
  if (!isUsableTermination(end.status)) return 'not-converged';
  if (noise === 'estimated' && !(end.residuals.length > end.theta.length)) return 'no-degrees-of-freedom';
  return 'available';
}

function computeCovariance(end: Polish, noise: LeastSquaresOptions['noise']): Float64Array {
  const inverse = inverseNormalMatrix(end.factor);
  if (noise === 'known') return inverse;
  const variance = (2 * end.cost) / (end.residuals.length - end.theta.length);
  return inverse.map((value) => value * variance);
}

function describeFailedStart(
  theta: Float64Array,
  residuals: Float64Array,
  jacobian: Float64Array,
): LeastSquaresFit {
  return {
    status: 'start-not-finite',
    theta,
    cost: Number.POSITIVE_INFINITY,
    residuals,
    jacobian,
    gradientNorm: Number.NaN,
    covariance: null,
    covarianceReason: 'not-converged',
    conditionNumber: Number.NaN,
    iterations: 0,
    evaluations: 1,
  };
}
