/** How the app fits a market: the defaults of the engine with the market's own measurement errors. */
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import { ENGINE_VERSION } from '../estimate/engine-version';
import type { NewFit } from '../store/fits';
import { createId } from '../store/ids';
import type { Viewer } from './viewer';

export interface MeasurementErrors {
  focalError: number;
  rivalError: number;
}

export function newFit(viewer: Viewer, market: MeasurementErrors): NewFit & { id: string } {
  const measurementFloor = { focal: market.focalError, rival: market.rivalError };
  return {
    id: createId(),
    options: { ...DEFAULT_FIT_OPTIONS, measurementFloor },
    engineVersion: ENGINE_VERSION,
    requestedById: viewer.userId,
  };
}
