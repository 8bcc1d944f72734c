'use server';

import { revalidatePath } from 'next/cache';
import { archiveMarket } from '@/lib/services/archive-market';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { requireViewer } from '../_lib/require-viewer';

/** Takes a market off the list. Its counts, outlooks and issued forecasts stay, and so do forecast links. null: done. */
export async function archiveMarketAction(marketId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await archiveMarket(viewer, String(marketId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath('/');
  revalidatePath(`/markets/${marketId}`);
  return null;
}
