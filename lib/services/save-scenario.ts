/**
 * Keeps a named set of pushes with its market, or changes one that is kept. It is kept as looked at with the newest outlook: after
 * another fit it says so until it is saved again.
 */
import { latestDoneFit } from '../store/fits';
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
  const { workspaceId, userId } = viewer;
  const { scenarioId, ...pushed } = parsed.value;
  const fit = await latestDoneFit({ workspaceId, marketId });
  const content = { ...pushed, fitId: fit?.id ?? null };
  const audit = { userId, action: 'save-scenario', detail: { marketId, pushes: content.pushes.length } };
  if (scenarioId !== undefined) {
    const scenario = await readScenario({ workspaceId, scenarioId });
    if (scenario?.marketId !== marketId) return refuse('not-found');
    const isChanged = await changeScenario({ workspaceId, scenarioId, ...content, audit });
    return isChanged ? succeed({ scenarioId }) : refuse('not-found');
  }
  const created = await createScenario({ workspaceId, marketId, ...content, audit });
  return created ? succeed(created) : refuse('not-found');
}
