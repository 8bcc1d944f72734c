/** `elbowroom scenario FILE`: file -> outlook -> pushes on its draws -> text or JSON. */
import type { CommandEnd } from './command-end';
import { fitFile, toFacts } from './fit-file';
import { compareScenarios, listScenarios } from './run-scenario';
import type { ScenarioRequest } from './scenario-arguments';
import { toScenarioJson } from './scenario-output';
import { renderScenarios } from './scenario-text';
import type { Terminal } from './terminal';

export async function scenario(
  request: ScenarioRequest,
  asJson: boolean,
  terminal: Terminal,
): Promise<CommandEnd> {
  // a slip in a scenario is told before the fit, which takes a while
  const asked = listScenarios(request);
  if ('exit' in asked) return asked;
  const fitted = await fitFile(request, terminal);
  if ('exit' in fitted) return fitted;
  const scenarios = compareScenarios(fitted, asked, request);
  const facts = toFacts(fitted);
  const output = asJson
    ? `${JSON.stringify(toScenarioJson(facts, scenarios))}\n`
    : renderScenarios(facts, scenarios);
  return { exit: 'ok', output };
}
