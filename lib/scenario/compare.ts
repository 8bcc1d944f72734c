/** One scenario against no push at all, once: the server's and the command line's way in. A slider keeps a `prepareScenario`. */
import type { Push } from '../dynamics/push';
import type { DrawSet } from '../estimate/types';
import type { ScenarioComparison } from './comparison';
import { prepareScenario, type ScenarioOptions } from './prepare-scenario';

export function compareScenario(
  draws: DrawSet,
  pushes: readonly Push[],
  options: ScenarioOptions,
): ScenarioComparison {
  return prepareScenario(draws, options).compare(pushes);
}
