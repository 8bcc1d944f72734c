/** Why an outlook no longer answers for its market as it is now. Names are left out: they change no number. */
import { ENGINE_VERSION } from '../estimate/engine-version';
import type { FitOptions } from '../estimate/types';
import type { MeasurementErrors } from './new-fit';

export type StaleReason = 'newer-revision' | 'measurement-changed' | 'engine-changed';

export interface FittedAs {
  revisionId: string;
  engineVersion: string;
  options: Pick<FitOptions, 'measurementFloor'>;
}

/** In the order of their weight; empty: up to date. */
export function listStaleReasons(
  fitted: FittedAs,
  market: MeasurementErrors,
  newestRevisionId: string | null,
): StaleReason[] {
  const { focal, rival } = fitted.options.measurementFloor;
  const reasons: StaleReason[] = [];
  if (fitted.revisionId !== newestRevisionId) reasons.push('newer-revision');
  if (focal !== market.focalError || rival !== market.rivalError) reasons.push('measurement-changed');
  if (fitted.engineVersion !== ENGINE_VERSION) reasons.push('engine-changed');
  return reasons;
}
