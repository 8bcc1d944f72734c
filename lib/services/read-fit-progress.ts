/** How far a fit is; polled by the page while it runs. */
import type { FitProgress } from '../estimate/types';
import { type FitState, readFit } from '../store/fits';
import { refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import type { Viewer } from './viewer';

export interface FitProgressView {
  state: FitState;
  progress: FitProgress | null;
  /** Why it failed, when it has. */
  failureCode: string | null;
  /** Cancelling was asked for and has not happened yet. */
  isCancelling: boolean;
}

export async function readFitProgress(
  viewer: Viewer,
  fitId: string,
): Promise<Success<FitProgressView> | NotFound> {
  const fit = await readFit({ workspaceId: viewer.workspaceId, fitId });
  if (!fit) return refuse('not-found');
  const { state, progress, failureCode, cancelAsked } = fit;
  return succeed({ state, progress, failureCode, isCancelling: cancelAsked && state === 'running' });
}
