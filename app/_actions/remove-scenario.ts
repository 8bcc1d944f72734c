'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { removeScenario } from '@/lib/services/remove-scenario';
import { requireViewer } from '../_lib/require-viewer';

/** Removes a kept scenario. null: removed. */
export async function removeScenarioAction(
  marketId: string,
  scenarioId: string,
): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await removeScenario(viewer, String(marketId), String(scenarioId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
