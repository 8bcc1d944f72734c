/** Has the newest revision of a market fitted. Asking again while the same fit is on its way gives that fit. */
import { enqueueFit } from '../jobs/enqueue-fit';
import { createFit, hasSameInput, latestFit, readFitOptions } from '../store/fits';
import { readMarket } from '../store/markets';
import { latestRevision } from '../store/revisions';
import { newFit } from './new-fit';
import { refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function requestFit(
  viewer: Viewer,
  marketId: string,
): Promise<Success<{ fitId: string }> | NotAllowed | NotFound> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const scope = { workspaceId, marketId };
  const [market, revision, running] = await Promise.all([
    readMarket(scope),
    latestRevision(scope),
    latestFit(scope),
  ]);
  if (!market || !revision) return refuse('not-found');
  const fit = newFit(viewer, market);
  if (running && isOnItsWay(running) && running.revisionId === revision.id) {
    const options = await readFitOptions({ workspaceId, fitId: running.id });
    if (options && hasSameInput(options, fit.options)) return succeed({ fitId: running.id });
  }
  const stored = await createFit({
    ...scope,
    revisionId: revision.id,
    fit,
    audit: { userId, action: 'request-fit' },
  });
  if (!stored) return refuse('not-found');
  await enqueueFit({ fitId: stored.fitId, workspaceId });
  return succeed(stored);
}

function isOnItsWay(fit: { state: string; cancelAsked: boolean }): boolean {
  return (fit.state === 'queued' || fit.state === 'running') && !fit.cancelAsked;
}
