/** Takes a dated note off a market. */
import { removeEvent as deleteEvent } from '../store/events';
import { refuse, type Success, succeed } from './outcome';
import type { NotAllowed, NotFound } from './parse-form';
import { canWrite, type Viewer } from './viewer';

export async function removeEvent(
  viewer: Viewer,
  marketId: string,
  eventId: string,
): Promise<Success<{ eventId: string }> | NotAllowed | NotFound> {
  if (!canWrite(viewer)) return refuse('not-allowed');
  const { workspaceId, userId } = viewer;
  const audit = { userId, action: 'remove-event' };
  const isRemoved = await deleteEvent({ workspaceId, marketId, eventId, audit });
  return isRemoved ? succeed({ eventId }) : refuse('not-found');
}
