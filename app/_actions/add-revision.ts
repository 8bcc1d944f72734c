'use server';

import { redirect } from 'next/navigation';
import type { SeriesProblem } from '@/lib/series/types';
import { addRevision, type NewestContent } from '@/lib/services/add-revision';
import type { RevisionForm } from '@/lib/services/forms';
import { type FormRefusal, readRefusal } from '../_lib/form-refusal';
import { requireViewer } from '../_lib/require-viewer';

export interface RevisionFormRefusal extends FormRefusal {
  /** The revision that somebody else stored meanwhile. */
  newest?: NewestContent;
  problems?: SeriesProblem[];
}

/** Stores the next revision and opens the market's page, where its fit shows its progress; or says why not. */
export async function addRevisionAction(marketId: string, form: RevisionForm): Promise<RevisionFormRefusal> {
  const viewer = await requireViewer();
  const outcome = await addRevision(viewer, String(marketId), form);
  if (outcome.ok) redirect(`/markets/${marketId}`);
  const refusal = readRefusal(outcome);
  if (outcome.code === 'newer-revision') return { ...refusal, newest: outcome.newest };
  if (outcome.code === 'unreadable-series') return { ...refusal, problems: outcome.problems };
  return refusal;
}
