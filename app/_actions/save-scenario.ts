'use server';

import { revalidatePath } from 'next/cache';
import type { ScenarioForm } from '@/lib/services/forms';
import { saveScenario } from '@/lib/services/save-scenario';
import { type FormRefusal, readRefusal } from '../_lib/form-refusal';
import { requireViewer } from '../_lib/require-viewer';

/** Keeps a named set of pushes with its market. null: kept. The service parses the form. */
export async function saveScenarioAction(marketId: string, form: ScenarioForm): Promise<FormRefusal | null> {
  const viewer = await requireViewer();
  const outcome = await saveScenario(viewer, String(marketId), form);
  if (!outcome.ok) return readRefusal(outcome);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
