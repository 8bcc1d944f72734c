'use server';

import { revalidatePath } from 'next/cache';
import { addEvent } from '@/lib/services/add-event';
import { editEvent } from '@/lib/services/edit-event';
import type { EventForm } from '@/lib/services/forms';
import { type FormRefusal, readRefusal } from '../_lib/form-refusal';
import { requireViewer } from '../_lib/require-viewer';

/** Adds an event to a market, or changes the one named. null: saved. The service parses the form. */
export async function saveEventAction(
  marketId: string,
  eventId: string | null,
  form: EventForm,
): Promise<FormRefusal | null> {
  const viewer = await requireViewer();
  const outcome =
    eventId === null
      ? await addEvent(viewer, String(marketId), form)
      : await editEvent(viewer, String(marketId), String(eventId), form);
  if (!outcome.ok) return readRefusal(outcome);
  revalidatePath(`/markets/${marketId}`, 'layout');
  return null;
}
