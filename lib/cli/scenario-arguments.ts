/** The words of `elbowroom scenario`: pushes, written scenarios, money, and what to answer. Files are only named here. */
import type { Target } from '../scenario/answers';
import type { Money } from '../scenario/money';
import { followedMonthsOf } from '../scenario/prepare-scenario';
import { MAX_PUSHES, MAX_SIDE_BY_SIDE } from '../scenario/push-bounds';
import type { PricedPush } from '../scenario/spend';
import type { FitRequest } from './fit-request';
import { readMoneyText, readPushText, readTargetText } from './push-text';

export interface ScenarioRequest extends FitRequest {
  /** Pushes of the command line: one scenario, unless there are none. */
  pushes: PricedPush[];
  /** Files of written scenarios. */
  scenarioFiles: string[];
  /** Goes before the money of a written scenario. */
  money: Money | null;
  /** What a counter-push should keep, and that counter-push. */
  question: { target: Target; counter: PricedPush } | null;
}

export interface ScenarioValues {
  push?: string[];
  scenario?: string[];
  money?: string;
  keep?: string;
  counter?: string;
}

/** Options given that only this command knows. */
export function listScenarioOptions(values: ScenarioValues): string[] {
  const options = ['push', 'scenario', 'money', 'keep', 'counter'] as const;
  return options.filter((option) => values[option] !== undefined).map((option) => `--${option}`);
}

/** A string is the reason why it is not understood. */
export function readScenarioRequest(values: ScenarioValues, fit: FitRequest): ScenarioRequest | string {
  const { push: pushTexts = [], scenario: scenarioFiles = [] } = values;
  if (pushTexts.length === 0 && scenarioFiles.length === 0) {
    return 'Say what is pushed: --push firm=rival,kind=recruits,start=3,length=6,size=5000, or --scenario FILE.json.';
  }
  if (pushTexts.length > MAX_PUSHES) return `At most ${MAX_PUSHES} pushes make a scenario.`;
  if (scenarioFiles.length + (pushTexts.length > 0 ? 1 : 0) > MAX_SIDE_BY_SIDE) {
    return `At most ${MAX_SIDE_BY_SIDE} scenarios are compared at once.`;
  }
  const pushes: PricedPush[] = [];
  for (const text of pushTexts) {
    const push = readPushText(text);
    if (!push.ok) return push.reason;
    pushes.push(push.value);
  }
  const money = values.money === undefined ? null : readMoneyText(values.money);
  if (money && !money.ok) return money.reason;
  const question = readQuestion(values, followedMonthsOf(fit.horizonMonths));
  if (typeof question === 'string') return question;
  return { ...fit, pushes, scenarioFiles, money: money?.value ?? null, question };
}

function readQuestion(
  { keep, counter }: ScenarioValues,
  lastMonth: number,
): ScenarioRequest['question'] | string {
  if (keep === undefined && counter === undefined) return null;
  if (keep === undefined || counter === undefined) {
    return '--keep and --counter go together: what to keep, and the push that should keep it.';
  }
  const target = readTargetText(keep);
  if (!target.ok) return target.reason;
  if (target.value.month > lastMonth) {
    return `--keep: “month” is at most ${lastMonth}; forecast further with --months.`;
  }
  const push = readPushText(counter, true);
  return push.ok ? { target: target.value, counter: push.value } : push.reason.replace('--push', '--counter');
}
