/**
 * Independent logistic growth of one firm, fitted to ln users by least squares in the crowding form, which keeps its best value where the
 * saturation level runs to infinity (c = 0):
 *
 *   dx/dt = x (r - c x), c >= 0;   ln x(t) = ln x0 + r t - ln(1 + c x0 E),  E = (exp(r t) - 1) / r;   x = users / largest count
 *
 * Errors around the curve persist: e(t) with correlation p from month to month, so
 *   y(T+h) = f(T+h) + p^(g+h) e(T),   variance s^2 (1 - p^(2(g+h))) + f' C f (1 + p) / (1 - p)
 * with C the covariance of the parameters by the fit (delta method) and g the months since the last count. Student t with n - 3
 * degrees of freedom.
 */
import type { LeastSquaresProblem } from '../../numeric/least-squares-problem';
import { fitNonNegative, type NonNegativeFit } from '../../numeric/non-negative-fit';
import { isUsableTermination } from '../../numeric/termination';
import { type BaselineEnd, endWith, type LogSeries, listObserved } from './baseline';

const PARAMETERS = 3;
const MIN_COUNTS = 8;
/** Most that the errors are taken to persist: beyond it the curve's own uncertainty would run off. */
const MOST_PERSISTENT = 0.95;
/** Crowding tried first, in units of r: saturation at 1.2, 3 and 30 times the largest count. */
const START_LEVELS = [1.2, 3, 30];
/** Half the squared errors below which the curve goes through every count but for rounding; then nothing is left to estimate a covariance from. */
const EXACT = 1e-20;
/** Rate times time below which (exp(rt) - 1) / r is read off its series. */
const SMALL = 1e-6;

export function forecastIndependentLogistic(series: LogSeries, months: number): BaselineEnd {
  const { times, values } = listObserved(series);
  if (values.length < MIN_COUNTS) return { ok: false, code: 'too-short' };
  const top = Math.max(...values);
  const logs = values.map((value) => value - top);
  const end = fitLogistic(times, logs);
  if (!end) return { ok: false, code: 'failed' };
  const covariance = isExact(end) ? new Float64Array(end.free.length ** 2) : end.fit.covariance;
  if (!covariance) return { ok: false, code: 'failed' };
  const df = values.length - PARAMETERS;
  const { variance, persistence, last } = describeErrors(end.theta, times, logs, df);
  const inflation = (1 + persistence) / (1 - persistence);
  const since = series.length - 1 - times[times.length - 1];
  const gradient = new Float64Array(PARAMETERS);
  const centre = new Float64Array(months);
  const scale = new Float64Array(months);
  for (let h = 1; h <= months; h++) {
    const kept = persistence ** (since + h);
    centre[h - 1] = top + curve(end.theta, series.length - 1 + h, gradient) + kept * last;
    scale[h - 1] = Math.sqrt(
      variance * (1 - kept * kept) + inflation * quadraticForm(gradient, covariance, end.free),
    );
  }
  return endWith({ centre, scale, df });
}

/** The best of the starts that ended at a minimum; null: none did. */
function fitLogistic(times: readonly number[], logs: readonly number[]): NonNegativeFit | null {
  const problem = createProblem(times, logs);
  const span = times[times.length - 1] - times[0];
  const slope = (logs[logs.length - 1] - logs[0]) / span;
  const rate = Math.max(slope, 1 / span);
  const starts = [
    ...START_LEVELS.map((level) => [logs[0], 2 * rate, (2 * rate) / level]),
    [logs[0], slope, 0],
  ];
  const ends = starts
    .map((start) => fitNonNegative(problem, start, [false, false, true], { noise: 'estimated' }))
    .filter((end) => isUsableTermination(end.fit.status) || isExact(end));
  if (ends.length === 0) return null;
  return ends.reduce((best, end) => (end.fit.cost < best.fit.cost ? end : best));
}

function isExact(end: NonNegativeFit): boolean {
  return end.fit.cost <= EXACT;
}

function createProblem(times: readonly number[], logs: readonly number[]): LeastSquaresProblem {
  const gradient = new Float64Array(PARAMETERS);
  return {
    parameterCount: PARAMETERS,
    residualCount: times.length,
    evaluate(theta, residuals, jacobian) {
      for (let i = 0; i < times.length; i++) {
        residuals[i] = curve(theta, times[i], gradient) - logs[i];
        if (!Number.isFinite(residuals[i]) || !gradient.every(Number.isFinite)) return false;
        jacobian?.set(gradient, i * PARAMETERS);
      }
      return true;
    },
  };
}

/** ln x(t) of theta = (ln x0, r, c), with its gradient. */
function curve(theta: ArrayLike<number>, t: number, gradient: Float64Array): number {
  const [logStart, r, c] = [theta[0], theta[1], Math.max(0, theta[2])];
  const isSmall = Math.abs(r * t) < SMALL;
  const growth = Math.exp(r * t);
  const reach = isSmall ? t * (1 + (r * t) / 2) : Math.expm1(r * t) / r;
  const reachByRate = isSmall ? (t * t) / 2 : (t * growth - reach) / r;
  const start = Math.exp(logStart);
  const room = 1 + c * start * reach;
  gradient[0] = 1 - (c * start * reach) / room;
  gradient[1] = t - (c * start * reachByRate) / room;
  gradient[2] = (-start * reach) / room;
  return logStart + r * t - Math.log(room);
}

function describeErrors(theta: Float64Array, times: readonly number[], logs: readonly number[], df: number) {
  const unused = new Float64Array(PARAMETERS);
  const errors = times.map((t, i) => logs[i] - curve(theta, t, unused));
  const squares = errors.reduce((sum, error) => sum + error * error, 0);
  let products = 0;
  for (let i = 1; i < errors.length; i++) {
    if (times[i] - times[i - 1] === 1) products += errors[i] * errors[i - 1];
  }
  const correlation = squares > 0 ? products / squares : 0;
  return {
    variance: squares / df,
    persistence: Math.min(MOST_PERSISTENT, Math.max(0, correlation)),
    last: errors[errors.length - 1],
  };
}

/** g' C g over the free parameters, whose covariance C is in their order. */
function quadraticForm(gradient: Float64Array, covariance: Float64Array, free: readonly number[]): number {
  let sum = 0;
  free.forEach((j, a) => {
    free.forEach((k, b) => {
      sum += gradient[j] * gradient[k] * covariance[a * free.length + b];
    });
  });
  return Math.max(0, sum);
}
