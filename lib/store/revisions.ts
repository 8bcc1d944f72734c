/** Series revisions: the monthly counts of a market. Inserted, never updated. */
import { createHash } from 'node:crypto';
import { toCanonicalText } from '../series/canonical-text';
import type { MonthlySeries } from '../series/types';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma, type Queryable } from './client';
import { insertFit, type NewFit } from './fits';
import { createId } from './ids';
import { StoreError } from './store-error';

export interface NewRevision {
  id?: string;
  series: MonthlySeries;
  fileName: string | null;
  sourceNote: string | null;
  createdById: string | null;
}

export interface RevisionSummary {
  id: string;
  marketId: string;
  /** 1, 2, 3, … within the market. */
  number: number;
  fileName: string | null;
  sourceNote: string | null;
  contentHash: string;
  createdById: string | null;
  createdAt: Date;
}

export interface Revision extends RevisionSummary {
  series: MonthlySeries;
}

const SUMMARY = {
  id: true,
  marketId: true,
  number: true,
  fileName: true,
  sourceNote: true,
  contentHash: true,
  createdById: true,
  createdAt: true,
} as const;
const OBSERVATIONS = {
  orderBy: { month: 'asc' },
  select: { month: true, focal: true, rival: true },
} as const;

/** SHA-256 of the counts and their months: equal for equal data, whatever file they came in. */
export function hashSeries(series: MonthlySeries): string {
  return createHash('sha256').update(toCanonicalText(series)).digest('hex');
}

/**
 * Adds the next revision of a market and queues a fit of it, together or not at all.
 * @returns null when the workspace has no such market
 */
export async function addRevision(args: {
  workspaceId: string;
  marketId: string;
  revision: NewRevision;
  fit: NewFit | null;
  audit?: Deed;
}): Promise<{ revisionId: string; revisionNumber: number; fitId: string | null } | null> {
  const { workspaceId, marketId, revision, fit, audit } = args;
  return getPrisma().$transaction(async (db) => {
    // Updating the market's row locks it, so that two uploads at once get two numbers.
    const { count } = await db.market.updateMany({
      where: { id: marketId, workspaceId },
      data: { updatedAt: new Date() },
    });
    if (count !== 1) return null;
    const last = await db.seriesRevision.findFirst({
      where: { marketId, workspaceId },
      orderBy: { number: 'desc' },
      select: { number: true },
    });
    const revisionNumber = (last?.number ?? 0) + 1;
    const revisionId = await insertRevision(db, { workspaceId, marketId, number: revisionNumber, revision });
    const fitId = fit ? await insertFit(db, { workspaceId, marketId, revisionId, fit }) : null;
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'revision', subjectId: revisionId });
    return { revisionId, revisionNumber, fitId };
  });
}

/** For the other files of the store, inside their transactions. @returns the revision's id */
export async function insertRevision(
  db: Queryable,
  args: { workspaceId: string; marketId: string; number: number; revision: NewRevision },
): Promise<string> {
  const { workspaceId, marketId, number, revision } = args;
  const { series, fileName, sourceNote, createdById } = revision;
  const id = revision.id ?? createId();
  await db.seriesRevision.create({
    data: {
      id,
      workspaceId,
      marketId,
      number,
      fileName,
      sourceNote,
      createdById,
      contentHash: hashSeries(series),
    },
    select: { id: true },
  });
  await db.observation.createMany({ data: toObservations(id, series) });
  return id;
}

export async function readRevision(args: {
  workspaceId: string;
  revisionId: string;
}): Promise<Revision | null> {
  const row = await getPrisma().seriesRevision.findFirst({
    where: { id: args.revisionId, workspaceId: args.workspaceId },
    select: { ...SUMMARY, observations: OBSERVATIONS },
  });
  return row && toRevision(row);
}

export async function latestRevision(args: {
  workspaceId: string;
  marketId: string;
}): Promise<Revision | null> {
  const row = await getPrisma().seriesRevision.findFirst({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: { number: 'desc' },
    select: { ...SUMMARY, observations: OBSERVATIONS },
  });
  return row && toRevision(row);
}

/** Newest first, without the counts. */
export async function listRevisions(args: {
  workspaceId: string;
  marketId: string;
}): Promise<RevisionSummary[]> {
  return getPrisma().seriesRevision.findMany({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: { number: 'desc' },
    select: SUMMARY,
  });
}

interface ObservationRow {
  month: number;
  focal: number | null;
  rival: number | null;
}

function toObservations(
  revisionId: string,
  series: MonthlySeries,
): (ObservationRow & { revisionId: string })[] {
  const { firstMonth, focal, rival } = series;
  if (focal.length !== rival.length) {
    throw new RangeError(`series: focal has ${focal.length} months, rival ${rival.length}`);
  }
  return focal.map((users, i) => ({ revisionId, month: firstMonth + i, focal: users, rival: rival[i]! }));
}

function toRevision(row: RevisionSummary & { observations: ObservationRow[] }): Revision {
  const { observations, ...summary } = row;
  const firstMonth = observations[0]?.month;
  if (firstMonth === undefined || observations.some(({ month }, i) => month !== firstMonth + i)) {
    throw new StoreError('inconsistent-row', `revision ${row.id} has no unbroken run of months`);
  }
  const series = {
    firstMonth,
    focal: observations.map(({ focal }) => focal),
    rival: observations.map(({ rival }) => rival),
  };
  return { ...summary, series };
}
