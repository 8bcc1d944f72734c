/**
 * Issues a forecast: freezes names, counts, outlook and, where scenarios are given, their comparisons and answers into one record
 * that nothing changes afterwards. The comparison is computed here from the stored draws, never taken from a browser.
 */
import type { DrawSet } from '../estimate/types';
import { type FreezeScenario, freezeForecast } from '../issue/freeze';
import { finishRun } from '../scenario/answer-run';
import { findLastUsefulMonth } from '../scenario/find-last-month';
import { findSmallestPush } from '../scenario/find-smallest-push';
import { type PreparedScenario, prepareScenario } from '../scenario/prepare-scenario';
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
  const draws = await readNeededDraws(viewer, fit, parsed.value);
  const scenarios = draws ? compareForIssue(draws, fit, parsed.value) : [];
  const analyses = await readOutlookAnalyses(viewer, fit.revisionId);
  const content = freezeForecast({
    facts: toBriefFacts(market, revision, fit, toAnalysisFacts(analyses), events),
    scenario: null,
    ...(scenarios.length > 0 && { scenarios }),
    ...(draws && parsed.value.mayReadersTry && { trialDraws: draws }),
    issuedAt: new Date().toISOString(),
    issuedBy: viewer.userName,
  });
  const detail = {
    fitId: fit.id,
    revision: revision.number,
    scenarios: scenarios.length,
    mayReadersTry: parsed.value.mayReadersTry,
  };
  const audit = { userId, action: 'issue-forecast', detail };
  const stored = await createIssuedForecast({ ...scope, fitId: fit.id, issuedById: userId, content, audit });
  return stored ? succeed(stored) : refuse('not-found');
}

/** null: nothing of the forecast needs them. */
async function readNeededDraws(
  { workspaceId }: Viewer,
  fit: DoneFit,
  { scenarios, mayReadersTry }: IssueForm,
): Promise<DrawSet | null> {
  if (scenarios.length === 0 && !mayReadersTry) return null;
  const draws = await readDraws({ workspaceId, fitId: fit.id });
  if (!draws) throw new AppError('inconsistent-data', `fit ${fit.id} is done and has no draws`);
  return draws;
}

/** All on the same draws, so that they can stand side by side. */
function compareForIssue(draws: DrawSet, fit: DoneFit, { scenarios }: IssueForm): FreezeScenario[] {
  const { horizonMonths, seed } = fit.options;
  const prepared = prepareScenario(draws, { horizonMonths, seed });
  return scenarios.map(({ name, pushes, money, question }) => ({
    name,
    comparison: prepared.compare(pushes, money ?? undefined),
    ...(question && { answers: answerForIssue(prepared, pushes, question) }),
  }));
}

function answerForIssue(
  prepared: PreparedScenario,
  pushes: IssueForm['scenarios'][number]['pushes'],
  question: NonNullable<IssueForm['scenarios'][number]['question']>,
): FreezeScenario['answers'] {
  const smallestPush = finishRun(findSmallestPush(prepared, { ...question, pushes }));
  const counter = smallestPush.code === 'not-needed' ? question.counter : smallestPush.push;
  const asked = { target: question.target, counter, pushes };
  return { smallestPush, lastUsefulMonth: finishRun(findLastUsefulMonth(prepared, asked)) };
}
