/** Removes a kept scenario. What was issued with it stays as it was. */
import { readScenario, removeScenario as removeStored } from '../store/scenarios';
import { refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function removeScenario(
  viewer: Viewer,
  marketId: string,
  scenarioId: string,
): Promise<Success<{ scenarioId: string }> | NotAllowed | NotFound> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const scenario = await readScenario({ workspaceId, scenarioId });
  if (scenario?.marketId !== marketId) return refuse('not-found');
  const audit = { userId, action: 'remove-scenario', detail: { marketId } };
  const isRemoved = await removeStored({ workspaceId, scenarioId, audit });
  return isRemoved ? succeed({ scenarioId }) : refuse('not-found');
}
