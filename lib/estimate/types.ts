import type { Month, MonthlySeries } from '../series/types';

/** Ids of the estimated parameters; names, units and bounds for people are in `parameters.ts`. */
export type ParameterId = 'r1' | 'r2' | 'k1' | 'k2' | 'alpha' | 'beta' | 'n1Start' | 'n2Start';

export interface LogNormalPrior {
  /** Mean of the natural logarithm. */
  meanLog: number;
  /** Standard deviation of the natural logarithm. */
  sdLog: number;
}

/** What is believed of any market before its counts speak; `priors.ts` has the usual settings. */
export interface PriorSettings {
  /** Growth rate per month of either firm, small and alone. */
  growth: LogNormalPrior;
  /** Saturation level over the largest count, either firm. */
  saturation: LogNormalPrior;
  /** alpha and beta, as far as the firms compete at all. */
  alpha: LogNormalPrior;
  beta: LogNormalPrior;
  /** Chance, 0 or more and below 1, that they hardly compete. */
  noCompetition: number;
}

/** How many could use such a product at all: the room of a firm alone, as somebody estimates it. */
export interface AddressableMarket {
  /** Users; null: not estimated for that firm. */
  focal: number | null;
  rival: number | null;
  /** One sd of both, as a share of them: 0.5 is "half more, or a third less". */
  relativeError: number;
}

export type ErrorModel = 'ar1' | 'process-noise';

export interface FitOptions {
  /** Non-negative integer; the same seed gives the same numbers, whatever the number of workers. */
  seed: number;
  /** How far the outlook reaches, in months after the last observed one. */
  horizonMonths: number;
  /** Smallest allowed measurement error, sd of ln users, per firm: a panel estimate of a rival at +-10 % is 0.1. */
  measurementFloor: { focal: number; rival: number };
  errorModel: ErrorModel;
  /**
   * Months from which parameters may differ, because something happened then. Those with no month of the series on both sides are passed
   * over, and all of them under persistent errors, which know no break. Absent: none.
   */
  changeMonths?: Month[];
  /** Takes the place of the prior of the saturation level. Absent: not estimated. */
  addressable?: AddressableMarket;
  /** Absent: the usual ones. */
  priors?: PriorSettings;
}

/** What a fit reads. */
export interface FitInput {
  series: MonthlySeries;
  options: FitOptions;
}

/**
 * Posterior draws, row-major: draw i, column c is values[i * columns.length + c].
 * Columns are named in `columns` (see draws.ts): natural units, the state at the last observed month included,
 * so a forecast needs nothing but a draw.
 */
export interface DrawSet {
  errorModel: ErrorModel;
  columns: string[];
  count: number;
  values: number[] | Float64Array;
}

export type FitStage = 'starts' | 'polish' | 'warm-up' | 'sampling' | 'outlook';

/** Real numbers only; a field is null until it exists. */
export interface FitProgress {
  stage: FitStage;
  startsDone: number;
  startsTotal: number;
  /** Best penalised objective so far (half the sum of squared residuals and pseudo-residuals, lower is better). */
  bestValue: number | null;
  drawsKept: number;
  drawsTarget: number;
  /** Worst split R-hat over the watched quantities so far. */
  rHat: number | null;
  /** Smallest bulk effective sample size so far. */
  ess: number | null;
}

export type FitStatus =
  | 'converged'
  | 'not-converged' // the stated limit was reached before R-hat and ESS passed; draws are given with that warning
  | 'too-short' // fewer than MIN_MONTHS usable months
  | 'no-usable-data' // a firm has no positive count, or nothing varies
  | 'failed'; // no start gave a finite value
