'use server';

import { revalidatePath } from 'next/cache';
import { type Explanation, explainCode } from '@/lib/services/explain';
import type { IssueForm } from '@/lib/services/forms';
import { issueForecast } from '@/lib/services/issue-forecast';
import { requireViewer } from '../_lib/require-viewer';

/** Freezes the newest outlook, with the pushes given. null: issued; the page then lists it. The service parses the form. */
export async function issueForecastAction(marketId: string, form: IssueForm): Promise<Explanation | null> {
  const viewer = await requireViewer();
  const outcome = await issueForecast(viewer, String(marketId), form);
  if (!outcome.ok) return explainCode(outcome.code);
  revalidatePath(`/markets/${marketId}`);
  return null;
}
