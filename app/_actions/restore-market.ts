'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { restoreMarket } from '@/lib/services/restore-market';
import { requireViewer } from '../_lib/require-viewer';

/** Puts an archived market back on the list. null: done. */
export async function restoreMarketAction(marketId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await restoreMarket(viewer, String(marketId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath('/');
  revalidatePath(`/markets/${marketId}`);
  return null;
}
