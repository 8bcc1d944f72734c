/** Who is asking, in which workspace, with which role. Only `find-viewer.ts` makes one from a request. */
import type { Membership, Role } from '../store/members';

export type { Role };
export type Viewer = Membership;

/** Owners and analysts change markets and issue forecasts; readers look. */
export function canWrite(viewer: Viewer): boolean {
  return viewer.role === 'owner' || viewer.role === 'analyst';
}

/** Owners invite members. */
export function canInvite(viewer: Viewer): boolean {
  return viewer.role === 'owner';
}
