/** Markets: one contest between two firms, with its newest revision and fit for the list. */
import { Prisma } from '../../prisma/generated/client';
import { priorSettingsSchema } from '../estimate/prior-schema';
import type { PriorSettings } from '../estimate/types';
import type { Month } from '../series/types';
import { type Deed, insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { FIT_VIEW_COLUMNS, type FitView, insertFit, type NewFit, toView } from './fits';
import { createId } from './ids';
import { readJson } from './json-columns';
import { insertRevision, type NewRevision } from './revisions';

export interface Market {
  id: string;
  name: string;
  unit: string;
  focalName: string;
  rivalName: string;
  /** Smallest measurement error, sd of ln users, per firm. */
  focalError: number;
  rivalError: number;
  /** How many could use such a product at all, users; null: not estimated. */
  focalAddressable: number | null;
  rivalAddressable: number | null;
  /** One sd of both estimates, as a share of them. */
  addressableError: number;
  /** null: the usual ones. */
  priors: PriorSettings | null;
  /** Months of the events from which parameters may differ, ascending. */
  changeMonths: Month[];
  isDemo: boolean;
  archivedAt: Date | null;
  createdAt: Date;
}

export interface NewMarket {
  id?: string;
  name: string;
  unit: string;
  focalName: string;
  rivalName: string;
  focalError: number;
  rivalError: number;
  focalAddressable?: number | null;
  rivalAddressable?: number | null;
  addressableError?: number;
  isDemo?: boolean;
}

export interface MarketListRow extends Market {
  /** Newest revision: its number, last month and how many months it has. */
  revision: { id: string; number: number; lastMonth: number; months: number } | null;
  /** Newest fit, in whatever state. */
  fit: FitView | null;
}

const MARKET = {
  id: true,
  name: true,
  unit: true,
  focalName: true,
  rivalName: true,
  focalError: true,
  rivalError: true,
  focalAddressable: true,
  rivalAddressable: true,
  addressableError: true,
  priors: true,
  events: { where: { changesParameters: true }, orderBy: { month: 'asc' }, select: { month: true } },
  isDemo: true,
  archivedAt: true,
  createdAt: true,
} as const satisfies Prisma.MarketSelect;

/** Stores a market with its first revision and queues a fit of it, together or not at all. */
export async function createMarket(args: {
  workspaceId: string;
  market: NewMarket;
  revision: NewRevision;
  fit: NewFit | null;
  audit?: Deed;
}): Promise<{ marketId: string; revisionId: string; fitId: string | null }> {
  const { workspaceId, market, revision, fit, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const marketId = market.id ?? createId();
    await db.market.create({ data: { ...market, id: marketId, workspaceId }, select: { id: true } });
    const revisionId = await insertRevision(db, { workspaceId, marketId, number: 1, revision });
    const fitId = fit ? await insertFit(db, { workspaceId, marketId, revisionId, fit }) : null;
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'market', subjectId: marketId });
    return { marketId, revisionId, fitId };
  });
}

export async function readMarket(args: { workspaceId: string; marketId: string }): Promise<Market | null> {
  const row = await getPrisma().market.findFirst({
    where: { id: args.marketId, workspaceId: args.workspaceId },
    select: MARKET,
  });
  return row && toMarket(row);
}

function toMarket({ priors, events, ...row }: Prisma.MarketGetPayload<{ select: typeof MARKET }>): Market {
  return {
    ...row,
    priors: readJson(priorSettingsSchema.nullable(), priors, 'market.priors', row.id),
    changeMonths: [...new Set(events.map(({ month }) => month))],
  };
}

/** Markets that are not archived, own before demo, newest first. */
export async function listMarkets(args: { workspaceId: string }): Promise<MarketListRow[]> {
  const rows = await getPrisma().market.findMany({
    where: { workspaceId: args.workspaceId, archivedAt: null },
    orderBy: [{ isDemo: 'asc' }, { createdAt: 'desc' }, { id: 'asc' }],
    select: {
      ...MARKET,
      revisions: {
        orderBy: { number: 'desc' },
        take: 1,
        select: {
          id: true,
          number: true,
          observations: { orderBy: { month: 'desc' }, take: 1, select: { month: true } },
          _count: { select: { observations: true } },
        },
      },
      fits: { orderBy: [{ createdAt: 'desc' }, { id: 'desc' }], take: 1, select: FIT_VIEW_COLUMNS },
    },
  });
  return rows.map(({ revisions, fits, ...market }) => ({
    ...toMarket(market),
    revision: revisions[0] ? toNewestRevision(revisions[0]) : null,
    fit: fits[0] ? toView(fits[0]) : null,
  }));
}

/** Changes only the fields given. @returns false when the workspace has no such market */
export async function editMarket(args: {
  workspaceId: string;
  marketId: string;
  changes: Partial<Omit<NewMarket, 'id' | 'isDemo'>>;
  audit?: Deed;
}): Promise<boolean> {
  return updateMarket(args, args.changes);
}

/** @param priors null: back to the usual ones @returns false when the workspace has no such market */
export async function setPriors(args: {
  workspaceId: string;
  marketId: string;
  priors: PriorSettings | null;
  audit?: Deed;
}): Promise<boolean> {
  const priors = args.priors ? (args.priors as unknown as Prisma.InputJsonObject) : Prisma.DbNull;
  return updateMarket(args, { priors });
}

/** Takes a market off the list; its issued forecasts stay. @returns false when there is no such market on the list */
export async function archiveMarket(args: {
  workspaceId: string;
  marketId: string;
  audit?: Deed;
}): Promise<boolean> {
  return updateMarket(args, { archivedAt: new Date() });
}

/** Puts an archived market back on the list. @returns false when the workspace has no such market in its archive */
export async function restoreMarket(args: {
  workspaceId: string;
  marketId: string;
  audit?: Deed;
}): Promise<boolean> {
  return updateMarket(args, { archivedAt: null }, { not: null });
}

export type ArchivedMarket = Pick<Market, 'id' | 'name' | 'focalName' | 'rivalName'> & { archivedAt: Date };

/** The last archived first. */
export async function listArchivedMarkets(args: { workspaceId: string }): Promise<ArchivedMarket[]> {
  const rows = await getPrisma().market.findMany({
    where: { workspaceId: args.workspaceId, archivedAt: { not: null } },
    orderBy: [{ archivedAt: 'desc' }, { id: 'asc' }],
    select: { id: true, name: true, focalName: true, rivalName: true, archivedAt: true },
  });
  return rows.flatMap(({ archivedAt, ...row }) => (archivedAt ? [{ ...row, archivedAt }] : []));
}

/** @param whenArchived which markets may be changed so */
async function updateMarket(
  args: { workspaceId: string; marketId: string; audit?: Deed },
  data: Prisma.MarketUpdateManyMutationInput,
  whenArchived: null | { not: null } = null,
): Promise<boolean> {
  const { workspaceId, marketId, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const { count } = await db.market.updateMany({
      where: { id: marketId, workspaceId, archivedAt: whenArchived },
      data,
    });
    if (count !== 1) return false;
    if (audit)
      await insertAuditEntry(db, workspaceId, { ...audit, subjectType: 'market', subjectId: marketId });
    return true;
  });
}

function toNewestRevision(row: {
  id: string;
  number: number;
  observations: { month: number }[];
  _count: { observations: number };
}): MarketListRow['revision'] {
  const lastMonth = row.observations[0]?.month;
  if (lastMonth === undefined) return null;
  return { id: row.id, number: row.number, lastMonth, months: row._count.observations };
}
