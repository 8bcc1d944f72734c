/**
 * Nonlinear least squares with some parameters held at 0 or above, by an active set:
 *
 *   1. Fit the free parameters with the model read at max(theta, 0): below 0 a parameter has no effect, so the search may cross.
 *   2. Whatever ended below 0 is fixed at 0, and the rest is fitted again, until all free parameters are positive.
 *   3. First-order condition (Nocedal & Wright, Numerical Optimization, section 12.3): at 0 the cost must not fall into the positive
 *      side. A fixed parameter that fails it is set free again, a Gauss-Newton step away from 0.
 *
 * The answer says which parameters are at 0, and has the covariance of the free ones.
 */
import { fitLeastSquaresInSteps, type LeastSquaresFit, type LeastSquaresOptions } from './least-squares';
import type { LeastSquaresProblem } from './least-squares-problem';
import { halfSumOfSquares } from './linear';
import { runToEnd } from './run-to-end';

export interface NonNegativeFit {
  /** Of the last fit of the free parameters; its arrays are in the order of `free`. */
  fit: LeastSquaresFit;
  /** All parameters. */
  theta: Float64Array;
  /** Indices of the free parameters, and of those at 0. */
  free: number[];
  atZero: number[];
  /** Calls of `evaluate` by the fits, all rounds together. */
  evaluations: number;
}

/** Cosine between residuals and column below which the first-order condition counts as met. */
const CONDITION_TOLERANCE = 1e-7;
/** Rounds of fixing and freeing; each frees one parameter and lowers the cost, a handful is usual. */
const MAX_ROUNDS = 30;

/**
 * Fits from one start.
 * @param isBounded per parameter: true holds it at 0 or above
 * @throws RangeError as `fitLeastSquares`, and when `isBounded` has another length
 */
export function fitNonNegative(...input: Parameters<typeof fitNonNegativeInSteps>): NonNegativeFit {
  return runToEnd(fitNonNegativeInSteps(...input));
}

export interface NonNegativeOptions extends LeastSquaresOptions {
  /** No further round is begun after so many evaluations; the best point so far is kept. */
  maxEvaluations: number;
}

/** The same as a generator that yields after every bounded piece of work. */
export function* fitNonNegativeInSteps(
  problem: LeastSquaresProblem,
  start: ArrayLike<number>,
  isBounded: readonly boolean[],
  options: Partial<NonNegativeOptions> = {},
): Generator<void, NonNegativeFit> {
  if (isBounded.length !== problem.parameterCount) {
    throw new RangeError(
      `fitNonNegative: isBounded must have ${problem.parameterCount} entries, got ${isBounded.length}`,
    );
  }
  const theta = Float64Array.from(start, (value, j) => (isBounded[j] ? Math.max(0, value) : value));
  const atZero = new Set<number>();
  let evaluations = 0;
  for (let round = 1; ; round++) {
    const end = yield* fitFree(problem, theta, isBounded, atZero, options);
    evaluations += end.fit.evaluations;
    const below = end.free.filter((j, i) => isBounded[j] && end.fit.theta[i] <= 0);
    theta.set(end.theta);
    for (const j of below) atZero.add(j);
    const freed = below.length === 0 ? findFreed(problem, theta, atZero) : null;
    const isSettled = below.length === 0 && freed === null;
    const isOver = round === MAX_ROUNDS || evaluations > (options.maxEvaluations ?? Number.POSITIVE_INFINITY);
    if (isSettled || isOver) {
      const fit: LeastSquaresFit = isSettled ? end.fit : { ...end.fit, status: 'iteration-limit' };
      return { ...end, fit, atZero: [...atZero].sort((a, b) => a - b), evaluations };
    }
    if (freed) {
      atZero.delete(freed.index);
      theta[freed.index] = freed.step;
    }
  }
}

function* fitFree(
  problem: LeastSquaresProblem,
  theta: Float64Array,
  isBounded: readonly boolean[],
  atZero: ReadonlySet<number>,
  options: Partial<LeastSquaresOptions>,
): Generator<void, Pick<NonNegativeFit, 'fit' | 'theta' | 'free'>> {
  const free = Array.from(theta, (_, j) => j).filter((j) => !atZero.has(j));
  const reduced = new ClampedProblem(problem, theta, free, isBounded);
  const reducedStart = free.map((j) => theta[j]);
  const fit =
    free.length > 0
      ? yield* fitLeastSquaresInSteps(reduced, reducedStart, options)
      : describeFixedPoint(problem, theta);
  return { fit, theta: reduced.expand(fit.theta), free };
}

