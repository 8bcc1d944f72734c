/**
 * Fits as a page, a service or an export asks for them; `fit-work.ts` has what the worker does.
 * queued -> running -> done | failed | cancelled; a running fit whose worker died goes back to queued.
 * Each change of state is one guarded update whose count is checked, so that of several takers one wins.
 */
import type { Prisma } from '../../prisma/generated/client';
import type { DrawSet, FitOptions, FitProgress } from '../estimate/types';
import { type FitReport, fitReportSchema } from '../forecast/report';
import { analysisWork } from './analysis-work';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma, type Queryable } from './client';
import { decodeDraws } from './draw-bytes';
import { cancelUnfinishedFits } from './fit-work';
import { createId } from './ids';
import { fitOptionsSchema, fitProgressSchema, readJson } from './json-columns';
import { StoreError } from './store-error';

export type FitState = 'queued' | 'running' | 'done' | 'failed' | 'cancelled';

export interface NewFit {
  id?: string;
  options: FitOptions;
  engineVersion: string;
  requestedById: string | null;
}

/** What a page shows of a fit without its result. */
export interface FitView {
  id: string;
  marketId: string;
  revisionId: string;
  state: FitState;
  progress: FitProgress | null;
  /** A FitStatus or an error code when the state is failed, else null. */
  failureCode: string | null;
  /** Somebody asked to cancel; the worker ends it at its next report. */
  cancelAsked: boolean;
  engineVersion: string;
  seed: number;
  createdAt: Date;
  startedAt: Date | null;
  finishedAt: Date | null;
}

/** A fit that ended well. */
export interface DoneFit extends FitView {
  state: 'done';
  options: FitOptions;
  report: FitReport;
}

const VIEW = {
  id: true,
  marketId: true,
  revisionId: true,
  state: true,
  progress: true,
  failureCode: true,
  cancelAsked: true,
  engineVersion: true,
  seed: true,
  createdAt: true,
  startedAt: true,
  finishedAt: true,
} as const satisfies Prisma.FitSelect;
const NEWEST_FIRST = [{ createdAt: 'desc' }, { id: 'desc' }] satisfies Prisma.FitOrderByWithRelationInput[];
const DONE = { ...VIEW, options: true, result: true } as const satisfies Prisma.FitSelect;

/**
 * Queues a fit of a revision of that market.
 * @returns null when the workspace has no such revision of that market
 */
export async function createFit(args: {
  workspaceId: string;
  marketId: string;
  revisionId: string;
  fit: NewFit;
  audit?: Deed;
}): Promise<{ fitId: string } | null> {
  const { workspaceId, marketId, revisionId, fit, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const found = await db.seriesRevision.count({ where: { id: revisionId, marketId, workspaceId } });
    if (found !== 1) return null;
    const fitId = await insertFit(db, { workspaceId, marketId, revisionId, fit });
    if (audit) await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'fit', subjectId: fitId });
    return { fitId };
  });
}

/**
 * For the other files of the store, inside their transactions. Earlier fits of the market that have not ended are
 * cancelled: their answer would be out of date. @returns the fit's id
 */
export async function insertFit(
  db: Queryable,
  args: { workspaceId: string; marketId: string; revisionId: string; fit: NewFit },
): Promise<string> {
  const { fit, ...scope } = args;
  await cancelUnfinishedFits(db, { workspaceId: scope.workspaceId, marketId: scope.marketId });
  await cancelAnalysesOfOthers(db, scope);
  const id = fit.id ?? createId();
  const options: FitOptions = fitOptionsSchema.parse(fit.options);
  await db.fit.create({
    data: {
      id,
      ...scope,
      options: options as unknown as Prisma.InputJsonObject,
      seed: options.seed,
      engineVersion: fit.engineVersion,
      requestedById: fit.requestedById,
    },
    select: { id: true },
  });
  return id;
}

/** 'asked': its worker will end it; 'ended': it had ended well or failed before; null: the workspace has no such fit. */
export async function askCancel(args: {
  workspaceId: string;
  fitId: string;
  audit?: Deed;
}): Promise<'cancelled' | 'asked' | 'ended' | null> {
  const { fitId: id, workspaceId, audit } = args;
  return getPrisma().$transaction(async (db) => {
    await cancelUnfinishedFits(db, { id, workspaceId });
    const row = await db.fit.findFirst({ where: { id, workspaceId }, select: { state: true } });
    if (!row) return null;
    if (row.state !== 'running' && row.state !== 'cancelled') return 'ended';
    if (audit) await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'fit', subjectId: id });
    return row.state === 'running' ? 'asked' : 'cancelled';
  });
}

