'use server';

import { redirect } from 'next/navigation';
import { addRevision } from '@/lib/services/add-revision';
import type { RevisionForm } from '@/lib/services/forms';
import { type FormRefusal, readRefusal } from '../_lib/form-refusal';
import { requireViewer } from '../_lib/require-viewer';

/** Stores the next revision and opens the market's page, where its fit shows its progress; or says why not. */
export async function addRevisionAction(marketId: string, form: RevisionForm): Promise<FormRefusal> {
  const viewer = await requireViewer();
  const outcome = await addRevision(viewer, String(marketId), form);
  if (!outcome.ok) return readRefusal(outcome);
  redirect(`/markets/${marketId}`);
}
