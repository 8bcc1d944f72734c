/** What a worker does to fits; `claimed-work.ts` has the rules. */
import type { Prisma } from '../../prisma/generated/client';
import type { DrawSet, FitOptions, FitProgress } from '../estimate/types';
import { type FitReport, fitReportSchema } from '../forecast/report';
import { createClaimedWork, type SweepLimits, type WorkItem, type WorkOrder } from './claimed-work';
import { getPrisma, type Queryable } from './client';
import { encodeDraws } from './draw-bytes';
import { fitOptionsSchema, readJson } from './json-columns';

export interface FitJob {
  fitId: string;
  workspaceId: string;
}

/** Names the claim in every later write. */
export interface FitClaim extends FitJob {
  /** 1 for the first worker that took it, 2 for the second, … */
  attempt: number;
}

export interface ClaimedFit extends FitClaim {
  marketId: string;
  revisionId: string;
  options: FitOptions;
  engineVersion: string;
}

const work = createClaimedWork('fit');

/** Takes a queued fit; null when it is not there, not queued, or another worker was faster. */
export async function claimFit(job: FitJob): Promise<ClaimedFit | null> {
  const claim = await work.claim(toItem(job));
  if (!claim) return null;
  const row = await getPrisma().fit.findFirst({
    where: { id: job.fitId, workspaceId: job.workspaceId },
    select: { marketId: true, revisionId: true, options: true, engineVersion: true },
  });
  if (!row) return null;
  const options = readJson(fitOptionsSchema, row.options, 'fit.options', job.fitId);
  return { ...job, ...row, attempt: claim.attempt, options };
}

/** Stores how far it is; counts as a heartbeat. */
export async function saveProgress(claim: FitClaim, progress: FitProgress): Promise<WorkOrder> {
  return work.report(toClaim(claim), progress);
}

export async function beatHeart(claim: FitClaim): Promise<WorkOrder> {
  return work.report(toClaim(claim));
}

/**
 * Stores the result, unless the fit was cancelled or lost in the meantime.
 * @returns whether it was stored; after false the worker asks `beatHeart` what to do
 */
export async function finishFit(
  claim: FitClaim,
  result: { report: FitReport; draws: DrawSet },
): Promise<boolean> {
  const { draws } = result;
  return work.finish(toClaim(claim), {
    result: fitReportSchema.parse(result.report),
    draws: encodeDraws(draws.values),
    drawColumns: draws.columns,
  } satisfies Prisma.FitUpdateManyMutationInput);
}

/** @param failureCode a FitStatus that is not usable, or the code of an error @returns false when the fit was lost */
export async function failFit(claim: FitClaim, failureCode: string): Promise<boolean> {
  return work.fail(toClaim(claim), failureCode);
}

/** @returns false when the fit was lost */
export async function endCancelledFit(claim: FitClaim): Promise<boolean> {
  return work.endCancelled(toClaim(claim));
}

/** Gives a claimed fit back, for a worker that is told to stop. @returns false when the fit was lost */
export async function releaseFit(claim: FitClaim): Promise<boolean> {
  return work.release(toClaim(claim));
}

/** Takes fits of silent workers back. @returns the fits to queue again */
export async function sweepFits(limits: SweepLimits): Promise<FitJob[]> {
  return (await work.sweep(limits)).map(toJob);
}

/** Queued fits of all workspaces, oldest first: work that may have lost its job. */
export async function listQueuedFits(args: { limit: number }): Promise<FitJob[]> {
  return (await work.listQueued(args)).map(toJob);
}

/** For the other files of the store, inside their transactions. */
export async function cancelUnfinishedFits(db: Queryable, where: Prisma.FitWhereInput): Promise<void> {
  await work.cancelUnfinished(db, where);
}

function toJob({ id, workspaceId }: WorkItem): FitJob {
  return { fitId: id, workspaceId };
}

function toItem({ fitId, workspaceId }: FitJob): WorkItem {
  return { id: fitId, workspaceId };
}

function toClaim(claim: FitClaim) {
  return { ...toItem(claim), attempt: claim.attempt };
}
