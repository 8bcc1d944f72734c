/** Issued forecasts: outlooks frozen as they were. Inserted, never updated. */
import type { Prisma } from '../../prisma/generated/client';
import { type IssuedForecast, issuedForecastSchema } from '../issue/format';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { FORECAST_LINK_COLUMNS, type ForecastLink } from './forecast-links';
import { createId } from './ids';
import { readIssuedContent } from './issued-content';

export interface StoredForecast {
  id: string;
  marketId: string;
  issuedAt: Date;
  issuedByName: string;
  content: IssuedForecast;
}

export interface IssuedForecastSummary {
  id: string;
  marketId: string;
  issuedAt: Date;
  issuedByName: string;
  formatVersion: number;
  /** Of the counts that it was made from. */
  revisionNumber: number;
  /** Newest first, revoked ones included. */
  links: ForecastLink[];
}

/** @returns null when the workspace has no such fit of that market that ended well */
export async function createIssuedForecast(args: {
  workspaceId: string;
  marketId: string;
  fitId: string;
  id?: string;
  issuedById: string | null;
  content: IssuedForecast;
  audit?: Deed;
}): Promise<{ issuedId: string } | null> {
  const { workspaceId, marketId, fitId, id = createId(), issuedById, audit } = args;
  const content: IssuedForecast = issuedForecastSchema.parse(args.content);
  return getPrisma().$transaction(async (db) => {
    const found = await db.fit.count({ where: { id: fitId, marketId, workspaceId, state: 'done' } });
    if (found !== 1) return null;
    await db.issuedForecast.create({
      data: {
        id,
        workspaceId,
        marketId,
        fitId,
        issuedById,
        issuedByName: content.issuedBy,
        issuedAt: new Date(content.issuedAt),
        formatVersion: content.formatVersion,
        content: content as unknown as Prisma.InputJsonObject,
      },
      select: { id: true },
    });
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'issued-forecast', subjectId: id });
    return { issuedId: id };
  });
}

export async function readIssuedForecast(args: {
  workspaceId: string;
  issuedId: string;
}): Promise<StoredForecast | null> {
  const row = await getPrisma().issuedForecast.findFirst({
    where: { id: args.issuedId, workspaceId: args.workspaceId },
    select: { id: true, marketId: true, issuedAt: true, issuedByName: true, content: true },
  });
  return row && { ...row, content: readIssuedContent(row.content, row.id) };
}

/** Newest first, each with its links. */
export async function listIssuedForecasts(args: {
  workspaceId: string;
  marketId: string;
}): Promise<IssuedForecastSummary[]> {
  const rows = await getPrisma().issuedForecast.findMany({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: [{ issuedAt: 'desc' }, { id: 'asc' }],
    select: {
      id: true,
      marketId: true,
      issuedAt: true,
      issuedByName: true,
      formatVersion: true,
      fit: { select: { revision: { select: { number: true } } } },
      links: { orderBy: [{ createdAt: 'desc' }, { id: 'asc' }], select: FORECAST_LINK_COLUMNS },
    },
  });
  return rows.map(({ fit, ...row }) => ({ ...row, revisionNumber: fit.revision.number }));
}
