/** The revisions of a market, newest first, and what was made from each: the outlook shown and the forecasts issued. */
import { latestDoneFit } from '../store/fits';
import { listIssuedForecasts } from '../store/issued-forecasts';
import { listRevisions, type RevisionSpan, type RevisionSummary } from '../store/revisions';
import type { Viewer } from './viewer';

export interface HistoryEntry extends RevisionSummary, RevisionSpan {
  /** The outlook that the brief shows was made from it. */
  hasOutlook: boolean;
  /** Forecasts issued from it. */
  issuedCount: number;
}

/** Empty when the workspace has no such market. */
export async function listHistory({ workspaceId }: Viewer, marketId: string): Promise<HistoryEntry[]> {
  const scope = { workspaceId, marketId };
  const [revisions, fit, issued] = await Promise.all([
    listRevisions(scope),
    latestDoneFit(scope),
    listIssuedForecasts(scope),
  ]);
  return revisions.map((revision) => ({
    ...revision,
    hasOutlook: fit?.revisionId === revision.id,
    issuedCount: issued.filter(({ revisionNumber }) => revisionNumber === revision.number).length,
  }));
}
