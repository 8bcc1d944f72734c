/** Cancels an analysis that is waiting or running. A running one ends at its worker's next report. */
import { cancelAnalysis as cancelStored } from '../store/analyses';
import type { AnalysisKind } from '../store/analysis-kinds';
import { latestDoneFit } from '../store/fits';
import { analysisKey } from './analysis-key';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import type { NotAllowed } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function cancelAnalysis(
  viewer: Viewer,
  marketId: string,
  kind: AnalysisKind,
): Promise<Success<null> | NotAllowed | Refusal<'nothing-running'>> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const fit = await latestDoneFit({ workspaceId: viewer.workspaceId, marketId });
  const isCancelled = fit !== null && (await cancelStored(analysisKey(viewer, fit.revisionId, kind)));
  return isCancelled ? succeed(null) : refuse('nothing-running');
}
