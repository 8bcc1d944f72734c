/**
 * What a worker does to a row of work (a fit, an analysis): claim it, report, end it, and sweep up after workers that died.
 *
 * A claim is numbered by `attempt`. Every later write names it, so a worker that was given up for dead and comes back
 * can no longer write: its work belongs to somebody else. Only a claim and the sweep are not scoped by a workspace's
 * member; they act for the system.
 */
import type { FitState } from '../../prisma/generated/enums';
import { getPrisma, type Queryable } from './client';

export interface WorkItem {
  id: string;
  workspaceId: string;
}

/** Names the claim in every later write. */
export interface WorkClaim extends WorkItem {
  /** 1 for the first worker that took it, 2 for the second, … */
  attempt: number;
}

/** What the worker must do after a report: 'cancel' ends the work as cancelled, 'lost' means that it is no longer this worker's. */
export type WorkOrder = 'go-on' | 'cancel' | 'lost';

/** Failure code of work that took down every worker that tried it. */
export const GAVE_UP = 'gave-up';

export interface SweepLimits {
  silentSeconds: number;
  maxAttempts: number;
  /** Work of the sweeping worker itself. */
  exceptId?: string | null;
}

/** Columns that every table of work has. */
interface WorkColumns {
  state: FitState;
  attempts: number;
  cancelAsked: boolean;
  failureCode: string | null;
  startedAt: Date | null;
  heartbeatAt: Date | null;
  finishedAt: Date | null;
}
type WorkData = { [Column in keyof WorkColumns]?: WorkColumns[Column] | { increment: 1 } | { decrement: 1 } };

/** The part of a Prisma delegate that is used here; its own type cannot be abstracted over tables. */
interface WorkTable {
  updateMany(args: { where: object; data: object }): Promise<{ count: number }>;
  updateManyAndReturn(args: {
    where: object;
    data: object;
    select: object;
  }): Promise<Record<string, unknown>[]>;
  findMany(args: {
    where: object;
    orderBy: object[];
    take: number;
    select: object;
  }): Promise<Record<string, unknown>[]>;
}

export interface ClaimedWork {
  /** Takes a queued row; null when it is not there, not queued, or another worker was faster. */
  claim(item: WorkItem): Promise<WorkClaim | null>;
  /** Stores how far it is, when given; counts as a heartbeat. */
  report(claim: WorkClaim, progress?: object): Promise<WorkOrder>;
  /** @param data columns of the result @returns whether it was stored: not when it was cancelled or lost in the meantime */
  finish(claim: WorkClaim, data: object): Promise<boolean>;
  /** @returns false when it was lost */
  fail(claim: WorkClaim, failureCode: string): Promise<boolean>;
  /** @returns false when it was lost */
  endCancelled(claim: WorkClaim): Promise<boolean>;
  /** Gives it back, for a worker that is told to stop; this claim does not count as an attempt. @returns false when it was lost */
  release(claim: WorkClaim): Promise<boolean>;
  /**
   * Running work whose worker has not reported for so long goes back to queued, ends as cancelled where that was asked, or
   * fails with GAVE_UP after `maxAttempts` workers. Safe to run in several workers at once.
   * @returns what to queue again
   */
  sweep(limits: SweepLimits): Promise<WorkItem[]>;
  /** Queued work of all workspaces, oldest first: it may have lost its job. */
  listQueued(args: { limit: number }): Promise<WorkItem[]>;
  /** Ends waiting work at once and has running work ended by its worker. */
  cancelUnfinished(db: Queryable, where: object): Promise<void>;
}

const BACK_TO_QUEUE = { state: 'queued', startedAt: null, heartbeatAt: null } as const satisfies WorkData;
const ITEM = { id: true, workspaceId: true };

export function createClaimedWork(name: 'fit' | 'analysis'): ClaimedWork {
  const tableOf = (db: Queryable) => db[name] as unknown as WorkTable;
  const table = () => tableOf(getPrisma());

  async function update(where: object, data: WorkData): Promise<boolean> {
    const { count } = await table().updateMany({ where, data });
    return count === 1;
  }

  return {
    async claim(item) {
      const now = new Date();
      const data = {
        state: 'running',
        attempts: { increment: 1 },
        startedAt: now,
        heartbeatAt: now,
      } as const;
      const where = { id: item.id, workspaceId: item.workspaceId, state: 'queued' };
      const [row] = await table().updateManyAndReturn({
        where,
        data: data satisfies WorkData,
        select: { attempts: true },
      });
      return row ? { ...item, attempt: row.attempts as number } : null;
    },
    async report(claim, progress) {
      const data = { ...(progress && { progress }), heartbeatAt: new Date() };
      const [row] = await table().updateManyAndReturn({
        where: ownedBy(claim),
        data,
        select: { cancelAsked: true },
      });
      if (!row) return 'lost';
      return row.cancelAsked ? 'cancel' : 'go-on';
    },
    async finish(claim, result) {
      const data = { ...result, state: 'done', finishedAt: new Date() } as const;
      return update({ ...ownedBy(claim), cancelAsked: false }, data);
    },
    fail: (claim, failureCode) =>
      update(ownedBy(claim), { state: 'failed', failureCode, finishedAt: new Date() }),
    endCancelled: (claim) => update(ownedBy(claim), { state: 'cancelled', finishedAt: new Date() }),
    release: (claim) => update(ownedBy(claim), { ...BACK_TO_QUEUE, attempts: { decrement: 1 } }),
    sweep: (limits) => getPrisma().$transaction((db) => sweepTable(tableOf(db), limits)),
    async listQueued({ limit }) {
      const orderBy = [{ createdAt: 'asc' }, { id: 'asc' }];
      const rows = await table().findMany({
        where: { state: 'queued' },
        orderBy,
        take: limit,
        select: ITEM,
      });
      return rows.map(toItem);
    },
    async cancelUnfinished(db, where) {
      const ended = { state: 'cancelled', cancelAsked: true, finishedAt: new Date() } satisfies WorkData;
      await tableOf(db).updateMany({ where: { ...where, state: 'queued' }, data: ended });
      await tableOf(db).updateMany({ where: { ...where, state: 'running' }, data: { cancelAsked: true } });
    },
  };
}

async function sweepTable(table: WorkTable, limits: SweepLimits): Promise<WorkItem[]> {
  const finishedAt = new Date();
  const silent = {
    state: 'running',
    heartbeatAt: { lt: new Date(finishedAt.getTime() - limits.silentSeconds * 1000) },
    ...(limits.exceptId && { id: { not: limits.exceptId } }),
  };
  const cancelled = { state: 'cancelled', finishedAt } satisfies WorkData;
  await table.updateMany({ where: { ...silent, cancelAsked: true }, data: cancelled });
  const failed = { state: 'failed', failureCode: GAVE_UP, finishedAt } satisfies WorkData;
  await table.updateMany({ where: { ...silent, attempts: { gte: limits.maxAttempts } }, data: failed });
  const rows = await table.updateManyAndReturn({ where: silent, data: BACK_TO_QUEUE, select: ITEM });
  return rows.map(toItem);
}

function toItem(row: Record<string, unknown>): WorkItem {
  return { id: row.id as string, workspaceId: row.workspaceId as string };
}

function ownedBy(claim: WorkClaim): object {
  return { id: claim.id, workspaceId: claim.workspaceId, state: 'running', attempts: claim.attempt };
}
