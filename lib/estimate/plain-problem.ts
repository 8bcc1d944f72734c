/**
 * Plain least squares of two firms' counts in the crowding form, which reaches the best value where K runs to infinity (b_ii = 0):
 *
 *   dN1/dt = N1 (r1 - b11 N1 - b12 N2),   dN2/dt = N2 (r2 - b22 N2 - b21 N1),   b >= 0
 *
 * Worked in units of the largest count S_i of each firm: x = N1/S1, y = N2/S2, c_ij = b_ij S_j. Parameters, in this order:
 *   ln r1, ln r2, ln x(t0), ln y(t0), c11, c12, c21, c22
 * Residuals, level minus count: 'log' ln x - ln count (zeros left out), 'raw' in users. Sensitivities by the forward variational equations
 * s' = J s + df/dp, integrated with the state.
 */
import { integrate, type RightHandSide } from '../dynamics/integrate';
import type { LeastSquaresProblem } from '../numeric/least-squares-problem';

export type ErrorScale = 'log' | 'raw';

/** Two series on one clock; the unit of time is the caller's, rates are per that unit. null: not observed. */
export interface PlainSeries {
  /** Rising; the start levels belong to the first of them. */
  times: readonly number[];
  first: readonly (number | null)[];
  second: readonly (number | null)[];
}

export const PLAIN_PARAMETER_COUNT = 8;
/** Index of the first bounded parameter, c11; the four from there are held at 0 or above. */
export const FIRST_CROWDING = 4;

/** State and sensitivities: x, y, then dx/dp and dy/dp for each parameter. */
const WIDTH = 2 + 2 * PLAIN_PARAMETER_COUNT;
const INTEGRATION_TOLERANCE = 1e-10;
/** Levels below this share of the largest count are followed no further: no count is so small. */
const SMALLEST_SHARE = 1e-14;
/** A path that fits counts takes some 200 steps; one that needs many more is far from any of them. */
const MAX_STEPS = 1000;

interface Observation {
  time: number;
  firm: 0 | 1;
  count: number;
}

export interface PlainProblem extends LeastSquaresProblem {
  /** Largest count of each firm: the unit of x and y. */
  readonly scales: readonly [number, number];
  /** From the first time to the last. */
  readonly span: number;
}

/** @throws RangeError when times do not rise or a firm has no positive count */
export function createPlainProblem(series: PlainSeries, errorScale: ErrorScale): PlainProblem {
  const observations = listObservations(series, errorScale);
  const scales: [number, number] = [largestCount(observations, 0), largestCount(observations, 1)];
  const { times } = series;
  // Only the state steers the steps, so that residuals are the same numbers with and without sensitivities.
  const absoluteTolerance = Float64Array.from({ length: WIDTH }, (_, i) =>
    i < 2 ? SMALLEST_SHARE : Number.POSITIVE_INFINITY,
  );

  const evaluate = (theta: Float64Array, residuals: Float64Array, jacobian: Float64Array | null): boolean => {
    const width = jacobian ? WIDTH : 2;
    const start = createStart(theta).subarray(0, width);
    const state = new Float64Array(width);
    const run = integrate(createGrowth(theta, width), times[0], start, times[times.length - 1], {
      relativeTolerance: INTEGRATION_TOLERANCE,
      absoluteTolerance: absoluteTolerance.subarray(0, width),
      maxSteps: MAX_STEPS,
      isDense: true,
    });
    if (run.status !== 'reached-end') return false;
    observations.forEach((observation, row) => {
      run.path!.evaluateAt(observation.time, state);
      const { firm, count } = observation;
      const level = state[firm] * scales[firm];
      residuals[row] = errorScale === 'log' ? Math.log(level / count) : level - count;
      if (jacobian)
        fillRow(jacobian, row, state, firm, errorScale === 'log' ? 1 / state[firm] : scales[firm]);
    });
    return residuals.every(Number.isFinite) && (jacobian?.every(Number.isFinite) ?? true);
  };

  const span = times[times.length - 1] - times[0];
  return {
    parameterCount: PLAIN_PARAMETER_COUNT,
    residualCount: observations.length,
    evaluate,
    scales,
    span,
  };
}

function listObservations(series: PlainSeries, errorScale: ErrorScale): Observation[] {
  const { times, first, second } = series;
  if (!times.every((time, i) => Number.isFinite(time) && (i === 0 || time > times[i - 1]))) {
    throw new RangeError('createPlainProblem: times must rise');
  }
  return ([first, second] as const).flatMap((counts, firm) =>
    times.flatMap((time, i) => {
      const count = counts[i];
      if (count === null || (errorScale === 'log' && count === 0)) return [];
      return [{ time, firm: firm as 0 | 1, count }];
    }),
  );
}

function largestCount(observations: readonly Observation[], firm: 0 | 1): number {
  const largest = Math.max(0, ...observations.filter((one) => one.firm === firm).map((one) => one.count));
  if (!(largest > 0 && largest < Number.POSITIVE_INFINITY)) {
    throw new RangeError(`createPlainProblem: firm ${firm + 1} has no positive count`);
  }
  return largest;
}

function createStart(theta: Float64Array): Float64Array {
  const start = new Float64Array(WIDTH);
  start[0] = Math.exp(theta[2]);
  start[1] = Math.exp(theta[3]);
  start[sensitivity(0, 2)] = start[0];
  start[sensitivity(1, 3)] = start[1];
  return start;
}

/** Place of the sensitivity of a firm's level to a parameter. */
function sensitivity(firm: 0 | 1, parameter: number): number {
  return 2 + 2 * parameter + firm;
}

/** Growth of the state, and of the sensitivities when `width` has room for them. */
function createGrowth(theta: Float64Array, width: number): RightHandSide {
  const r1 = Math.exp(theta[0]);
  const r2 = Math.exp(theta[1]);
  const [c11, c12, c21, c22] = theta.subarray(FIRST_CROWDING);
  return (_, s, out) => {
    const [x, y] = s;
    const growthOfX = r1 - c11 * x - c12 * y;
    const growthOfY = r2 - c22 * y - c21 * x;
    out[0] = x * growthOfX;
    out[1] = y * growthOfY;
    if (width === 2) return;
    for (let p = 0; p < PLAIN_PARAMETER_COUNT; p++) {
      const [dx, dy] = [s[2 + 2 * p], s[3 + 2 * p]];
      out[2 + 2 * p] = (growthOfX - c11 * x) * dx - c12 * x * dy;
      out[3 + 2 * p] = (growthOfY - c22 * y) * dy - c21 * y * dx;
    }
    out[sensitivity(0, 0)] += r1 * x;
    out[sensitivity(1, 1)] += r2 * y;
    out[sensitivity(0, 4)] -= x * x;
    out[sensitivity(0, 5)] -= x * y;
    out[sensitivity(1, 6)] -= x * y;
    out[sensitivity(1, 7)] -= y * y;
  };
}

function fillRow(
  jacobian: Float64Array,
  row: number,
  state: Float64Array,
  firm: 0 | 1,
  factor: number,
): void {
  for (let p = 0; p < PLAIN_PARAMETER_COUNT; p++) {
    jacobian[row * PLAIN_PARAMETER_COUNT + p] = factor * state[sensitivity(firm, p)];
  }
}
