/**
 * What `elbowroom scenario FILE --json` prints: exactly one object, on one line. Months are "2024-03"; users are plain counts; shares and
 * odds are fractions of 1; months ahead count from the last observed one. Fields may be added; none changes its meaning.
 */
import { z } from 'zod';
import type { BriefFacts } from '../brief/facts';
import { writeDestinationOrPath } from '../brief/push-verdict';
import { plainText } from '../brief/text';
import { createWords } from '../brief/words';
import { answersSchema } from '../scenario/answers';
import { scenarioComparisonSchema } from '../scenario/comparison';
import { addMonths, formatMonth } from '../series/month';
import type { ComparedScenario } from './run-scenario';

export const scenarioOutputSchema = z.object({
  focal: z.string(),
  rival: z.string(),
  lastObservedMonth: z.string().regex(/^\d{4}-\d{2}$/),
  /** Calendar months of the bands. */
  months: z.array(z.string().regex(/^\d{4}-\d{2}$/)),
  scenarios: z.array(
    z.object({
      name: z.string(),
      /** Destination or path, in one sentence. */
      verdict: z.string(),
      /** Bands with and without the pushes, their difference, odds, money: `lib/scenario/comparison.ts`. */
      comparison: scenarioComparisonSchema,
      /** What `--keep` and `--counter` asked for: `lib/scenario/answers.ts`. */
      answers: answersSchema,
    }),
  ),
  seed: z.number().int(),
  engineVersion: z.string(),
});
export type ScenarioOutput = z.infer<typeof scenarioOutputSchema>;

export function toScenarioJson(facts: BriefFacts, scenarios: readonly ComparedScenario[]): ScenarioOutput {
  const words = createWords(facts);
  const { report, market } = facts;
  const { firstMonth, horizonMonths } = report.outlook;
  return scenarioOutputSchema.parse({
    focal: market.focalName,
    rival: market.rivalName,
    lastObservedMonth: formatMonth(words.lastMonth),
    months: Array.from({ length: horizonMonths }, (_, h) => formatMonth(addMonths(firstMonth, h))),
    scenarios: scenarios.map(({ name, comparison, answers }) => ({
      name,
      verdict: plainText(writeDestinationOrPath(words, comparison)),
      comparison,
      answers,
    })),
    seed: report.seed,
    engineVersion: report.engineVersion,
  });
}
