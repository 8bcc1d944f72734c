/** Why an outlook no longer answers for its market as it is now. Names are left out: they change no number. */
import { ENGINE_VERSION } from '../estimate/engine-version';
import type { FitOptions } from '../estimate/types';
import { type FitBasis, toFitOptions } from './new-fit';

export type StaleReason =
  | 'newer-revision'
  | 'measurement-changed'
  | 'events-changed'
  | 'addressable-changed'
  | 'priors-changed'
  | 'engine-changed';

export interface FittedAs {
  revisionId: string;
  engineVersion: string;
  options: Pick<FitOptions, (typeof COMPARED)[number][0]>;
}

const COMPARED = [
  ['measurementFloor', 'measurement-changed'],
  ['changeMonths', 'events-changed'],
  ['addressable', 'addressable-changed'],
  ['priors', 'priors-changed'],
] as const satisfies readonly (readonly [keyof FitOptions, StaleReason])[];

/** In the order of their weight; empty: up to date. */
export function listStaleReasons(
  fitted: FittedAs,
  market: FitBasis,
  newestRevisionId: string | null,
): StaleReason[] {
  const wanted = toFitOptions(market);
  const changed = COMPARED.filter(([field]) => !isSame(fitted.options[field], wanted[field]));
  return [
    ...(fitted.revisionId === newestRevisionId ? [] : (['newer-revision'] as const)),
    ...changed.map(([, reason]) => reason),
    ...(fitted.engineVersion === ENGINE_VERSION ? [] : (['engine-changed'] as const)),
  ];
}

/** Plain values, whatever the order of their fields; absent is not the same as anything. */
function isSame(a: unknown, b: unknown): boolean {
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return a === b;
  const [keys, others] = [Object.keys(a), Object.keys(b)];
  return (
    keys.length === others.length &&
    keys.every((key) => isSame(a[key as keyof typeof a], b[key as keyof typeof b]))
  );
}
