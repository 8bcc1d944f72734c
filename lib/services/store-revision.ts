/** The last step of every change of a market's counts: the guarded insert, its audit entry, its fit. */
import { enqueueFit } from '../jobs/enqueue-fit';
import type { Market } from '../store/markets';
import { addRevision, type NewRevision } from '../store/revisions';
import { newFit } from './new-fit';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import type { Viewer } from './viewer';

export interface StoredRevision {
  revisionNumber: number;
  fitId: string;
}

interface RevisionChange {
  /** Number of the revision that the change was made from. */
  basedOn: number;
  revision: Omit<NewRevision, 'createdById' | 'createdByName'>;
  action: 'add-revision' | 'restore-revision';
}

export async function storeRevision(
  viewer: Viewer,
  market: Market,
  { basedOn, revision, action }: RevisionChange,
): Promise<Success<StoredRevision> | NotFound | Refusal<'same-series'> | Refusal<'newer-revision'>> {
  const { workspaceId, userId, userName } = viewer;
  const fit = newFit(viewer, market);
  const detail = {
    months: revision.series.focal.length,
    excluded: revision.exclusions?.length ?? 0,
    ...(revision.restoredFrom ? { restoredFrom: revision.restoredFrom } : {}),
  };
  const end = await addRevision({
    workspaceId,
    marketId: market.id,
    basedOn,
    revision: { ...revision, createdById: userId, createdByName: userName },
    fit,
    audit: { userId, action, detail },
  });
  if (!end) return refuse('not-found');
  if (end.code !== 'added') return refuse(end.code);
  await enqueueFit({ fitId: fit.id, workspaceId });
  return succeed({ revisionNumber: end.revisionNumber, fitId: fit.id });
}
