'use server';

import { redirect } from 'next/navigation';
import { createMarket } from '@/lib/services/create-market';
import type { MarketForm } from '@/lib/services/forms';
import { type FormRefusal, readRefusal } from '../_lib/form-refusal';
import { requireViewer } from '../_lib/require-viewer';

/** Stores a new market and opens its page, where the fit shows its progress; or says why not. The service parses the form. */
export async function createMarketAction(form: MarketForm): Promise<FormRefusal> {
  const viewer = await requireViewer('/markets/new');
  const outcome = await createMarket(viewer, form);
  if (!outcome.ok) return readRefusal(outcome);
  redirect(`/markets/${outcome.value.marketId}`);
}
