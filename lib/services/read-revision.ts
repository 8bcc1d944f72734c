/** One revision of a market with its counts, and another one to compare it with. */
import { compareSeries, type MonthChange } from '../series/compare-series';
import { listEvents, type MarketEvent } from '../store/events';
import { type Market, readMarket } from '../store/markets';
import { latestRevision, type Revision, readRevisionByNumber } from '../store/revisions';
import { refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import type { Viewer } from './viewer';

export type { Revision };

export interface RevisionPage {
  market: Market;
  revision: Revision;
  newestNumber: number;
  events: MarketEvent[];
  /** null: there is none to compare with. */
  comparison: { with: Revision; changes: MonthChange[] } | null;
}

/** @param against number of the revision to compare with; absent: the one before */
export async function readRevision(
  { workspaceId }: Viewer,
  marketId: string,
  number: number,
  against = number - 1,
): Promise<Success<RevisionPage> | NotFound> {
  const scope = { workspaceId, marketId };
  const [market, newest, revision, other, events] = await Promise.all([
    readMarket(scope),
    latestRevision(scope),
    readRevisionByNumber({ ...scope, number }),
    readRevisionByNumber({ ...scope, number: against }),
    listEvents(scope),
  ]);
  if (!market || !newest || !revision) return refuse('not-found');
  const comparison = other && { with: other, changes: compareSeries(other, revision) };
  return succeed({ market, revision, newestNumber: newest.number, events, comparison });
}
