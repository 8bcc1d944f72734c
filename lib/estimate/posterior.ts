/**
 * What every sampler and fit of this folder works on: a log density over a vector q whose first eight entries are the log parameters
 * (see `parameters.ts`) and whose further entries belong to the error model.
 */
import type { RandomStream } from '../numeric/random';
import type { Observations } from './observations';
import type { ErrorGuess } from './penalised-problem';
import type { Priors } from './priors';

export interface Posterior {
  readonly dimension: number;
  readonly observations: Observations;
  readonly priors: Priors;
  /** Names of the values of one draw, in the order of `fillDraw`. */
  readonly columns: readonly string[];
  /** Calls of `logDensity` so far. */
  readonly evaluations: number;
  /**
   * Log posterior density of q up to a constant, and its gradient (length `dimension`, overwritten) unless null.
   * @returns -Infinity where the path cannot be followed; never NaN
   */
  logDensity(q: Float64Array, gradient: Float64Array | null): number;
  /** A point from log parameters and a guess of each firm's errors. */
  placeErrors(theta: Float64Array, errors: readonly [ErrorGuess, ErrorGuess]): Float64Array;
  /** Rough information (inverse variance, prior included) of each coordinate beyond the log parameters, at q. */
  errorInformation(q: Float64Array): Float64Array;
  /**
   * Natural-unit values of a draw at q, `columns.length` of them from `offset` on, with the unobserved state at the last month drawn
   * where the error model has one.
   * @returns false where `logDensity` is -Infinity
   */
  fillDraw(q: Float64Array, stream: RandomStream, out: Float64Array, offset: number): boolean;
}
