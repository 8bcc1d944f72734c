/**
 * What a worker does to fits: claim one, report, end it, and sweep up after workers that died.
 *
 * A claim is numbered by `attempt`. Every later write names it, so a worker that was given up for dead and comes back
 * can no longer write: its fit belongs to somebody else. Only a claim and the sweep are not scoped by a workspace's
 * member; they act for the system.
 */
import type { Prisma } from '../../prisma/generated/client';
import type { DrawSet, FitOptions, FitProgress } from '../estimate/types';
import { type FitReport, fitReportSchema } from '../forecast/report';
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

/** What the worker must do after a report: 'cancel' ends the fit as cancelled, 'lost' means that it is no longer this worker's. */
export type FitOrder = 'go-on' | 'cancel' | 'lost';

/** Takes a queued fit; null when it is not there, not queued, or another worker was faster. */
export async function claimFit(job: FitJob): Promise<ClaimedFit | null> {
  const now = new Date();
  const [row] = await getPrisma().fit.updateManyAndReturn({
    where: { id: job.fitId, workspaceId: job.workspaceId, state: 'queued' },
    data: { state: 'running', attempts: { increment: 1 }, startedAt: now, heartbeatAt: now },
    select: { marketId: true, revisionId: true, options: true, engineVersion: true, attempts: true },
  });
  if (!row) return null;
  const { attempts, options, ...columns } = row;
  return {
    ...job,
    ...columns,
    attempt: attempts,
    options: readJson(fitOptionsSchema, options, 'fit.options', job.fitId),
  };
}

/** Stores how far it is; counts as a heartbeat. */
export async function saveProgress(claim: FitClaim, progress: FitProgress): Promise<FitOrder> {
  return report(claim, { progress: progress as unknown as Prisma.InputJsonObject });
}

export async function beatHeart(claim: FitClaim): Promise<FitOrder> {
  return report(claim, {});
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
  const { count } = await getPrisma().fit.updateMany({
    where: { ...ownedBy(claim), cancelAsked: false },
    data: {
      state: 'done',
      finishedAt: new Date(),
      result: fitReportSchema.parse(result.report) as Prisma.InputJsonObject,
      draws: encodeDraws(draws.values),
      drawColumns: draws.columns,
    },
  });
  return count === 1;
}

/** @param failureCode a FitStatus that is not usable, or the code of an error @returns false when the fit was lost */
export async function failFit(claim: FitClaim, failureCode: string): Promise<boolean> {
  return end(claim, { state: 'failed', failureCode });
}

/** @returns false when the fit was lost */
export async function endCancelledFit(claim: FitClaim): Promise<boolean> {
  return end(claim, { state: 'cancelled' });
}

/**
 * Gives a claimed fit back, for a worker that is told to stop; this claim does not count as an attempt.
 * @returns false when the fit was lost
 */
export async function releaseFit(claim: FitClaim): Promise<boolean> {
  const { count } = await getPrisma().fit.updateMany({
    where: ownedBy(claim),
    data: { state: 'queued', attempts: { decrement: 1 }, startedAt: null, heartbeatAt: null },
  });
  return count === 1;
}

/** Failure code of a fit that took down every worker that tried it. */
export const GAVE_UP = 'gave-up';

/**
 * Running fits whose worker has not reported for so long go back to queued, end as cancelled where that was asked, or
 * fail with GAVE_UP after `maxAttempts` workers. Safe to run in several workers at once.
 * @returns the fits to queue again
 */
export async function sweepFits(args: { silentSeconds: number; maxAttempts: number }): Promise<FitJob[]> {
  const finishedAt = new Date();
  const silent = {
    state: 'running',
    heartbeatAt: { lt: new Date(finishedAt.getTime() - args.silentSeconds * 1000) },
  } satisfies Prisma.FitWhereInput;
  return getPrisma().$transaction(async (db) => {
    await db.fit.updateMany({
      where: { ...silent, cancelAsked: true },
      data: { state: 'cancelled', finishedAt },
    });
    await db.fit.updateMany({
      where: { ...silent, attempts: { gte: args.maxAttempts } },
      data: { state: 'failed', failureCode: GAVE_UP, finishedAt },
    });
    return requeue(db, silent);
  });
}

/** Queued fits of all workspaces, oldest first: work that may have lost its job. */
export async function listQueuedFits(args: { limit: number }): Promise<FitJob[]> {
  const rows = await getPrisma().fit.findMany({
    where: { state: 'queued' },
    orderBy: [{ createdAt: 'asc' }, { id: 'asc' }],
    take: args.limit,
    select: { id: true, workspaceId: true },
  });
  return rows.map(toJob);
}

async function requeue(db: Queryable, where: Prisma.FitWhereInput): Promise<FitJob[]> {
  const rows = await db.fit.updateManyAndReturn({
    where,
    data: { state: 'queued', startedAt: null, heartbeatAt: null },
    select: { id: true, workspaceId: true },
  });
  return rows.map(toJob);
}

function toJob(row: { id: string; workspaceId: string }): FitJob {
  return { fitId: row.id, workspaceId: row.workspaceId };
}

function ownedBy(claim: FitClaim): Prisma.FitWhereInput {
  return { id: claim.fitId, workspaceId: claim.workspaceId, state: 'running', attempts: claim.attempt };
}

async function report(claim: FitClaim, data: { progress?: Prisma.InputJsonObject }): Promise<FitOrder> {
  const [row] = await getPrisma().fit.updateManyAndReturn({
    where: ownedBy(claim),
    data: { ...data, heartbeatAt: new Date() },
    select: { cancelAsked: true },
  });
  if (!row) return 'lost';
  return row.cancelAsked ? 'cancel' : 'go-on';
}

async function end(claim: FitClaim, data: Prisma.FitUpdateManyMutationInput): Promise<boolean> {
  const { count } = await getPrisma().fit.updateMany({
    where: ownedBy(claim),
    data: { ...data, finishedAt: new Date() },
  });
  return count === 1;
}
