/** Who sent this request: the member behind its session cookie, or null. */
import { findMembership } from '../store/members';
import { getAuth } from './auth';
import type { Viewer } from './viewer';

export async function findViewer(headers: Headers): Promise<Viewer | null> {
  const session = await getAuth().api.getSession({ headers });
  return session ? findMembership({ userId: session.user.id }) : null;
}
