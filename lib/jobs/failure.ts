/** Why a fit or an analysis can end as failed; `lib/services/explain.ts` has the sentences. */
import type { FitStatus } from '../estimate/types';
import type { GAVE_UP } from '../store/claimed-work';

/** The engine threw or gave a result that is no result: a defect, logged with the id of the work. */
export const ENGINE_ERROR = 'engine-error';

export type FailureCode =
  | Exclude<FitStatus, 'converged' | 'not-converged'>
  | typeof ENGINE_ERROR
  | typeof GAVE_UP;
