/** Events: dated notes on a market. */
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

/** @returns null when the workspace has no such market */
export async function addEvent(args: {
  workspaceId: string;
  marketId: string;
  id?: string;
  month: number;
  note: string;
  changesParameters: boolean;
}): Promise<{ eventId: string } | null> {
  const { workspaceId, marketId, id = createId(), month, note, changesParameters } = args;
  return getPrisma().$transaction(async (db) => {
    const found = await db.market.count({ where: { id: marketId, workspaceId } });
    if (found !== 1) return null;
    await db.event.create({
      data: { id, workspaceId, marketId, month, note, changesParameters },
      select: { id: true },
    });
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

/** @returns false when the workspace has no such event */
export async function removeEvent(args: { workspaceId: string; eventId: string }): Promise<boolean> {
  const { count } = await getPrisma().event.deleteMany({
    where: { id: args.eventId, workspaceId: args.workspaceId },
  });
  return count === 1;
}
