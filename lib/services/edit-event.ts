/** Changes a dated note of a market. */
import { changeEvent } from '../store/events';
import { type EventForm, eventFormSchema } from './forms';
import { refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import type { Viewer } from './viewer';

export async function editEvent(
  viewer: Viewer,
  marketId: string,
  eventId: string,
  form: EventForm,
): Promise<Success<{ eventId: string }> | NotAllowed | InvalidInput | NotFound> {
  const parsed = parseWrite(viewer, eventFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const audit = { userId, action: 'edit-event', detail: { month: parsed.value.month } };
  const isChanged = await changeEvent({ workspaceId, marketId, eventId, ...parsed.value, audit });
  return isChanged ? succeed({ eventId }) : refuse('not-found');
}
