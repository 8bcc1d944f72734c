/** What the push controls need to know of a market: names, the last month and how many users each firm had at its end. */
import type { BriefFacts } from '@/lib/brief/facts';

export interface PushMarket {
  focalName: string;
  rivalName: string;
  /** Last observed month. */
  lastMonth: number;
  /** Users of both firms in the last months that were counted. */
  lastUsers: { focal: number; rival: number };
}

export function readPushMarket({ market, series }: BriefFacts): PushMarket {
  return {
    focalName: market.focalName,
    rivalName: market.rivalName,
    lastMonth: series.firstMonth + series.focal.length - 1,
    lastUsers: { focal: lastCount(series.focal), rival: lastCount(series.rival) },
  };
}

function lastCount(counts: (number | null)[]): number {
  return counts.findLast((count) => count !== null) ?? 0;
}
