/** Series revisions: the monthly counts of a market. Inserted, never updated. */
import { createHash } from 'node:crypto';
import { z } from 'zod';
import { toCanonicalText } from '../series/canonical-text';
import type { SeriesContent } from '../series/compare-series';
import { type Exclusion, leaveOut } from '../series/exclusions';
import { formatMonth } from '../series/month';
import type { MonthlySeries } from '../series/types';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma, type Queryable } from './client';
import { insertFit, type NewFit } from './fits';
import { createId } from './ids';
import { readJson } from './json-columns';
import { StoreError } from './store-error';

export interface NewRevision {
  id?: string;
  series: MonthlySeries;
  /** Months of the series that the fit leaves out. */
  exclusions?: readonly Exclusion[];
  fileName: string | null;
  /** SHA-256 of the file's bytes, hex. */
  fileHash?: string | null;
  sourceNote: string | null;
  note?: string | null;
  readingNotes?: readonly string[];
  restoredFrom?: number | null;
  createdById: string | null;
  createdByName?: string | null;
}

export interface RevisionSummary {
  id: string;
  marketId: string;
  /** 1, 2, 3, … within the market. */
  number: number;
  fileName: string | null;
  fileHash: string | null;
  sourceNote: string | null;
  note: string | null;
  readingNotes: string[];
  /** Number of the revision whose content this one brought back. */
  restoredFrom: number | null;
  contentHash: string;
  createdById: string | null;
  /** As the person was called then; null: by the program, or before names were kept. */
  createdByName: string | null;
  createdAt: Date;
}

/** `series` holds every count as it was given; `exclusions` the months of it that the fit leaves out. */
export interface Revision extends RevisionSummary, SeriesContent {}

/** What a list of revisions shows of each one's months. */
export interface RevisionSpan {
  firstMonth: number;
  months: number;
}

export type AddRevisionEnd =
  | { code: 'added'; revisionId: string; revisionNumber: number; fitId: string | null }
  /** Another revision than the one the change was based on is the newest. */
  | { code: 'newer-revision' }
  /** The newest revision holds this content. */
  | { code: 'same-series' };

const SUMMARY = {
  id: true,
  marketId: true,
  number: true,
  fileName: true,
  fileHash: true,
  sourceNote: true,
  note: true,
  readingNotes: true,
  restoredFrom: true,
  contentHash: true,
  createdById: true,
  createdByName: true,
  createdAt: true,
} as const;
const OBSERVATIONS = {
  orderBy: { month: 'asc' },
  select: { month: true, focal: true, rival: true, exclusion: true },
} as const;

const readingNotesSchema = z.array(z.string()).nullable();

/** SHA-256 of the counts, their months and the exclusions: equal for equal content, whatever file it came in. */
export function hashContent({ series, exclusions }: SeriesContent): string {
  const text = toCanonicalText(series);
  const lines = exclusions.map(({ month, reason }) => `-${formatMonth(month)},${JSON.stringify(reason)}\n`);
  return createHash('sha256').update(text).update(lines.sort().join('')).digest('hex');
}

/** What a fit of the revision is made from. @throws StoreError when every month is left out */
export function seriesForFit({ id, series, exclusions }: Revision): MonthlySeries {
  const used = leaveOut(series, exclusions);
  if (!used) throw new StoreError('inconsistent-row', `revision ${id} leaves out every month`);
  return used;
}

/**
 * Adds the next revision of a market and queues a fit of it, together or not at all.
 * @param args.basedOn number of the revision that the change was made from: with another one stored meanwhile, or with the
 * newest one's very content, nothing is stored. Absent: added whatever is there.
 * @returns null when the workspace has no such market
 */
