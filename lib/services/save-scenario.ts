/** Keeps a named set of pushes with its market. */
import { changeScenario, createScenario, readScenario } from '../store/scenarios';
import { type ScenarioForm, scenarioFormSchema } from './forms';
import { refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import type { Viewer } from './viewer';

export async function saveScenario(
  viewer: Viewer,
  marketId: string,
  form: ScenarioForm,
): Promise<Success<{ scenarioId: string }> | NotAllowed | InvalidInput | NotFound> {
  const parsed = parseWrite(viewer, scenarioFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId } = viewer;
  const { scenarioId, name, pushes } = parsed.value;
  if (scenarioId !== undefined) {
    const scenario = await readScenario({ workspaceId, scenarioId });
    if (scenario?.marketId !== marketId) return refuse('not-found');
    const isChanged = await changeScenario({ workspaceId, scenarioId, name, pushes });
    return isChanged ? succeed({ scenarioId }) : refuse('not-found');
  }
  const created = await createScenario({ workspaceId, marketId, name, pushes });
  return created ? succeed(created) : refuse('not-found');
}
