/**
 * Scaled trust-region polish of a nonlinear least-squares problem: minimise F(theta) = |r(theta)|^2 / 2.
 *
 * Each step minimises the linear model |r + J delta|^2 / 2 inside |D delta| <= Delta, with D the largest norm each column of J has
 * had so far (More 1978, The Levenberg-Marquardt algorithm: implementation and theory, LNM 630). With A = J D^-1 = Q R, R = U S V':
 *
 *   delta(lambda) = -D^-1 V diag(s / (s^2 + lambda)) c,   c = U'Q'r,   lambda >= 0 such that |D delta| = Delta or lambda = 0
 *
 * The gradient test is the cosine of the angle between the residuals and the tangent plane, |c| / |r| (Bates & Watts 1988, section
 * 2.2.3: the relative offset): it has no units and does not change when a parameter is rescaled. |c|^2 / |r|^2 is also the
 * fraction of F that the linear model still promises to remove.
 */

import type { LeastSquaresProblem } from './least-squares-problem';
import { columnNorms, type Factorisation, factorise, halfSumOfSquares } from './linear';
import type { Termination } from './termination';

/** A step must deliver this share of what the linear model promised (More 1978). */
const ACCEPT_RATIO = 1e-4;
const SHRINK_BELOW_RATIO = 0.25;
const GROW_ABOVE_RATIO = 0.75;
const SHRINK_FACTOR = 0.25;
const GROW_FACTOR = 2;
/** |r| below this share of the first |r| is rounding, not misfit. */
const ZERO_RESIDUAL_SHARE = 1e-12;
/** Newton steps for lambda; each at least halves the error of a concave function, 2 to 4 are usual. */
/** Below this cosine the promised change of the cost, its square, is lost in the rounding of a sum of squares. */
const COST_BLIND_GRADIENT = 1e-6;
/** A refining step must lower the gradient at least this far, else rounding has been reached. */
const REFINE_RATIO = 0.95;
const MAX_LAMBDA_STEPS = 30;
const RADIUS_TOLERANCE = 0.01;

export interface TrustRegionOptions {
  maxIterations: number;
  /** First radius as a share of |D theta|. */
  firstRadiusShare: number;
  /** Largest cosine between residuals and tangent plane that counts as zero. */
  gradientTolerance: number;
  /** Smallest step, as a share of |D theta|, that can still be seen. */
  stepTolerance: number;
}

export interface Polish {
  status: Termination;
  theta: Float64Array;
  cost: number;
  residuals: Float64Array;
  /** m x n row-major, at `theta`. */
  jacobian: Float64Array;
  factor: Factorisation;
  gradientNorm: number;
  iterations: number;
}

/** Trial steps of one slice: a fraction of a second even where an evaluation takes ten milliseconds. */
const STEPS_PER_SLICE = 5;

/**
 * Runs the polish from `start`, where the problem must be finite; the best point is always kept. A generator that yields after every
 * bounded piece of work.
 */
export function* polish(
  problem: LeastSquaresProblem,
  start: Float64Array,
  options: TrustRegionOptions,
): Generator<void, Polish> {
  const run = new TrustRegionRun(problem, start, options);
  for (let steps = 1; run.status === 'running'; steps++) {
    run.step();
    if (steps % STEPS_PER_SLICE === 0) yield;
  }
  return run.result();
}

class TrustRegionRun {
  status: Termination = 'running';
  private readonly theta: Float64Array;
  private readonly trialTheta: Float64Array;
  private residuals: Float64Array;
  private trialResiduals: Float64Array;
  private jacobian: Float64Array;
  private trialJacobian: Float64Array;
  private readonly scale: Float64Array;
  private readonly firstNorm: number;
  private factor: Factorisation;
  private cost: number;
  private gradientNorm = Number.POSITIVE_INFINITY;
  private radius: number;
  private iterations = 0;
  private moves = 0;

