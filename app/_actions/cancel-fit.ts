'use server';

import { revalidatePath } from 'next/cache';
import { cancelFit } from '@/lib/services/cancel-fit';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requireViewer } from '../_lib/require-viewer';

/** Cancels the fit that waits or runs. null: asked for. */
export async function cancelFitAction(marketId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await cancelFit(viewer, String(marketId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
