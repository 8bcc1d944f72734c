/**
 * Climbs a smooth function with its gradient: quasi-Newton with the BFGS update of the inverse Hessian and a backtracking line search
 * (Nocedal & Wright 2006, chapters 3 and 6). The gradient may be slightly inexact: the climb then ends where no step along it helps.
 */
export interface ClimbResult {
  point: Float64Array;
  value: number;
  iterations: number;
  /** False when it stopped at the limit of iterations. */
  hasEnded: boolean;
}

/** Value of the function, and its gradient (overwritten) unless null; -Infinity where it does not exist. */
export type Ascent = (point: Float64Array, gradient: Float64Array | null) => number;

const MAX_ITERATIONS = 80;
/** Armijo's share of the promised gain. */
const ENOUGH_GAIN = 1e-4;
const SHRINK = 0.35;
const MAX_SHRINKS = 12;
/** Longest step in units of the metric. */
const MAX_STEP = 3;
/** A promised or real gain (twice it: in log density) below which the climb is over. */
const NO_GAIN = 1e-3;

/**
 * @param start a point where the function is finite
 * @param scale rough size of each coordinate: square root of the diagonal of the first inverse Hessian
 */
export function climb(ascent: Ascent, start: Float64Array, scale: Float64Array): ClimbResult {
  const n = start.length;
  const point = start.slice();
  const gradient = new Float64Array(n);
  const trial = new Float64Array(n);
  const trialGradient = new Float64Array(n);
  const direction = new Float64Array(n);
  const inverse = new Float64Array(n * n);
  for (let j = 0; j < n; j++) inverse[j * n + j] = scale[j] * scale[j];
  let value = ascent(point, gradient);
  let iterations = 0;
  for (; iterations < MAX_ITERATIONS; iterations++) {
    const slope = multiply(inverse, gradient, direction);
    if (!(slope > NO_GAIN)) break;
    let step = Math.min(1, MAX_STEP / Math.sqrt(slope));
    let trialValue = Number.NEGATIVE_INFINITY;
    let shrinks = 0;
    for (; shrinks < MAX_SHRINKS; shrinks++) {
      for (let i = 0; i < n; i++) trial[i] = point[i] + step * direction[i];
      trialValue = ascent(trial, trialGradient);
      if (trialValue >= value + ENOUGH_GAIN * step * slope) break;
      step *= SHRINK;
    }
    if (shrinks === MAX_SHRINKS) break;
    const gain = trialValue - value;
    updateInverse(inverse, point, trial, gradient, trialGradient);
    point.set(trial);
    gradient.set(trialGradient);
    value = trialValue;
    if (!(gain > NO_GAIN)) break;
  }
  return { point, value, iterations, hasEnded: iterations < MAX_ITERATIONS };
}

/** out = A x for a square row-major matrix; returns x . out. */
function multiply(matrix: Float64Array, x: Float64Array, out: Float64Array): number {
  const n = x.length;
  let dot = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += matrix[i * n + j] * x[j];
    out[i] = sum;
    dot += x[i] * sum;
  }
  return dot;
}

/** BFGS update of the inverse of minus the Hessian; left as it is when the curvature along the step is not downwards. */
function updateInverse(
  inverse: Float64Array,
  from: Float64Array,
  to: Float64Array,
  gradientFrom: Float64Array,
  gradientTo: Float64Array,
): void {
  const n = from.length;
  const change = gradientFrom.map((value, i) => value - gradientTo[i]);
  const step = to.map((value, i) => value - from[i]);
  let curvature = 0;
  for (let i = 0; i < n; i++) curvature += step[i] * change[i];
  if (!(curvature > 1e-10)) return;
  const pulled = new Float64Array(n);
  const quadratic = multiply(inverse, change, pulled);
  const factor = (1 + quadratic / curvature) / curvature;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      inverse[i * n + j] +=
        factor * step[i] * step[j] - (pulled[i] * step[j] + step[i] * pulled[j]) / curvature;
    }
  }
}

/** Minus the Hessian at a point by central differences of the gradient over a tenth of each scale, made symmetric. */
export function negativeHessian(ascent: Ascent, point: Float64Array, scale: Float64Array): Float64Array {
  const n = point.length;
  const hessian = new Float64Array(n * n);
  const shifted = point.slice();
  const above = new Float64Array(n);
  const below = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    const step = 0.1 * scale[j];
    shifted[j] = point[j] + step;
    ascent(shifted, above);
    shifted[j] = point[j] - step;
    ascent(shifted, below);
    shifted[j] = point[j];
    for (let i = 0; i < n; i++) hessian[i * n + j] = (below[i] - above[i]) / (2 * step);
  }
  return makeSymmetric(hessian, n);
}

/** The same by one-sided differences from the gradient at the point: half the work, first-order accurate. */
export function roughNegativeHessian(
  ascent: Ascent,
  point: Float64Array,
  gradient: Float64Array,
  scale: Float64Array,
): Float64Array {
  const n = point.length;
  const hessian = new Float64Array(n * n);
  const shifted = point.slice();
  const above = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    const step = 0.1 * scale[j];
    shifted[j] = point[j] + step;
    ascent(shifted, above);
    shifted[j] = point[j];
    for (let i = 0; i < n; i++) hessian[i * n + j] = (gradient[i] - above[i]) / step;
  }
  return makeSymmetric(hessian, n);
}

function makeSymmetric(hessian: Float64Array, n: number): Float64Array {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const middle = (hessian[i * n + j] + hessian[j * n + i]) / 2;
      hessian[i * n + j] = middle;
      hessian[j * n + i] = middle;
    }
  }
  return hessian;
}
