/** Defaults of a fit. Each constant that shapes the numbers of a report is here or beside its only use. */
import type { FitOptions } from './types';

export const DEFAULT_FIT_OPTIONS: Readonly<FitOptions> = {
  seed: 1,
  horizonMonths: 24,
  measurementFloor: { focal: 0, rival: 0 },
  errorModel: 'process-noise',
};

/** Starts from the Latin hypercube, besides the two regressions. */
export const HYPERCUBE_STARTS = 8;

/** What a sampler must reach for ln alpha, ln beta and both firms' ln users at the horizon (Vehtari et al. 2021). */
export const R_HAT_LIMIT = 1.01;
export const ESS_LIMIT = 400;
