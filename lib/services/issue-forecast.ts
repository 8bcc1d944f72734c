/**
 * Issues a forecast: freezes names, counts, outlook and, where pushes are given, their comparison into one record that
 * nothing changes afterwards. The comparison is computed here from the stored draws, never taken from a browser.
 */
import type { Push } from '../dynamics/push';
import { type FreezeInput, freezeForecast } from '../issue/freeze';
import { compareScenario } from '../scenario/compare';
import { listEvents } from '../store/events';
import { type DoneFit, latestDoneFit, readDraws } from '../store/fits';
import { createIssuedForecast } from '../store/issued-forecasts';
import { readMarket } from '../store/markets';
import { latestRevision } from '../store/revisions';
import { AppError } from './app-error';
import { type IssueForm, issueFormSchema } from './forms';
import { toBriefFacts } from './market-facts';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import { readOutlookAnalyses, toAnalysisFacts } from './read-outlook-analyses';
import { listStaleReasons, type StaleReason } from './staleness';
import type { Viewer } from './viewer';

const DEFAULT_SCENARIO_NAME = 'Scenario';

export type IssueRefusal =
  | NotAllowed
  | InvalidInput
  | NotFound
  | Refusal<'no-result'>
  | Refusal<'is-stale', { reasons: StaleReason[] }>;

export async function issueForecast(
  viewer: Viewer,
  marketId: string,
  form: IssueForm,
): Promise<Success<{ issuedId: string }> | IssueRefusal> {
  const parsed = parseWrite(viewer, issueFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const scope = { workspaceId, marketId };
  const [market, revision, fit, events] = await Promise.all([
    readMarket(scope),
    latestRevision(scope),
    latestDoneFit(scope),
    listEvents(scope),
  ]);
  if (!market || !revision) return refuse('not-found');
  if (!fit) return refuse('no-result');
  const reasons = listStaleReasons({ ...fit, engineVersion: fit.report.engineVersion }, market, revision.id);
  if (reasons.length > 0) return refuse('is-stale', { reasons });
  const scenario = await compareForIssue(viewer, fit, parsed.value);
  const analyses = await readOutlookAnalyses(viewer, fit.revisionId);
  const content = freezeForecast({
    facts: toBriefFacts(market, revision, fit, toAnalysisFacts(analyses), events),
    scenario,
    issuedAt: new Date().toISOString(),
    issuedBy: viewer.userName,
  });
  const detail = {
    fitId: fit.id,
    revision: revision.number,
    pushes: scenario?.comparison.pushes.length ?? 0,
  };
  const audit = { userId, action: 'issue-forecast', detail };
  const stored = await createIssuedForecast({ ...scope, fitId: fit.id, issuedById: userId, content, audit });
  return stored ? succeed(stored) : refuse('not-found');
}

async function compareForIssue(
  viewer: Viewer,
  fit: DoneFit,
  form: IssueForm,
): Promise<FreezeInput['scenario']> {
  const pushes: Push[] = form.pushes ?? [];
  if (pushes.length === 0) return null;
  const draws = await readDraws({ workspaceId: viewer.workspaceId, fitId: fit.id });
  if (!draws) throw new AppError('inconsistent-data', `fit ${fit.id} is done and has no draws`);
  const { horizonMonths, seed } = fit.options;
  const comparison = compareScenario(draws, pushes, { horizonMonths, seed });
  return { name: form.scenarioName ?? DEFAULT_SCENARIO_NAME, comparison };
}
