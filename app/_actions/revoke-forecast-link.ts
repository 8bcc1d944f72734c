'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { revokeForecastLink } from '@/lib/services/revoke-forecast-link';
import { requireViewer } from '../_lib/require-viewer';

/** Withdraws a forecast link for good. null: withdrawn. */
export async function revokeForecastLinkAction(
  marketId: string,
  linkId: string,
): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await revokeForecastLink(viewer, String(linkId));
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
