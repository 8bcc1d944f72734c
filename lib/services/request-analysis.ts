/**
 * Has an analysis made of the outlook that is shown. It starts by itself after a fit; this starts it again after a failure or a cancel.
 * Asking while it is on its way, or when it is there, changes nothing.
 */
import { ENGINE_VERSION } from '../estimate/engine-version';
import { enqueueAnalysis } from '../jobs/enqueue-analysis';
import { ensureAnalysis } from '../store/analyses';
import { type AnalysisKind, isAnalysisKind } from '../store/analysis-kinds';
import { addAuditEntry } from '../store/audit';
import { latestDoneFit } from '../store/fits';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function requestAnalysis(
  viewer: Viewer,
  marketId: string,
  kind: AnalysisKind,
): Promise<Success<{ analysisId: string }> | NotAllowed | NotFound | Refusal<'no-result'>> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  // it came through a form
  if (!isAnalysisKind(kind)) return refuse('not-found');
  const { workspaceId, userId } = viewer;
  const fit = await latestDoneFit({ workspaceId, marketId });
  if (!fit) return refuse('no-result');
  const asked = await ensureAnalysis({
    workspaceId,
    fitId: fit.id,
    kind,
    engineVersion: ENGINE_VERSION,
    startAnew: 'ended',
  });
  if (!asked) return refuse('not-found');
  const { analysisId, isQueued } = asked;
  if (isQueued) {
    const detail = { kind };
    await addAuditEntry({
      workspaceId,
      userId,
      action: 'request-analysis',
      subjectType: 'analysis',
      subjectId: analysisId,
      detail,
    });
    await enqueueAnalysis({ id: analysisId, workspaceId });
  }
  return succeed({ analysisId });
}
