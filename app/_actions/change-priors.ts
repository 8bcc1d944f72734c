'use server';

import { revalidatePath } from 'next/cache';
import { changePriors } from '@/lib/services/change-priors';
import { type Explanation, explainCode } from '@/lib/services/explain';
import type { PriorForm } from '@/lib/services/forms';
import { requireViewer } from '../_lib/require-viewer';

/** Changes what is assumed of a market before its counts, and has it fitted so. null: asked for. */
export async function changePriorsAction(marketId: string, form: PriorForm): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await changePriors(viewer, String(marketId), form);
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
