/**
 * Damped least squares for many small fits in a row: minimise F(theta) = |r(theta)|^2 / 2 where speed counts and 1e-6 will do.
 *
 *   (J'J + lambda D^2) delta = -J'r,   D the largest norm each column of J has had        (Marquardt 1963; More 1978)
 *
 * by Cholesky; lambda follows the ratio of real to promised gain (Nielsen 1999, Damping parameter in Marquardt's method). The gradient test
 * is that of `trust-region.ts`: the cosine of the angle between residuals and tangent plane, sqrt(g' (J'J)^-1 g) / |r|, g = J'r.
 * Normal equations square the condition number: for problems with a prior on every parameter, not for those of `least-squares.ts`.
 */
import type { LeastSquaresProblem } from './least-squares-problem';
import type { Termination } from './termination';

const FIRST_DAMPING = 1e-2;
/** Damping at which no step that can be seen is left. */
const LARGEST_DAMPING = 1e12;
/** Smallest share of the promised gain that a step must bring. */
const ENOUGH_GAIN = 1e-4;
/** Share added to the diagonal of J'J in the gradient test, which rounding could make indefinite. */
const RIDGE = 1e-12;

export interface DescentOptions {
  /** Largest cosine that counts as converged. */
  gradientTolerance: number;
  /** Evaluations after which it stops. */
  maxEvaluations: number;
}

export interface DescentEnd {
  status: Termination;
  theta: Float64Array;
  /** Half the sum of squared residuals; Infinity when the start was not finite. */
  cost: number;
  /** m x n row-major. */
  jacobian: Float64Array;
  /** Steps taken. */
  iterations: number;
  evaluations: number;
}

/** Goes down from one start (length n). */
export function descend(
  problem: LeastSquaresProblem,
  start: ArrayLike<number>,
  options: DescentOptions,
): DescentEnd {
  const n = problem.parameterCount;
  const m = problem.residualCount;
  const theta = Float64Array.from(start);
  const trial = new Float64Array(n);
  const residuals = new Float64Array(m);
  let jacobian = new Float64Array(m * n);
  let trialJacobian = new Float64Array(m * n);
  const end = (status: Termination): DescentEnd => ({
    status,
    theta,
    cost,
    jacobian,
    iterations,
    evaluations,
  });
  let cost = Number.POSITIVE_INFINITY;
  let iterations = 0;
  let evaluations = 1;
  if (!problem.evaluate(theta, residuals, jacobian)) return end('start-not-finite');
  cost = halfSquares(residuals);

  const normal = new Float64Array(n * n);
  const damped = new Float64Array(n * n);
  const gradient = new Float64Array(n);
  const step = new Float64Array(n);
  const scale = new Float64Array(n);
  let damping = FIRST_DAMPING;
  let growth = 2;
  for (;;) {
    fillNormalEquations(jacobian, residuals, n, normal, gradient);
    for (let j = 0; j < n; j++) scale[j] = Math.max(scale[j], normal[j * (n + 1)]);
    addToDiagonal(normal, scale, RIDGE, n, damped);
    const left = factorInPlace(damped, n) ? halfPromise(damped, gradient, n, step) : Number.NaN;
    if (left <= options.gradientTolerance ** 2 * cost) return end('gradient');
    let hasMoved = false;
    while (!hasMoved) {
      if (evaluations >= options.maxEvaluations) return end('iteration-limit');
      if (!(damping < LARGEST_DAMPING)) return end('step');
      addToDiagonal(normal, scale, damping, n, damped);
      if (factorInPlace(damped, n)) {
        halfPromise(damped, gradient, n, step);
        for (let j = 0; j < n; j++) trial[j] = theta[j] + step[j];
        evaluations++;
        const isUsable = problem.evaluate(trial, residuals, trialJacobian);
        const gain = isUsable ? cost - halfSquares(residuals) : Number.NaN;
        const ratio = gain / promisedGain(step, gradient, scale, damping);
        if (ratio > ENOUGH_GAIN) {
          hasMoved = true;
          damping *= Math.max(1 / 3, 1 - (2 * Math.min(ratio, 1) - 1) ** 3);
          growth = 2;
          cost -= gain;
          continue;
        }
      }
      damping *= growth;
      growth *= 2;
    }
    iterations++;
    theta.set(trial);
    [jacobian, trialJacobian] = [trialJacobian, jacobian];
  }
}

function halfSquares(values: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i] * values[i];
  return sum / 2;
}

/** normal = J'J, gradient = J'r. */
function fillNormalEquations(
  jacobian: Float64Array,
  residuals: Float64Array,
  n: number,
  normal: Float64Array,
  gradient: Float64Array,
): void {
  normal.fill(0);
  gradient.fill(0);
  for (let i = 0; i < residuals.length; i++) {
    const row = i * n;
    const residual = residuals[i];
    for (let a = 0; a < n; a++) {
      const slope = jacobian[row + a];
      // rows of priors are nearly empty
      if (slope === 0) continue;
      gradient[a] += slope * residual;
      for (let b = 0; b <= a; b++) normal[a * n + b] += slope * jacobian[row + b];
    }
  }
  for (let a = 0; a < n; a++) for (let b = 0; b < a; b++) normal[b * n + a] = normal[a * n + b];
}

function addToDiagonal(
  normal: Float64Array,
  scale: Float64Array,
  factor: number,
  n: number,
  out: Float64Array,
): void {
  out.set(normal);
  for (let j = 0; j < n; j++) out[j * (n + 1)] += factor * scale[j];
}

/** Lower Cholesky factor over the lower triangle; false when the matrix is not positive definite. */
function factorInPlace(matrix: Float64Array, n: number): boolean {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i * n + j];
      for (let k = 0; k < j; k++) sum -= matrix[i * n + k] * matrix[j * n + k];
      if (i > j) matrix[i * n + j] = sum / matrix[j * n + j];
      else if (sum > 0 && sum < Number.POSITIVE_INFINITY) matrix[i * n + i] = Math.sqrt(sum);
      else return false;
    }
  }
  return true;
}

/** step = -A^-1 gradient from the factor of A. @returns gradient' A^-1 gradient / 2 */
function halfPromise(lower: Float64Array, gradient: Float64Array, n: number, step: Float64Array): number {
  let squares = 0;
  for (let i = 0; i < n; i++) {
    let sum = -gradient[i];
    for (let k = 0; k < i; k++) sum -= lower[i * n + k] * step[k];
    step[i] = sum / lower[i * (n + 1)];
    squares += step[i] * step[i];
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = step[i];
    for (let k = i + 1; k < n; k++) sum -= lower[k * n + i] * step[k];
    step[i] = sum / lower[i * (n + 1)];
  }
  return squares / 2;
}

/** Gain of the linear model along a damped step: (lambda |D step|^2 - step' gradient) / 2. */
function promisedGain(
  step: Float64Array,
  gradient: Float64Array,
  scale: Float64Array,
  damping: number,
): number {
  let sum = 0;
  for (let j = 0; j < step.length; j++) sum += step[j] * (damping * scale[j] * step[j] - gradient[j]);
  return sum / 2;
}