/** Analyses of the market's other revisions would answer for counts that nobody looks at any more. */
async function cancelAnalysesOfOthers(
  db: Queryable,
  { workspaceId, marketId, revisionId }: { workspaceId: string; marketId: string; revisionId: string },
): Promise<void> {
  await analysisWork.cancelUnfinished(db, { workspaceId, marketId, revisionId: { not: revisionId } });
}

/** Whether two fits of one revision give the same numbers, by the same version of the engine. */
export function hasSameInput(a: FitOptions, b: FitOptions): boolean {
  return JSON.stringify(fitOptionsSchema.parse(a)) === JSON.stringify(fitOptionsSchema.parse(b));
}

/** @returns null when the workspace has no such fit */
export async function readFitOptions(args: {
  workspaceId: string;
  fitId: string;
}): Promise<FitOptions | null> {
  const { workspaceId, fitId: id } = args;
  const row = await getPrisma().fit.findFirst({ where: { id, workspaceId }, select: { options: true } });
  return row && readJson(fitOptionsSchema, row.options, 'fit.options', id);
}

export async function readFit(args: { workspaceId: string; fitId: string }): Promise<FitView | null> {
  const row = await getPrisma().fit.findFirst({
    where: { id: args.fitId, workspaceId: args.workspaceId },
    select: VIEW,
  });
  return row && toView(row);
}

/** The newest fit of a market, in whatever state. */
export async function latestFit(args: { workspaceId: string; marketId: string }): Promise<FitView | null> {
  const row = await getPrisma().fit.findFirst({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: NEWEST_FIRST,
    select: VIEW,
  });
  return row && toView(row);
}

/** The newest fit of a market that ended well, with its report. */
export async function latestDoneFit(args: {
  workspaceId: string;
  marketId: string;
}): Promise<DoneFit | null> {
  const row = await getPrisma().fit.findFirst({
    where: { marketId: args.marketId, workspaceId: args.workspaceId, state: 'done' },
    orderBy: NEWEST_FIRST,
    select: DONE,
  });
  return row && toDoneFit(row);
}

/** null: no such fit in the workspace, or it has not ended well. */
export async function readDoneFit(args: { workspaceId: string; fitId: string }): Promise<DoneFit | null> {
  const row = await getPrisma().fit.findFirst({
    where: { id: args.fitId, workspaceId: args.workspaceId, state: 'done' },
    select: DONE,
  });
  return row && toDoneFit(row);
}

/** All posterior draws of a fit; null: no such fit in the workspace, or it has none. */
export async function readDraws(args: { workspaceId: string; fitId: string }): Promise<DrawSet | null> {
  const row = await getPrisma().fit.findFirst({
    where: { id: args.fitId, workspaceId: args.workspaceId, state: 'done' },
    select: { draws: true, drawColumns: true, options: true },
  });
  if (!row?.draws) return null;
  const values = decodeDraws(row.draws);
  const count = values.length / row.drawColumns.length;
  if (!Number.isInteger(count)) {
    throw new StoreError(
      'inconsistent-row',
      `draws of fit ${args.fitId} do not fill rows of ${row.drawColumns.length}`,
    );
  }
  const { errorModel } = readJson(fitOptionsSchema, row.options, 'fit.options', args.fitId);
  return { errorModel, columns: row.drawColumns, count, values };
}

type ViewRow = Prisma.FitGetPayload<{ select: typeof VIEW }>;
type DoneRow = Prisma.FitGetPayload<{ select: typeof DONE }>;

/** For the other files of the store. */
export const FIT_VIEW_COLUMNS = VIEW;

/** For the other files of the store. */
export function toView(row: ViewRow): FitView {
  return { ...row, progress: readJson(fitProgressSchema.nullable(), row.progress, 'fit.progress', row.id) };
}

function toDoneFit(row: DoneRow): DoneFit {
  const { options, result, ...view } = row;
  return {
    ...toView(view),
    state: 'done',
    options: readJson(fitOptionsSchema, options, 'fit.options', row.id),
    report: readJson(fitReportSchema, result, 'fit.result', row.id),
  };
}
