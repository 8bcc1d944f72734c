/** The facts that a brief is written from: a market's newest outlook with the very series that it was made from. */
import type { BriefFacts } from '../brief/facts';
import type { DoneFit } from '../store/fits';
import type { Market } from '../store/markets';
import { type Revision, seriesForFit } from '../store/revisions';

/** @param revision the one that the fit was made from, which need not be the newest */
export function toBriefFacts(
  market: Market,
  revision: Revision,
  fit: DoneFit,
  analyses: Pick<BriefFacts, 'backtest' | 'identifiability'>,
): BriefFacts {
  const { name, unit, focalName, rivalName } = market;
  const { number, createdAt, fileName } = revision;
  return {
    market: { name, unit, focalName, rivalName, measurementError: fit.options.measurementFloor },
    revision: { number, createdAt: createdAt.toISOString(), fileName },
    series: seriesForFit(revision),
    report: fit.report,
    ...analyses,
  };
}
