/** The facts that a brief is written from: a market's newest outlook with the very series that it was made from. */

import type { EventFact } from '../brief/event-marks';
import type { BriefFacts, LeftOutFact } from '../brief/facts';
import { readerOf } from '../series/compare-series';
import type { DoneFit } from '../store/fits';
import type { Market } from '../store/markets';
import { type Revision, seriesForFit } from '../store/revisions';

/** @param revision the one that the fit was made from, which need not be the newest */
export function toBriefFacts(
  market: Market,
  revision: Revision,
  fit: DoneFit,
  analyses: Pick<BriefFacts, 'backtest' | 'identifiability'>,
  events: readonly EventFact[],
): BriefFacts {
  const { name, unit, focalName, rivalName } = market;
  const { number, createdAt, fileName } = revision;
  return {
    market: { name, unit, focalName, rivalName, measurementError: fit.options.measurementFloor },
    revision: { number, createdAt: createdAt.toISOString(), fileName },
    series: seriesForFit(revision),
    ...(events.length > 0 && { events: events.map(toEventFact) }),
    ...(revision.exclusions.length > 0 && { leftOut: listLeftOut(revision) }),
    report: fit.report,
    ...analyses,
  };
}

function toEventFact({ month, note, changesParameters }: EventFact): EventFact {
  return { month, note, changesParameters };
}

function listLeftOut(revision: Revision): LeftOutFact[] {
  const read = readerOf(revision);
  return revision.exclusions.map(({ month, reason }) => {
    const { focal, rival } = read(month);
    return { month, focal, rival, reason };
  });
}
