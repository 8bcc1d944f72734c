/** One scenario against no push at all, once: the server's and the command line's way in. A slider keeps a `prepareScenario`. */
import type { DrawSet } from '../estimate/types';
import type { ScenarioComparison } from './comparison';
import type { Money } from './money';
import { prepareScenario, type ScenarioOptions } from './prepare-scenario';
import type { PricedPush } from './spend';

export function compareScenario(
  draws: DrawSet,
  pushes: readonly PricedPush[],
  options: ScenarioOptions,
  money?: Money,
): ScenarioComparison {
  return prepareScenario(draws, options).compare(pushes, money);
}
