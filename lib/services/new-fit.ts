/** How the app fits a market: the defaults of the engine with what the market itself says. */
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import { ENGINE_VERSION } from '../estimate/engine-version';
import type { FitOptions } from '../estimate/types';
import type { NewFit } from '../store/fits';
import { createId } from '../store/ids';
import type { Market } from '../store/markets';
import type { Viewer } from './viewer';

/** What of a market enters its numbers besides the counts; a market that is being made has only some of it. */
export type FitBasis = Pick<Market, 'focalError' | 'rivalError'> &
  Partial<
    Pick<Market, 'focalAddressable' | 'rivalAddressable' | 'addressableError' | 'priors' | 'changeMonths'>
  >;

export function newFit(viewer: Viewer, market: FitBasis): NewFit & { id: string } {
  return {
    id: createId(),
    options: toFitOptions(market),
    engineVersion: ENGINE_VERSION,
    requestedById: viewer.userId,
  };
}

/** What is not stated is left out, so that options of earlier fits compare. */
export function toFitOptions(market: FitBasis): FitOptions {
  const { focalError, rivalError, focalAddressable: focal, rivalAddressable: rival } = market;
  const { addressableError: relativeError, priors, changeMonths } = market;
  return {
    ...DEFAULT_FIT_OPTIONS,
    measurementFloor: { focal: focalError, rival: rivalError },
    ...(changeMonths && changeMonths.length > 0 && { changeMonths }),
    ...((focal || rival) &&
      relativeError && {
        addressable: { focal: focal ?? null, rival: rival ?? null, relativeError },
      }),
    ...(priors && { priors }),
  };
}
