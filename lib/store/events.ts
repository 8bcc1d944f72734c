/** Events: dated notes on a market. */
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { createId } from './ids';

export interface MarketEvent {
  id: string;
  /** year * 12 + month - 1. */
  month: number;
  note: string;
  /** Parameters may differ before and after it. */
  changesParameters: boolean;
  createdAt: Date;
}

export type EventContent = Pick<MarketEvent, 'month' | 'note' | 'changesParameters'>;

/** @returns null when the workspace has no such market */
export async function addEvent(
  args: { workspaceId: string; marketId: string; id?: string; audit?: Deed } & EventContent,
): Promise<{ eventId: string } | null> {
  const { workspaceId, marketId, id = createId(), month, note, changesParameters, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const found = await db.market.count({ where: { id: marketId, workspaceId } });
    if (found !== 1) return null;
    await db.event.create({
      data: { id, workspaceId, marketId, month, note, changesParameters },
      select: { id: true },
    });
    if (audit) await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'event', subjectId: id });
    return { eventId: id };
  });
}

/** In order of their months. */
export async function listEvents(args: { workspaceId: string; marketId: string }): Promise<MarketEvent[]> {
  return getPrisma().event.findMany({
    where: { marketId: args.marketId, workspaceId: args.workspaceId },
    orderBy: [{ month: 'asc' }, { createdAt: 'asc' }, { id: 'asc' }],
    select: { id: true, month: true, note: true, changesParameters: true, createdAt: true },
  });
}

/** @returns false when the market has no such event */
export async function changeEvent(
  args: { workspaceId: string; marketId: string; eventId: string; audit?: Deed } & EventContent,
): Promise<boolean> {
  const { workspaceId, marketId, eventId, month, note, changesParameters, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const { count } = await db.event.updateMany({
      where: { id: eventId, marketId, workspaceId },
      data: { month, note, changesParameters },
    });
    if (count === 1 && audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'event', subjectId: eventId });
    return count === 1;
  });
}

/** @returns false when the market has no such event */
export async function removeEvent(args: {
  workspaceId: string;
  marketId: string;
  eventId: string;
  audit?: Deed;
}): Promise<boolean> {
  const { workspaceId, marketId, eventId, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const { count } = await db.event.deleteMany({ where: { id: eventId, marketId, workspaceId } });
    if (count === 1 && audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'event', subjectId: eventId });
    return count === 1;
  });
}
