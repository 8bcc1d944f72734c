/**
 * Freezes a forecast: the facts of a brief and, where pushes were compared, the comparison, under the current format version.
 * Everything is copied into plain JSON, so nothing that happens later to the market or the fit reaches it.
 */
import type { BriefFacts } from '../brief/facts';
import type { ScenarioComparison } from '../scenario/comparison';
import { ISSUE_FORMAT_VERSION, type IssuedForecast, issuedForecastSchema } from './format';

export interface FreezeInput {
  facts: BriefFacts;
  /** Name and comparison of the scenario shown with it; null: the outlook alone. */
  scenario: { name: string; comparison: ScenarioComparison } | null;
  /** ISO 8601 with time zone. */
  issuedAt: string;
  issuedBy: string;
}

/** @throws ZodError when the facts are not what a fit produces: a mistake of the caller */
export function freezeForecast({ facts, scenario, issuedAt, issuedBy }: FreezeInput): IssuedForecast {
  return issuedForecastSchema.parse({
    formatVersion: ISSUE_FORMAT_VERSION,
    issuedAt,
    issuedBy,
    ...facts,
    scenario: scenario && { ...scenario, pushes: scenario.comparison.pushes },
  });
}
