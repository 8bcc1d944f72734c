/** One fit, from claim to end. */
import { thinDraws } from '../estimate/draws';
import type { FitInput } from '../estimate/types';
import type { OutlookRun, OutlookStep } from '../forecast/outlook-run';
import { fitReportSchema } from '../forecast/report';
import {
  beatHeart,
  claimFit,
  endCancelledFit,
  type FitJob,
  failFit,
  finishFit,
  releaseFit,
  saveProgress,
} from '../store/fit-work';
import { readRevision, seriesForFit } from '../store/revisions';
import { driveRun, type JobEnd, type JobTools } from './drive-run';
import type { FailureCode } from './failure';

/** Draws kept with a fit: 2,000 rows of some 16 columns are 256 kB, and put 90 % bounds within a percentile. */
export const STORED_DRAWS = 2000;

export interface FitJobTools extends JobTools {
  createRun: (input: FitInput) => OutlookRun;
}

/** @throws whatever the database throws; the fit then stays "running" and silent until a sweep takes it back. */
export async function runFitJob(job: FitJob, tools: FitJobTools): Promise<JobEnd> {
  const claim = await claimFit(job);
  const revision = claim && (await readRevision(claim));
  if (!claim || !revision) return 'not-mine';
  return driveRun<OutlookStep>(
    {
      id: claim.fitId,
      createRun: () => tools.createRun({ series: seriesForFit(revision), options: claim.options }),
      readEnd: (end) => {
        if ('failure' in end) return { failure: end.failure satisfies FailureCode };
        const report = fitReportSchema.parse(end.report);
        const draws = thinDraws(end.draws, STORED_DRAWS);
        return { store: () => finishFit(claim, { report, draws }) };
      },
      report: (progress) => (progress ? saveProgress(claim, progress) : beatHeart(claim)),
      fail: (code) => failFit(claim, code),
      endCancelled: () => endCancelledFit(claim),
      release: () => releaseFit(claim),
    },
    tools,
  );
}