  constructor(
    private readonly problem: LeastSquaresProblem,
    start: Float64Array,
    private readonly options: TrustRegionOptions,
  ) {
    const { parameterCount: n, residualCount: m } = problem;
    this.theta = Float64Array.from(start);
    this.trialTheta = new Float64Array(n);
    this.residuals = new Float64Array(m);
    this.trialResiduals = new Float64Array(m);
    this.jacobian = new Float64Array(m * n);
    this.trialJacobian = new Float64Array(m * n);
    this.scale = new Float64Array(n);
    if (!problem.evaluate(this.theta, this.residuals, this.jacobian)) {
      throw new Error('polish: the problem must be finite at its start');
    }
    this.cost = halfSumOfSquares(this.residuals);
    this.firstNorm = Math.sqrt(2 * this.cost);
    this.factor = this.linearise();
    this.radius = options.firstRadiusShare * (scaledNorm(this.theta, this.scale) || 1);
    this.testConvergence();
  }

  /** One trial step: taken, or the radius shrinks. */
  step(): void {
    if (this.iterations >= this.options.maxIterations) {
      this.status = 'iteration-limit';
      return;
    }
    this.iterations++;
    if (this.gradientNorm <= COST_BLIND_GRADIENT) {
      this.refine();
      return;
    }
    const move = solveSubproblem(this.factor, this.radius);
    this.setTrial(move);
    const ratio = this.tryMove() / move.predicted;
    this.updateRadius(ratio, move.length);
    if (ratio > ACCEPT_RATIO && this.acceptMove()) return;
    if (ratio > ACCEPT_RATIO) this.radius = SHRINK_FACTOR * Math.min(this.radius, move.length);
    if (!(move.length > this.options.stepTolerance * scaledNorm(this.theta, this.scale))) this.giveUp();
  }

  result(): Polish {
    return {
      status: this.status,
      theta: this.theta,
      cost: this.cost,
      residuals: this.residuals,
      jacobian: this.jacobian,
      factor: this.factor,
      gradientNorm: this.gradientNorm,
      iterations: this.iterations,
    };
  }

  /** Reduction of the cost at the trial point; NaN where the problem is not finite. */
  private tryMove(): number {
    if (!this.problem.evaluate(this.trialTheta, this.trialResiduals, null)) return Number.NaN;
    let reduction = 0;
    for (let i = 0; i < this.residuals.length; i++) {
      // The difference first: near the minimum two nearly equal sums would cancel.
      reduction +=
        (this.residuals[i] - this.trialResiduals[i]) * (this.residuals[i] + this.trialResiduals[i]);
    }
    return reduction / 2;
  }

  /** A full Gauss-Newton step judged by the gradient, where the change of the cost is lost in rounding. */
  private refine(): void {
    const before = { theta: Float64Array.from(this.theta), gradientNorm: this.gradientNorm };
    this.setTrial(solveSubproblem(this.factor, Number.POSITIVE_INFINITY));
    if (this.problem.evaluate(this.trialTheta, this.trialResiduals, null)) this.acceptMove();
    if (this.status !== 'running' || this.gradientNorm < REFINE_RATIO * before.gradientNorm) return;
    if (!(this.gradientNorm <= before.gradientNorm)) {
      this.trialTheta.set(before.theta);
      this.acceptMove();
    }
    this.status = this.stationaryStatus();
  }

  private setTrial(move: Move): void {
    for (let j = 0; j < this.theta.length; j++) this.trialTheta[j] = this.theta[j] + move.delta[j];
  }

  private updateRadius(ratio: number, length: number): void {
    if (!(ratio >= SHRINK_BELOW_RATIO)) this.radius = SHRINK_FACTOR * Math.min(this.radius, length);
    else if (ratio > GROW_ABOVE_RATIO) this.radius = Math.max(this.radius, GROW_FACTOR * length);
  }

