'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { removeEvent } from '@/lib/services/remove-event';
import { requireViewer } from '../_lib/require-viewer';

/** Takes an event off a market. null: removed. */
export async function removeEventAction(marketId: string, eventId: string): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await removeEvent(viewer, String(marketId), String(eventId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`, 'layout');
  return null;
}
