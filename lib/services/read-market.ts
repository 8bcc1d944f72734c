/** Everything that the page of one market shows. */
import type { BriefFacts } from '../brief/facts';
import type { FitProgress } from '../estimate/types';
import type { Exclusion } from '../series/exclusions';
import type { MonthlySeries } from '../series/types';
import { listEvents, type MarketEvent } from '../store/events';
import { type DoneFit, type FitState, type FitView, latestDoneFit, latestFit } from '../store/fits';
import { type IssuedForecastSummary, listIssuedForecasts } from '../store/issued-forecasts';
import { type Market, readMarket as readStoredMarket } from '../store/markets';
import { latestRevision, type Revision, type RevisionSummary, readRevision } from '../store/revisions';
import { listScenarios, type Scenario } from '../store/scenarios';
import { toBriefFacts } from './market-facts';
import { refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import { type OutlookAnalyses, readOutlookAnalyses, toAnalysisFacts } from './read-outlook-analyses';
import { listStaleReasons, type StaleReason } from './staleness';
import type { Viewer } from './viewer';

export type { MarketEvent };
export type IssuedSummary = IssuedForecastSummary;

export interface MarketPage {
  market: Market;
  /** The newest one, with its counts in `series`. */
  revision: RevisionSummary;
  series: MonthlySeries;
  /** Months of it that the fit leaves out. */
  exclusions: readonly Exclusion[];
  /** In order of their months. */
  events: MarketEvent[];
  /** The newest fit, in whatever state; null: never fitted. */
  fit: FitStanding | null;
  /** The newest fit that ended well: what `facts` tell of and draws are read from. */
  outlook: { fitId: string; staleReasons: StaleReason[] } | null;
  /** null: no fit has ended well yet. They may be of an earlier revision; `outlook.staleReasons` says so. */
  facts: BriefFacts | null;
  /** How the analyses of that outlook stand; null: no outlook. */
  analyses: OutlookAnalyses | null;
  issued: IssuedSummary[];
  scenarios: Scenario[];
}

interface FitStanding {
  id: string;
  state: FitState;
  progress: FitProgress | null;
  failureCode: string | null;
  isCancelling: boolean;
  createdAt: Date;
  /** The outlook shown is out of date. */
  isStale: boolean;
}

export async function readMarket(viewer: Viewer, marketId: string): Promise<Success<MarketPage> | NotFound> {
  const scope = { workspaceId: viewer.workspaceId, marketId };
  const [market, newest, fit, done, issued, scenarios, events] = await Promise.all([
    readStoredMarket(scope),
    latestRevision(scope),
    latestFit(scope),
    latestDoneFit(scope),
    listIssuedForecasts(scope),
    listScenarios(scope),
    listEvents(scope),
  ]);
  if (!market || !newest) return refuse('not-found');
  const { series, exclusions, ...revision } = newest;
  const analyses = done && (await readOutlookAnalyses(viewer, done.revisionId));
  const facts = done && analyses && (await readFacts(viewer, market, newest, done, analyses, events));
  const outlook = done && { fitId: done.id, staleReasons: listReasons(done, market, newest) };
  const isStale = outlook !== null && outlook.staleReasons.length > 0;
  return succeed({
    market,
    revision,
    series,
    exclusions,
    events,
    fit: fit && toStanding(fit, isStale),
    outlook,
    facts,
    analyses,
    issued,
    scenarios,
  });
}

async function readFacts(
  { workspaceId }: Viewer,
  market: Market,
  newest: Revision,
  done: DoneFit,
  analyses: OutlookAnalyses,
  events: MarketEvent[],
): Promise<BriefFacts | null> {
  const { revisionId } = done;
  const fitted = revisionId === newest.id ? newest : await readRevision({ workspaceId, revisionId });
  return fitted && toBriefFacts(market, fitted, done, toAnalysisFacts(analyses), events);
}

function listReasons(done: DoneFit, market: Market, newest: Revision): StaleReason[] {
  return listStaleReasons({ ...done, engineVersion: done.report.engineVersion }, market, newest.id);
}

function toStanding(fit: FitView, isStale: boolean): FitStanding {
  const { id, state, progress, failureCode, cancelAsked, createdAt } = fit;
  return {
    id,
    state,
    progress,
    failureCode,
    isCancelling: cancelAsked && state === 'running',
    createdAt,
    isStale,
  };
}
