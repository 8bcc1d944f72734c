/** Adds a dated note to a market. */
import { addEvent as storeEvent } from '../store/events';
import { type EventForm, eventFormSchema } from './forms';
import { refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import type { Viewer } from './viewer';

export async function addEvent(
  viewer: Viewer,
  marketId: string,
  form: EventForm,
): Promise<Success<{ eventId: string }> | NotAllowed | InvalidInput | NotFound> {
  const parsed = parseWrite(viewer, eventFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const audit = { userId, action: 'add-event', detail: { month: parsed.value.month } };
  const stored = await storeEvent({ workspaceId, marketId, ...parsed.value, audit });
  return stored ? succeed(stored) : refuse('not-found');
}
