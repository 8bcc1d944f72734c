/**
 * Freezes a forecast: the facts of a brief and, where pushes were compared, the comparison, under the current format version.
 * Everything is copied into plain JSON, so nothing that happens later to the market or the fit reaches it.
 */
import type { BriefFacts } from '../brief/facts';
import type { DrawSet } from '../estimate/types';
import type { Answers } from '../scenario/answers';
import type { ScenarioComparison } from '../scenario/comparison';
import { takeTrialDraws } from '../scenario/trial-draws';
import { ISSUE_FORMAT_VERSION, type IssuedForecast, issuedForecastSchema } from './format';

export interface FreezeScenario {
  name: string;
  comparison: ScenarioComparison;
  answers?: Answers;
}

export interface FreezeInput {
  facts: BriefFacts;
  /** Name and comparison of the scenario shown with it; null: the outlook alone, or `scenarios`. */
  scenario: FreezeScenario | null;
  /** Several scenarios, all compared on the same draws. */
  scenarios?: readonly FreezeScenario[];
  /** All draws of the fit: readers of a link may move the sliders. Absent: they may not. */
  trialDraws?: DrawSet;
  /** ISO 8601 with time zone. */
  issuedAt: string;
  issuedBy: string;
}

/** @throws ZodError when the facts are not what a fit produces: a mistake of the caller */
export function freezeForecast(input: FreezeInput): IssuedForecast {
  const { facts, scenario, scenarios, trialDraws, issuedAt, issuedBy } = input;
  const { outlook, seed } = facts.report;
  return issuedForecastSchema.parse({
    formatVersion: ISSUE_FORMAT_VERSION,
    issuedAt,
    issuedBy,
    ...facts,
    scenario: scenario && freezeScenario(scenario),
    ...(scenarios && { scenarios: scenarios.map(freezeScenario) }),
    ...(trialDraws && {
      trial: { draws: takeTrialDraws(trialDraws), horizonMonths: outlook.horizonMonths, seed },
    }),
  });
}

function freezeScenario(scenario: FreezeScenario) {
  return { ...scenario, pushes: scenario.comparison.pushes };
}
