/** How big a market is, for the ranges of the push controls: users of both firms in the last months that were counted. */
import type { BriefFacts } from '@/lib/brief/facts';
import type { MarketScale } from '@/lib/scenario/push-limits';

export function readMarketScale({ series, report }: BriefFacts): MarketScale {
  return {
    focalUsers: lastCount(series.focal),
    rivalUsers: lastCount(series.rival),
    horizonMonths: report.outlook.horizonMonths,
  };
}

function lastCount(counts: (number | null)[]): number {
  return counts.findLast((count) => count !== null) ?? 0;
}
