'use server';

import { redirect } from 'next/navigation';
import { editMarket } from '@/lib/services/edit-market';
import type { MarketEdit } from '@/lib/services/forms';
import { type FormRefusal, readRefusal } from '../_lib/form-refusal';
import { requireViewer } from '../_lib/require-viewer';

/** Changes a market and opens its brief; or says why not. The service parses the form. */
export async function editMarketAction(marketId: string, edit: MarketEdit): Promise<FormRefusal> {
  const viewer = await requireViewer();
  const outcome = await editMarket(viewer, String(marketId), edit);
  if (!outcome.ok) return readRefusal(outcome);
  redirect(`/markets/${marketId}`);
}
