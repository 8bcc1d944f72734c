/** Who belongs to a workspace, with which role. */
import { getPrisma } from './client';
import { createId } from './ids';

export type Role = 'owner' | 'analyst' | 'reader';

export interface Membership {
  userId: string;
  userName: string;
  workspaceId: string;
  workspaceName: string;
  role: Role;
}

export interface Member {
  userId: string;
  name: string;
  email: string;
  role: Role;
  joinedAt: Date;
}

/** The user's first workspace; null when the user belongs to none. */
export async function findMembership(args: { userId: string }): Promise<Membership | null> {
  const row = await getPrisma().member.findFirst({
    where: { userId: args.userId },
    orderBy: [{ createdAt: 'asc' }, { id: 'asc' }],
    select: {
      userId: true,
      role: true,
      workspaceId: true,
      user: { select: { name: true } },
      workspace: { select: { name: true } },
    },
  });
  if (!row) return null;
  const { userId, workspaceId, role, user, workspace } = row;
  return { userId, userName: user.name, workspaceId, workspaceName: workspace.name, role };
}

export async function addMember(args: { workspaceId: string; userId: string; role: Role }): Promise<void> {
  await getPrisma().member.create({ data: { id: createId(), ...args }, select: { id: true } });
}

export async function listMembers(args: { workspaceId: string }): Promise<Member[]> {
  const rows = await getPrisma().member.findMany({
    where: { workspaceId: args.workspaceId },
    orderBy: [{ createdAt: 'asc' }, { id: 'asc' }],
    select: { userId: true, role: true, createdAt: true, user: { select: { name: true, email: true } } },
  });
  return rows.map(({ userId, role, createdAt, user }) => ({ userId, ...user, role, joinedAt: createdAt }));
}

export async function hasOwner(args: { workspaceId: string }): Promise<boolean> {
  const owners = await getPrisma().member.count({ where: { workspaceId: args.workspaceId, role: 'owner' } });
  return owners > 0;
}