export async function addRevision(args: {
  workspaceId: string;
  marketId: string;
  basedOn?: number;
  revision: NewRevision;
  fit: NewFit | null;
  audit?: Deed;
}): Promise<AddRevisionEnd | null> {
  const { workspaceId, marketId, basedOn, revision, fit, audit } = args;
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
      select: { number: true, contentHash: true },
    });
    if (basedOn !== undefined && last?.number !== basedOn) return { code: 'newer-revision' };
    if (basedOn !== undefined && last?.contentHash === hashContent(contentOf(revision)))
      return { code: 'same-series' };
    const revisionNumber = (last?.number ?? 0) + 1;
    const revisionId = await insertRevision(db, { workspaceId, marketId, number: revisionNumber, revision });
    const fitId = fit ? await insertFit(db, { workspaceId, marketId, revisionId, fit }) : null;
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'revision', subjectId: revisionId });
    return { code: 'added', revisionId, revisionNumber, fitId };
  });
}

/** For the other files of the store, inside their transactions. @returns the revision's id */
export async function insertRevision(
  db: Queryable,
  args: { workspaceId: string; marketId: string; number: number; revision: NewRevision },
): Promise<string> {
  const { workspaceId, marketId, number, revision } = args;
  const { series, exclusions, readingNotes, ...columns } = revision;
  const id = revision.id ?? createId();
  const content = contentOf(revision);
  await db.seriesRevision.create({
    data: {
      ...columns,
      id,
      workspaceId,
      marketId,
      number,
      ...(readingNotes?.length ? { readingNotes: [...readingNotes] } : {}),
      contentHash: hashContent(content),
    },
    select: { id: true },
  });
  await db.observation.createMany({ data: toObservations(id, content) });
  return id;
}

function contentOf({ series, exclusions = [] }: NewRevision): SeriesContent {
  return { series, exclusions };
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

export async function readRevisionByNumber(args: {
  workspaceId: string;
  marketId: string;
  number: number;
}): Promise<Revision | null> {
  const row = await getPrisma().seriesRevision.findFirst({
    where: args,
    select: { ...SUMMARY, observations: OBSERVATIONS },
  });
  return row && toRevision(row);
}

/** Newest first, without the counts. */
export async function listRevisions(args: {
  workspaceId: string;
  marketId: string;
}): Promise<(RevisionSummary & RevisionSpan)[]> {
  const rows = await getPrisma().seriesRevision.findMany({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: { number: 'desc' },
    select: {
      ...SUMMARY,
      observations: { orderBy: { month: 'asc' }, take: 1, select: { month: true } },
      _count: { select: { observations: true } },
    },
  });
  return rows.map(({ observations, _count, ...row }) => ({
    ...toSummary(row),
    firstMonth: observations[0]?.month ?? 0,
    months: _count.observations,
  }));
}

interface ObservationRow {
  month: number;
  focal: number | null;
  rival: number | null;
  exclusion: string | null;
}

type SummaryRow = Omit<RevisionSummary, 'readingNotes'> & { readingNotes: unknown };

function toObservations(
  revisionId: string,
  { series, exclusions }: SeriesContent,
): (ObservationRow & { revisionId: string })[] {
  const { firstMonth, focal, rival } = series;
  if (focal.length !== rival.length) {
    throw new RangeError(`series: focal has ${focal.length} months, rival ${rival.length}`);
  }
  const reasons = new Map(exclusions.map(({ month, reason }) => [month, reason]));
  for (const month of reasons.keys()) {
    if (!(month >= firstMonth && month < firstMonth + focal.length)) {
      throw new RangeError(`exclusions: month ${month} is not in the series`);
    }
  }
  return focal.map((users, i) => {
    const month = firstMonth + i;
    return { revisionId, month, focal: users, rival: rival[i]!, exclusion: reasons.get(month) ?? null };
  });
}

function toSummary(row: SummaryRow): RevisionSummary {
  const notes = readJson(readingNotesSchema, row.readingNotes, 'series_revision.readingNotes', row.id);
  return { ...row, readingNotes: notes ?? [] };
}

function toRevision(row: SummaryRow & { observations: ObservationRow[] }): Revision {
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
  const exclusions = observations.flatMap(({ month, exclusion }) =>
    exclusion === null ? [] : [{ month, reason: exclusion }],
  );
  return { ...toSummary(summary), series, exclusions };
}
