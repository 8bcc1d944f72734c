/** Who is in the workspace. Every member may see it; e-mail addresses only owners. */
import { listMembers as listStoredMembers } from '../store/members';
import type { Role, Viewer } from './viewer';
import { canInvite } from './viewer';

export interface MemberRow {
  userId: string;
  name: string;
  email: string | null;
  role: Role;
  joinedAt: Date;
}

export async function listMembers(viewer: Viewer): Promise<MemberRow[]> {
  const members = await listStoredMembers({ workspaceId: viewer.workspaceId });
  return members.map((member) => ({ ...member, email: canInvite(viewer) ? member.email : null }));
}
