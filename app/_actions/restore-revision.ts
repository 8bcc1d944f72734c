'use server';

import { redirect } from 'next/navigation';
import { type Explanation, explainCode } from '@/lib/services/explain';
import type { RestoreForm } from '@/lib/services/forms';
import { restoreRevision } from '@/lib/services/restore-revision';
import { requireViewer } from '../_lib/require-viewer';

/** Brings back an earlier revision as a new one and opens the market's page; or says why not. */
export async function restoreRevisionAction(marketId: string, form: RestoreForm): Promise<Explanation> {
  const viewer = await requireViewer();
  const outcome = await restoreRevision(viewer, String(marketId), form);
  if (outcome.ok) redirect(`/markets/${marketId}`);
  return explainCode(outcome.code);
}