  /** @returns false, and nothing is taken, where the Jacobian is not finite though the residuals are */
  private acceptMove(): boolean {
    if (!this.problem.evaluate(this.trialTheta, this.trialResiduals, this.trialJacobian)) return false;
    this.theta.set(this.trialTheta);
    [this.jacobian, this.trialJacobian] = [this.trialJacobian, this.jacobian];
    [this.residuals, this.trialResiduals] = [this.trialResiduals, this.residuals];
    this.cost = halfSumOfSquares(this.residuals);
    this.moves++;
    this.factor = this.linearise();
    this.testConvergence();
    return true;
  }

  private linearise(): Factorisation {
    const { parameterCount: n, residualCount: m } = this.problem;
    const norms = columnNorms(this.jacobian, m, n);
    for (let j = 0; j < n; j++) this.scale[j] = Math.max(this.scale[j], norms[j]);
    // A parameter that has had no effect so far keeps a scale of one: any positive value serves.
    return factorise(
      this.jacobian,
      this.residuals,
      this.scale.map((value) => (value > 0 ? value : 1)),
    );
  }

  private testConvergence(): void {
    this.gradientNorm = tangentCosine(this.factor, this.cost);
    if (this.cost === 0) this.status = 'zero-residual';
    else if (this.gradientNorm <= this.options.gradientTolerance) this.status = this.stationaryStatus();
  }

  private stationaryStatus(): Termination {
    return this.factor.rank < this.theta.length ? 'flat-direction' : 'gradient';
  }

  /** No visible step improves the fit: say which of the possible reasons holds. */
  private giveUp(): void {
    if (Math.sqrt(2 * this.cost) <= ZERO_RESIDUAL_SHARE * this.firstNorm) this.status = 'zero-residual';
    else this.status = this.moves > 0 ? 'step' : 'never-moved';
  }
}

/** |c| / |r| over the directions that have any effect. */
function tangentCosine(factor: Factorisation, cost: number): number {
  let sum = 0;
  for (let k = 0; k < factor.rank; k++) sum += factor.projected[k] * factor.projected[k];
  return Math.sqrt(sum / (2 * cost));
}

function scaledNorm(values: Float64Array, scale: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < values.length; j++) sum += (values[j] * scale[j]) ** 2;
  return Math.sqrt(sum);
}

interface Move {
  /** Change of theta, length n. */
  delta: Float64Array;
  /** |D delta|. */
  length: number;
  /** Reduction of the cost that the linear model promises. */
  predicted: number;
}

function solveSubproblem(factor: Factorisation, radius: number): Move {
  const lambda = findLambda(factor, radius);
  const n = factor.scale.length;
  const weights = new Float64Array(n);
  let predicted = 0;
  let squaredLength = 0;
  for (let k = 0; k < factor.rank; k++) {
    const s = factor.singularValues[k];
    const c = factor.projected[k];
    const kept = lambda / (s * s + lambda);
    weights[k] = (-s * c) / (s * s + lambda);
    squaredLength += weights[k] * weights[k];
    predicted += (c * c * (1 - kept * kept)) / 2;
  }
  const delta = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    for (let k = 0; k < factor.rank; k++) delta[j] += factor.rightVectors[j * n + k] * weights[k];
    delta[j] /= factor.scale[j];
  }
  return { delta, length: Math.sqrt(squaredLength), predicted };
}

/** lambda with |D delta(lambda)| = radius to 1 %, by Newton on 1/|p| as in More (1978); 0 when the full step fits. */
function findLambda(factor: Factorisation, radius: number): number {
  let lambda = 0;
  for (let step = 0; step < MAX_LAMBDA_STEPS; step++) {
    let squares = 0;
    let slope = 0;
    for (let k = 0; k < factor.rank; k++) {
      const s = factor.singularValues[k];
      const damped = s * s + lambda;
      const p = (s * factor.projected[k]) / damped;
      squares += p * p;
      slope += (p * p) / damped;
    }
    const length = Math.sqrt(squares);
    if (length <= (1 + RADIUS_TOLERANCE) * radius) return lambda;
    lambda += ((length - radius) / radius) * (squares / slope);
  }
  return lambda;
}