/** The fit of nothing: every parameter is at its bound. */
function describeFixedPoint(problem: LeastSquaresProblem, theta: Float64Array): LeastSquaresFit {
  const residuals = new Float64Array(problem.residualCount);
  const hasValue = problem.evaluate(theta, residuals, null);
  return {
    status: hasValue ? 'gradient' : 'start-not-finite',
    theta: new Float64Array(0),
    cost: hasValue ? halfSumOfSquares(residuals) : Number.POSITIVE_INFINITY,
    residuals,
    jacobian: new Float64Array(0),
    gradientNorm: 0,
    covariance: hasValue ? new Float64Array(0) : null,
    covarianceReason: hasValue ? 'available' : 'not-converged',
    conditionNumber: 1,
    iterations: 0,
    evaluations: 1,
  };
}

/** The problem over the free parameters, read at 0 where a bounded one is below. */
class ClampedProblem implements LeastSquaresProblem {
  readonly parameterCount: number;
  readonly residualCount: number;
  private readonly full: Float64Array;
  private readonly fullJacobian: Float64Array;

  constructor(
    private readonly problem: LeastSquaresProblem,
    theta: Float64Array,
    private readonly free: readonly number[],
    private readonly isBounded: readonly boolean[],
  ) {
    this.parameterCount = free.length;
    this.residualCount = problem.residualCount;
    this.full = Float64Array.from(theta, (value, j) => (free.includes(j) ? value : 0));
    this.fullJacobian = new Float64Array(problem.residualCount * problem.parameterCount);
  }

  expand(theta: Float64Array): Float64Array {
    this.place(theta);
    return Float64Array.from(this.full);
  }

  evaluate(theta: Float64Array, residuals: Float64Array, jacobian: Float64Array | null): boolean {
    this.place(theta);
    if (!this.problem.evaluate(this.full, residuals, jacobian && this.fullJacobian)) return false;
    if (jacobian) this.pickColumns(theta, jacobian);
    return true;
  }

  private place(theta: Float64Array): void {
    for (let i = 0; i < this.free.length; i++) {
      const j = this.free[i];
      this.full[j] = this.isBounded[j] ? Math.max(0, theta[i]) : theta[i];
    }
  }

  private pickColumns(theta: Float64Array, jacobian: Float64Array): void {
    const width = this.problem.parameterCount;
    for (let i = 0; i < this.free.length; i++) {
      const j = this.free[i];
      const isBelow = this.isBounded[j] && theta[i] < 0;
      for (let row = 0; row < this.residualCount; row++) {
        jacobian[row * this.free.length + i] = isBelow ? 0 : this.fullJacobian[row * width + j];
      }
    }
  }
}

/** The fixed parameter whose release lowers the cost most steeply, with its Gauss-Newton step, or null when none does. */
function findFreed(
  problem: LeastSquaresProblem,
  theta: Float64Array,
  atZero: ReadonlySet<number>,
): { index: number; step: number } | null {
  if (atZero.size === 0) return null;
  const residuals = new Float64Array(problem.residualCount);
  const jacobian = new Float64Array(problem.residualCount * problem.parameterCount);
  if (!problem.evaluate(theta, residuals, jacobian)) return null;
  let steepest = CONDITION_TOLERANCE;
  let freed: { index: number; step: number } | null = null;
  for (const index of atZero) {
    let slope = 0;
    let columnSquares = 0;
    let residualSquares = 0;
    for (let row = 0; row < residuals.length; row++) {
      const entry = jacobian[row * problem.parameterCount + index];
      slope += entry * residuals[row];
      columnSquares += entry * entry;
      residualSquares += residuals[row] * residuals[row];
    }
    const fall = -slope / Math.sqrt(columnSquares * residualSquares);
    if (!(fall > steepest)) continue;
    steepest = fall;
    freed = { index, step: -slope / columnSquares };
  }
  return freed;
}
