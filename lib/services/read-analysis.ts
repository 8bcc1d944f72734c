/** How an analysis of the outlook that is shown stands, and what it gave; polled by the page while it runs. */
import type { AnalysisProgress } from '../forecast/analysis-run';
import { readAnalysis as readStored } from '../store/analyses';
import type { AnalysisKind, AnalysisResult } from '../store/analysis-kinds';
import { type FitState, latestDoneFit } from '../store/fits';
import { analysisKey } from './analysis-key';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import type { Viewer } from './viewer';

export interface AnalysisStanding<Kind extends AnalysisKind = AnalysisKind> {
  /** 'absent': never asked for, as for an outlook of an earlier version of the engine. */
  state: FitState | 'absent';
  progress: AnalysisProgress | null;
  /** null unless the state is done. */
  result: AnalysisResult<Kind> | null;
  failureCode: string | null;
  /** Cancelling was asked for and has not happened yet. */
  isCancelling: boolean;
}

export async function readAnalysis<Kind extends AnalysisKind>(
  viewer: Viewer,
  marketId: string,
  kind: Kind,
): Promise<Success<AnalysisStanding<Kind>> | Refusal<'no-result'>> {
  const fit = await latestDoneFit({ workspaceId: viewer.workspaceId, marketId });
  return fit ? succeed(await readAnalysisOf(viewer, fit.revisionId, kind)) : refuse('no-result');
}

/** @param revisionId of the fit whose outlook is shown */
export async function readAnalysisOf<Kind extends AnalysisKind>(
  viewer: Viewer,
  revisionId: string,
  kind: Kind,
): Promise<AnalysisStanding<Kind>> {
  const found = await readStored(analysisKey(viewer, revisionId, kind));
  if (!found)
    return { state: 'absent', progress: null, result: null, failureCode: null, isCancelling: false };
  const { state, progress, result, failureCode, cancelAsked } = found;
  return { state, progress, result, failureCode, isCancelling: cancelAsked && state === 'running' };
}
