/** Cancels the fit of a market that is waiting or running. A running one ends at its worker's next report. */
import { askCancel, latestFit } from '../store/fits';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function cancelFit(
  viewer: Viewer,
  marketId: string,
): Promise<Success<{ fitId: string }> | NotAllowed | NotFound | Refusal<'nothing-running'>> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const fit = await latestFit({ workspaceId, marketId });
  if (!fit) return refuse('not-found');
  if (fit.state !== 'queued' && fit.state !== 'running') return refuse('nothing-running');
  const audit = { userId, action: 'cancel-fit', detail: { marketId, wasRunning: fit.state === 'running' } };
  const end = await askCancel({ workspaceId, fitId: fit.id, audit });
  if (end === null) return refuse('not-found');
  return end === 'ended' ? refuse('nothing-running') : succeed({ fitId: fit.id });
}
