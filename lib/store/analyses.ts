/**
 * Analyses as a page or a service asks for them; `analysis-work.ts` has what the worker does.
 * There is one row per revision, kind and version of the engine: the same input gives the same numbers, so a result is kept
 * for all later readers. Asking again after a failure or a cancel starts the same row anew.
 */
import { Prisma } from '../../prisma/generated/client';
import { type AnalysisProgress, analysisProgressSchema } from '../forecast/analysis-run';
import { type AnalysisKind, type AnalysisResult, analysisResultSchema } from './analysis-kinds';
import { createClaimedWork } from './claimed-work';
import { getPrisma } from './client';
import { type FitState, hasSameInput } from './fits';
import { createId } from './ids';
import { fitOptionsSchema, readJson } from './json-columns';

const work = createClaimedWork('analysis');

export interface AnalysisView<Kind extends AnalysisKind = AnalysisKind> {
  id: string;
  kind: Kind;
  state: FitState;
  progress: AnalysisProgress | null;
  /** null unless the state is done. */
  result: AnalysisResult<Kind> | null;
  failureCode: string | null;
  /** Somebody asked to cancel; the worker ends it at its next report. */
  cancelAsked: boolean;
}

export interface AnalysisKey {
  workspaceId: string;
  revisionId: string;
  kind: AnalysisKind;
  engineVersion: string;
}

const VIEW = {
  id: true,
  state: true,
  progress: true,
  result: true,
  failureCode: true,
  cancelAsked: true,
} as const satisfies Prisma.AnalysisSelect;

/** When a row that is there already is started anew: 'changed' only when the options of the fit differ, 'ended' also after a failure or a cancel. */
export type StartAnew = 'changed' | 'ended';

/**
 * Queues an analysis of a fit that ended well, unless the same one is there.
 * @returns the id, and whether a worker is needed; null when the workspace has no such fit
 */
export async function ensureAnalysis(args: {
  workspaceId: string;
  fitId: string;
  kind: AnalysisKind;
  engineVersion: string;
  startAnew: StartAnew;
}): Promise<{ analysisId: string; isQueued: boolean } | null> {
  const { workspaceId, fitId, kind, engineVersion, startAnew } = args;
  return getPrisma().$transaction(async (db) => {
    const fit = await db.fit.findFirst({
      where: { id: fitId, workspaceId, state: 'done' },
      select: { marketId: true, revisionId: true, options: true },
    });
    if (!fit) return null;
    const { marketId, revisionId } = fit;
    const key = { revisionId, kind, engineVersion };
    const fresh = { id: createId(), workspaceId, marketId, fitId, ...key };
    const { count } = await db.analysis.createMany({ data: [fresh], skipDuplicates: true });
    if (count === 1) return { analysisId: fresh.id, isQueued: true };
    const row = await db.analysis.findUniqueOrThrow({
      where: { revisionId_kind_engineVersion: key },
      select: { id: true, state: true, fit: { select: { options: true } } },
    });
    const isSame = hasSameInput(
      readJson(fitOptionsSchema, row.fit.options, 'fit.options', fitId),
      readJson(fitOptionsSchema, fit.options, 'fit.options', fitId),
    );
    const hasEnded = row.state === 'failed' || row.state === 'cancelled';
    if (isSame && !(startAnew === 'ended' && hasEnded))
      return { analysisId: row.id, isQueued: row.state === 'queued' };
    // A worker that still holds it loses its claim: the state is queued again, and the next claim has another number.
    await db.analysis.updateMany({
      where: { id: row.id, workspaceId },
      data: {
        fitId,
        state: 'queued',
        cancelAsked: false,
        failureCode: null,
        progress: Prisma.DbNull,
        startedAt: null,
        heartbeatAt: null,
        finishedAt: null,
      },
    });
    return { analysisId: row.id, isQueued: true };
  });
}

/**
 * Fits that ended well, are of their market's newest revision and of this version of the engine, and have no analysis of this kind: they
 * were made before there was one, or their worker died before it could ask.
 */
export async function listFitsWithoutAnalysis(args: {
  kind: AnalysisKind;
  engineVersion: string;
  limit: number;
}): Promise<{ fitId: string; workspaceId: string }[]> {
  const { kind, engineVersion, limit } = args;
  const rows = await getPrisma().fit.findMany({
    where: {
      state: 'done',
      engineVersion,
      market: { archivedAt: null },
      revision: { analyses: { none: { kind, engineVersion } } },
    },
    orderBy: { finishedAt: 'desc' },
    distinct: ['revisionId'],
    take: limit,
    select: {
      id: true,
      workspaceId: true,
      revisionId: true,
      market: { select: { revisions: { orderBy: { number: 'desc' }, take: 1, select: { id: true } } } },
    },
  });
  return rows
    .filter(({ revisionId, market }) => market.revisions[0]?.id === revisionId)
    .map(({ id, workspaceId }) => ({ fitId: id, workspaceId }));
}

/** null: never asked for. */
export async function readAnalysis<Kind extends AnalysisKind>(
  key: AnalysisKey & { kind: Kind },
): Promise<AnalysisView<Kind> | null> {
  const { workspaceId, revisionId, kind, engineVersion } = key;
  const row = await getPrisma().analysis.findFirst({
    where: { workspaceId, revisionId, kind, engineVersion },
    select: VIEW,
  });
  if (!row) return null;
  return {
    ...row,
    kind,
    progress: readJson(analysisProgressSchema.nullable(), row.progress, 'analysis.progress', row.id),
    // A row that was started anew still holds its old result.
    result:
      row.state === 'done'
        ? readJson(analysisResultSchema(kind), row.result, 'analysis.result', row.id)
        : null,
  };
}

/** Ends a waiting analysis at once and has a running one ended by its worker. @returns whether there was one that had not ended */
export async function cancelAnalysis(key: AnalysisKey): Promise<boolean> {
  const { workspaceId, revisionId, kind, engineVersion } = key;
  const where = { workspaceId, revisionId, kind, engineVersion };
  return getPrisma().$transaction(async (db) => {
    const running = await db.analysis.count({ where: { ...where, state: { in: ['queued', 'running'] } } });
    if (running === 0) return false;
    await work.cancelUnfinished(db, where);
    return true;
  });
}
