/** The markets of the workspace, each with how its newest outlook reads and how its newest fit is doing. */
import type { FitProgress } from '../estimate/types';
import type { Outcome } from '../forecast/outcomes';
import type { Odds } from '../forecast/report';
import type { Month } from '../series/types';
import type { FitState } from '../store/fits';
import {
  type ArchivedMarket,
  listArchivedMarkets as listStoredArchive,
  listMarkets as listStoredMarkets,
  type MarketListRow,
} from '../store/markets';
import { listOutlookHeads, type OutlookHead } from '../store/outlook-heads';
import { listStaleReasons } from './staleness';
import type { Viewer } from './viewer';

export interface MarketSummary {
  id: string;
  name: string;
  unit: string;
  focalName: string;
  rivalName: string;
  isDemo: boolean;
  /** Of the newest revision. */
  lastMonth: Month | null;
  months: number;
  /** The newest fit; odds and verdict come from the newest one that ended well. null: never fitted. */
  fit: FitSummary | null;
}

interface FitSummary {
  id: string;
  state: FitState;
  odds: Odds | null;
  /** null: no outlook yet, or the data do not decide. */
  decided: Outcome | null;
  /** Where the focal firm's share is heading; null: no outlook yet. */
  share: OutlookHead['share'] | null;
  progress: FitProgress | null;
  /** The odds are of other data, measurement errors or engine than the market's now. */
  isStale: boolean;
  failureCode: string | null;
}

export async function listMarkets(viewer: Viewer): Promise<MarketSummary[]> {
  const { workspaceId } = viewer;
  const [markets, heads] = await Promise.all([
    listStoredMarkets({ workspaceId }),
    listOutlookHeads({ workspaceId }),
  ]);
  return markets.map((market) => toSummary(market, heads.get(market.id) ?? null));
}

export type { ArchivedMarket };

export async function listArchivedMarkets({ workspaceId }: Viewer): Promise<ArchivedMarket[]> {
  return listStoredArchive({ workspaceId });
}

function toSummary(market: MarketListRow, head: OutlookHead | null): MarketSummary {
  const { id, name, unit, focalName, rivalName, isDemo, revision } = market;
  return {
    id,
    name,
    unit,
    focalName,
    rivalName,
    isDemo,
    lastMonth: revision?.lastMonth ?? null,
    months: revision?.months ?? 0,
    fit: toFitSummary(market, head),
  };
}

function toFitSummary(market: MarketListRow, head: OutlookHead | null): FitSummary | null {
  if (!market.fit) return null;
  const { id, state, progress, failureCode } = market.fit;
  return {
    id,
    state,
    odds: head?.odds ?? null,
    decided: head?.decided ?? null,
    share: head?.share ?? null,
    progress,
    isStale: head !== null && listStaleReasons(head, market, market.revision?.id ?? null).length > 0,
    failureCode,
  };
}
