'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requestFit } from '@/lib/services/request-fit';
import { requireViewer } from '../_lib/require-viewer';

/** Has the newest revision fitted; the page then shows its progress. null: asked for. */
export async function requestFitAction(marketId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await requestFit(viewer, String(marketId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
