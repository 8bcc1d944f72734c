/** Every scenario of the command compared on the same draws, with its answers: what text and JSON are written from. */
import { readFileSync } from 'node:fs';
import { finishRun } from '../scenario/answer-run';
import type { Answers } from '../scenario/answers';
import type { ScenarioComparison } from '../scenario/comparison';
import { findBreakEven } from '../scenario/find-break-even';
import { findLastUsefulMonth } from '../scenario/find-last-month';
import { findSmallestPush } from '../scenario/find-smallest-push';
import type { Money } from '../scenario/money';
import { type PreparedScenario, prepareScenario } from '../scenario/prepare-scenario';
import { parseScenario, type ScenarioReading } from '../scenario/scenario-json';
import type { PricedPush } from '../scenario/spend';
import { type CommandFailure, fail } from './command-end';
import type { FittedFile } from './fit-file';
import { explainSystemError } from './read-input';
import type { ScenarioRequest } from './scenario-arguments';

/** A scenario as it was asked for, before it is compared. */
export interface AskedScenario {
  name: string;
  pushes: PricedPush[];
  money: Money | null;
}

export interface ComparedScenario {
  name: string;
  comparison: ScenarioComparison;
  answers: Answers;
}

/** Name of the scenario that `--push` makes. */
const OWN_NAME = 'Pushes';

export function listScenarios(request: ScenarioRequest): AskedScenario[] | CommandFailure {
  const { pushes, money } = request;
  const asked: AskedScenario[] = pushes.length > 0 ? [{ name: OWN_NAME, pushes, money }] : [];
  for (const file of request.scenarioFiles) {
    const text = readText(file);
    if (typeof text !== 'string') return text;
    const reading = parseScenario(text);
    if (!reading.ok) return fail('bad-scenario', explainScenario(file, reading));
    const { value } = reading;
    asked.push({ name: value.name, pushes: value.pushes, money: money ?? value.money ?? null });
  }
  return asked;
}

function readText(file: string): string | CommandFailure {
  try {
    return readFileSync(file, 'utf8');
  } catch (error) {
    return fail('file-unreadable', explainSystemError(file, error));
  }
}

function explainScenario(file: string, reading: Extract<ScenarioReading, { ok: false }>): string {
  switch (reading.code) {
    case 'not-json':
      return `${file} is not JSON. A written scenario looks like {"version": 1, "name": "...", "pushes": [...]}.`;
    case 'unknown-version':
      return `${file} was written by a later release (version ${reading.version}).`;
    case 'invalid': {
      const [{ place, message }] = reading.problems as [{ place: string; message: string }];
      const others = reading.problems.length > 1 ? ` ${reading.problems.length - 1} more.` : '';
      return `${file} holds no scenario: ${place === '' ? '' : `${place}: `}${message}.${others}`;
    }
  }
}

export function compareScenarios(
  { report, draws }: FittedFile,
  asked: readonly AskedScenario[],
  { question }: ScenarioRequest,
): ComparedScenario[] {
  const { seed, outlook } = report;
  const prepared = prepareScenario(draws, { horizonMonths: outlook.horizonMonths, seed });
  return asked.map((scenario) => ({
    name: scenario.name,
    comparison: prepared.compare(scenario.pushes, scenario.money ?? undefined),
    answers: answer(prepared, scenario, question),
  }));
}

function answer(
  prepared: PreparedScenario,
  { pushes, money }: AskedScenario,
  question: ScenarioRequest['question'],
): Answers {
  if (!question) return {};
  const whole = { ...question, pushes };
  const smallestPush = finishRun(findSmallestPush(prepared, whole));
  const counter = smallestPush.code === 'found' ? smallestPush.push : question.counter;
  const hasSize = counter.size > 0;
  const isPriced = money !== null && (counter.firm === 1 || money.marginPerUserMonth.rival !== null);
  return {
    smallestPush,
    ...(hasSize ? { lastUsefulMonth: finishRun(findLastUsefulMonth(prepared, { ...whole, counter })) } : {}),
    ...(hasSize && isPriced
      ? { breakEven: finishRun(findBreakEven(prepared, { push: counter, pushes, money })) }
      : {}),
  };
}
