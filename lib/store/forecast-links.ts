/** Forecast links: who holds the token may read one issued forecast. The token itself is never stored, only its hash. */
import type { Prisma } from '../../prisma/generated/client';
import type { IssuedForecast } from '../issue/format';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { createId } from './ids';
import { readIssuedContent } from './issued-content';

export interface ForecastLink {
  id: string;
  issuedForecastId: string;
  /** First characters of the token, to tell links apart. */
  hint: string;
  expiresAt: Date | null;
  revokedAt: Date | null;
  openedCount: number;
  lastOpenedAt: Date | null;
  createdAt: Date;
}

/** For the other files of the store. */
export const FORECAST_LINK_COLUMNS = {
  id: true,
  issuedForecastId: true,
  hint: true,
  expiresAt: true,
  revokedAt: true,
  openedCount: true,
  lastOpenedAt: true,
  createdAt: true,
} as const satisfies Prisma.ForecastLinkSelect;

/** @returns null when the workspace has no such issued forecast */
export async function createForecastLink(args: {
  workspaceId: string;
  issuedId: string;
  tokenHash: string;
  hint: string;
  expiresAt: Date | null;
  createdById: string | null;
  audit?: Deed;
}): Promise<{ linkId: string } | null> {
  const { workspaceId, issuedId, audit, ...columns } = args;
  return getPrisma().$transaction(async (db) => {
    const found = await db.issuedForecast.count({ where: { id: issuedId, workspaceId } });
    if (found !== 1) return null;
    const id = createId();
    await db.forecastLink.create({
      data: { id, workspaceId, issuedForecastId: issuedId, ...columns },
      select: { id: true },
    });
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'forecast-link', subjectId: id });
    return { linkId: id };
  });
}

/** Ends a link for good. @returns false when the workspace has no such link or it was revoked before */
export async function revokeForecastLink(args: {
  workspaceId: string;
  linkId: string;
  audit?: Deed;
}): Promise<boolean> {
  const { workspaceId, linkId, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const { count } = await db.forecastLink.updateMany({
      where: { id: linkId, workspaceId, revokedAt: null },
      data: { revokedAt: new Date() },
    });
    if (count !== 1) return false;
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'forecast-link', subjectId: linkId });
    return true;
  });
}

/** Newest first, revoked ones included. */
export async function listForecastLinks(args: {
  workspaceId: string;
  issuedId: string;
}): Promise<ForecastLink[]> {
  return getPrisma().forecastLink.findMany({
    where: { issuedForecastId: args.issuedId, workspaceId: args.workspaceId },
    orderBy: [{ createdAt: 'desc' }, { id: 'asc' }],
    select: FORECAST_LINK_COLUMNS,
  });
}

/**
 * The forecast behind a token, counting the visit. The token is the authority, so there is no workspace to scope by.
 * @returns null when the token is wrong, expired or revoked, which look alike
 */
export async function openForecastLink(args: {
  tokenHash: string;
  now: Date;
}): Promise<IssuedForecast | null> {
  const { tokenHash, now } = args;
  const [opened] = await getPrisma().forecastLink.updateManyAndReturn({
    where: { tokenHash, revokedAt: null, OR: [{ expiresAt: null }, { expiresAt: { gt: now } }] },
    data: { openedCount: { increment: 1 }, lastOpenedAt: now },
    select: { issuedForecast: { select: { id: true, content: true } } },
  });
  if (!opened) return null;
  const { id, content } = opened.issuedForecast;
  return readIssuedContent(content, id);
}
