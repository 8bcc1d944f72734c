/** What a worker does to analyses; `claimed-work.ts` has the rules. */
import {
  type AnalysisKind,
  type AnalysisResult,
  analysisResultSchema,
  isAnalysisKind,
} from './analysis-kinds';
import { type ClaimedWork, createClaimedWork, type WorkClaim, type WorkItem } from './claimed-work';
import { getPrisma } from './client';

export interface ClaimedAnalysis extends WorkClaim {
  revisionId: string;
  fitId: string;
  kind: AnalysisKind;
}

/** Everything that is the same for all work: report, end, release, sweep. */
export const analysisWork: ClaimedWork = createClaimedWork('analysis');

/**
 * Takes a queued analysis; null when it is not there, not queued, of a kind that this version does not know, or another worker
 * was faster.
 */
export async function claimAnalysis(item: WorkItem): Promise<ClaimedAnalysis | null> {
  const row = await getPrisma().analysis.findFirst({
    where: { id: item.id, workspaceId: item.workspaceId },
    select: { kind: true },
  });
  if (!row || !isAnalysisKind(row.kind)) return null;
  const claim = await analysisWork.claim(item);
  if (!claim) return null;
  // Read after the claim: until then a newer fit could still take the place of the old one.
  const claimed = await getPrisma().analysis.findFirst({
    where: { id: item.id, workspaceId: item.workspaceId },
    select: { revisionId: true, fitId: true },
  });
  return claimed && { ...claim, ...claimed, kind: row.kind };
}

/** @throws ZodError when the result is not what the kind gives @returns whether it was stored, as `ClaimedWork.finish` */
export async function finishAnalysis(claim: ClaimedAnalysis, result: AnalysisResult): Promise<boolean> {
  return analysisWork.finish(claim, { result: analysisResultSchema(claim.kind).parse(result) });
}
