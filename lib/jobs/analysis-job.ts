/** One analysis, from claim to end, and the asking for those that follow a fit. */
import { ENGINE_VERSION } from '../estimate/engine-version';
import type { AnalysisInput, AnalysisStep } from '../forecast/analysis-run';
import { ensureAnalysis, listFitsWithoutAnalysis } from '../store/analyses';
import { type AnalysisKind, type AnalysisResult, analysisResultSchema } from '../store/analysis-kinds';
import { analysisWork, type ClaimedAnalysis, claimAnalysis, finishAnalysis } from '../store/analysis-work';
import type { WorkItem } from '../store/claimed-work';
import type { FitJob } from '../store/fit-work';
import { readDoneFit, readDraws } from '../store/fits';
import { readRevision, seriesForFit } from '../store/revisions';
import type { AnalysisRuns } from './analysis-runs';
import { driveRun, type JobEnd, type JobTools } from './drive-run';

export interface AnalysisJobTools extends JobTools {
  runs: AnalysisRuns;
}

/** @throws whatever the database throws; the analysis then stays "running" and silent until a sweep takes it back. */
export async function runAnalysisJob(item: WorkItem, tools: AnalysisJobTools): Promise<JobEnd> {
  const claim = await claimAnalysis(item);
  const createRun = claim && tools.runs[claim.kind];
  const input = claim && (await readInput(claim));
  if (!claim || !createRun || !input) return 'not-mine';
  return driveRun<AnalysisStep<AnalysisResult>>(
    {
      id: claim.id,
      createRun: () => createRun(input),
      readEnd: (end) => {
        if ('failure' in end) return { failure: end.failure };
        const result = analysisResultSchema(claim.kind).parse(end.result);
        return { store: () => finishAnalysis(claim, result) };
      },
      report: (progress) => analysisWork.report(claim, progress),
      fail: (code) => analysisWork.fail(claim, code),
      endCancelled: () => analysisWork.endCancelled(claim),
      release: () => analysisWork.release(claim),
    },
    tools,
  );
}

async function readInput(claim: ClaimedAnalysis): Promise<AnalysisInput | null> {
  const [revision, fit, draws] = await Promise.all([
    readRevision(claim),
    readDoneFit(claim),
    readDraws(claim),
  ]);
  if (!revision || !fit || !draws) return null;
  return { series: seriesForFit(revision), options: fit.options, report: fit.report, draws };
}

/** Has everything made that follows a fit that ended well. @returns what a worker must be sent for */
export async function requestAnalysesAfter(job: FitJob, runs: AnalysisRuns): Promise<WorkItem[]> {
  const items: WorkItem[] = [];
  for (const kind of Object.keys(runs) as AnalysisKind[]) {
    const asked = await ensureAnalysis({ ...job, kind, engineVersion: ENGINE_VERSION, startAnew: 'changed' });
    if (asked?.isQueued) items.push({ id: asked.analysisId, workspaceId: job.workspaceId });
  }
  return items;
}

/** The same for fits that were left without, see `listFitsWithoutAnalysis`; what is queued here finds a worker as all waiting work does. */
export async function requestMissingAnalyses(runs: AnalysisRuns, limit: number): Promise<void> {
  for (const kind of Object.keys(runs) as AnalysisKind[]) {
    const fits = await listFitsWithoutAnalysis({ kind, engineVersion: ENGINE_VERSION, limit });
    for (const fit of fits)
      await ensureAnalysis({ ...fit, kind, engineVersion: ENGINE_VERSION, startAnew: 'changed' });
  }
}
