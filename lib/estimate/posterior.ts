/**
 * What every sampler and fit of this folder works on: a log density over a vector q whose first eight entries are the log parameters
 * (see `parameters.ts`) and whose further entries belong to the error model; and, where parameters may jump, the month of the break.
 */
import type { RandomStream } from '../numeric/random';
import type { Observations } from './observations';
import type { ErrorGuess } from './penalised-problem';
import type { Priors } from './priors';

export interface Posterior {
  readonly dimension: number;
  readonly observations: Observations;
  readonly priors: Priors;
  /** Where six log parameters (r, K, alpha, beta of a segment) begin in q. */
  readonly segments: readonly number[];
  /** Where the coordinates of the error model are in q: those that say how large errors are and of what kind. */
  readonly errors: readonly number[];
  /** Names of the values of one draw, in the order of `fillDraw`. */
  readonly columns: readonly string[];
  /** Calls of `logDensity` so far. */
  readonly evaluations: number;
  /** Integration steps taken so far, at least one per month and evaluation: the measure of work. */
  readonly steps: number;
  /** First month of the second segment; null when there is one segment. Set it before a call; `logDensity` is given that month. */
  breakMonth: number | null;
  /**
   * Log posterior density of q, and its gradient (length `dimension`, overwritten) unless null. The constant left out is the same for
   * all models of one error model, so their evidences can be compared.
   * @returns -Infinity where the path cannot be followed; never NaN
   */
  logDensity(q: Float64Array, gradient: Float64Array | null): number;
  /** A point from log parameters and a guess of each firm's errors. */
  place(theta: Float64Array, errors: readonly [ErrorGuess, ErrorGuess]): Float64Array;
  /**
   * Completes a row-major matrix of rough information (inverse covariance), which holds that of the first eight coordinates, by that of
   * the others, prior included.
   */
  addInformation(q: Float64Array, information: Float64Array): void;
  /**
   * Natural-unit values of a draw at q, `columns.length` of them from `offset` on, with the unobserved state at the last month drawn
   * where the error model has one.
   * @returns false where `logDensity` is -Infinity
   */
  fillDraw(q: Float64Array, stream: RandomStream, out: Float64Array, offset: number): boolean;
  /** Fills `out` (2 x months, firm-major) with ln levels of one draw of the path at q. @returns false where it does not exist */
  fillPath(q: Float64Array, stream: RandomStream, out: Float64Array): boolean;
}
