/**
 * Short bursts of `ml-levenberg-marquardt`, made safe.
 *
 * The package never rejects a step, has no gradient test, and breaks off silently on NaN; it adds its damping to J'J as it is, so
 * the meaning of the damping depends on the units of the parameters; its default bounds cut at +-2^53. Hence: the model given to it is
 * always finite, the parameters are scaled to columns of J with norm 1 (damping then is Marquardt's 1963 scaled form), the bounds are
 * open, a burst is a few steps long, and only a point that is better than the start of the burst is taken.
 *
 * The data are x = 0..m-1 and y = 0, the model value at x is the residual of that row.
 */
import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import type { LeastSquaresProblem } from './least-squares-problem';
import { columnNorms, halfSumOfSquares } from './linear';

/** Residual given for a point where the problem is not finite: any finite point is better, and its square does not overflow. */
const REJECTED_RESIDUAL = 1e100;
const FIRST_DAMPING = 1e-2;
const DAMPING_AFTER_SUCCESS = 0.1;
const DAMPING_AFTER_FAILURE = 100;
const MIN_DAMPING = 1e-7;
const MAX_FAILURES = 2;
/** A burst that lowers the cost by a smaller share leaves the rest to the polish. */
const ENOUGH_IMPROVEMENT = 0.01;

export interface BurstOptions {
  bursts: number;
  stepsPerBurst: number;
}

export interface BurstResult {
  theta: Float64Array;
  steps: number;
}

/**
 * Runs bursts from `start`, where the problem must be finite; returns the best point, which may be the start itself. A generator that
 * yields after every burst.
 */
export function* runBursts(
  problem: LeastSquaresProblem,
  start: Float64Array,
  options: BurstOptions,
): Generator<void, BurstResult> {
  const best = Float64Array.from(start);
  const residuals = new Float64Array(problem.residualCount);
  const jacobian = new Float64Array(problem.residualCount * problem.parameterCount);
  problem.evaluate(best, residuals, jacobian);
  let cost = halfSumOfSquares(residuals);
  let damping = FIRST_DAMPING;
  let failures = 0;
  let steps = 0;
  // The package asks for two rows at least.
  const bursts = problem.residualCount < 2 ? 0 : options.bursts;
  for (let burst = 0; burst < bursts && failures < MAX_FAILURES; burst++) {
    const scale = columnNorms(jacobian, problem.residualCount, problem.parameterCount).map(
      (norm) => norm || 1,
    );
    const end = runBurst(problem, best, scale, damping, options.stepsPerBurst);
    steps += end?.iterations ?? 0;
    yield;
    if (!end || !(end.cost < cost)) {
      failures++;
      damping *= DAMPING_AFTER_FAILURE;
      continue;
    }
    const improvement = 1 - end.cost / cost;
    best.set(end.theta);
    problem.evaluate(best, residuals, jacobian);
    cost = end.cost;
    damping = Math.max(damping * DAMPING_AFTER_SUCCESS, MIN_DAMPING);
    if (improvement < ENOUGH_IMPROVEMENT) break;
  }
  return { theta: best, steps };
}

interface BurstEnd {
  theta: Float64Array;
  cost: number;
  iterations: number;
}

/** One burst in the scaled variables z = scale * theta; null when the package met a singular matrix. */
function runBurst(
  problem: LeastSquaresProblem,
  start: Float64Array,
  scale: Float64Array,
  damping: number,
  maxIterations: number,
): BurstEnd | null {
  const model = new SafeModel(problem, scale);
  const rows = Float64Array.from({ length: problem.residualCount }, (_, row) => row);
  const open = new Array<number>(problem.parameterCount).fill(Number.MAX_VALUE);
  try {
    const end = levenbergMarquardt({ x: rows, y: new Float64Array(rows.length) }, model.values, {
      initialValues: start.map((value, j) => value * scale[j]),
      jacobianFunction: model.slopes,
      damping,
      maxIterations,
      errorTolerance: 0,
      minValues: open.map((value) => -value),
      maxValues: open,
    });
    const theta = Float64Array.from(end.parameterValues, (value, j) => value / scale[j]);
    return { theta, cost: end.parameterError / 2, iterations: end.iterations };
  } catch {
    // ml-matrix throws on a singular system; the polish, which cannot meet one, goes on from the best point.
    return null;
  }
}

/** The problem as the package wants it: value and slopes by row, always finite. */
class SafeModel {
  private readonly theta: Float64Array;
  private readonly residuals: Float64Array;
  private readonly jacobian: Float64Array;
  private readonly partials: number[];

  constructor(
    private readonly problem: LeastSquaresProblem,
    private readonly scale: Float64Array,
  ) {
    this.theta = new Float64Array(problem.parameterCount);
    this.residuals = new Float64Array(problem.residualCount);
    this.jacobian = new Float64Array(problem.residualCount * problem.parameterCount);
    this.partials = new Array<number>(problem.parameterCount).fill(0);
  }

  readonly values = (scaled: number[]): ((row: number) => number) => {
    const residuals = this.residuals;
    const isUsable = this.problem.evaluate(this.unscale(scaled), residuals, null);
    return isUsable ? (row) => residuals[row] : () => REJECTED_RESIDUAL;
  };

  readonly slopes = (scaled: number[]): ((row: number) => number[]) => {
    const { jacobian, partials, scale } = this;
    // The residuals are the current ones already: the package asks for the values of a point before its slopes.
    if (!this.problem.evaluate(this.unscale(scaled), this.residuals, jacobian)) jacobian.fill(0);
    return (row) => {
      for (let j = 0; j < partials.length; j++) partials[j] = jacobian[row * partials.length + j] / scale[j];
      return partials;
    };
  };

  private unscale(scaled: number[]): Float64Array {
    for (let j = 0; j < scaled.length; j++) this.theta[j] = scaled[j] / this.scale[j];
    return this.theta;
  }
}
