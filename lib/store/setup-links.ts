/** One-time links that let their holder sign up into a workspace. The token itself is never stored, only its hash. */
import { type AuditInput, insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { createId } from './ids';
import type { Role } from './members';

export interface SetupLink {
  id: string;
  workspaceId: string;
  workspaceName: string;
  role: Role;
  expiresAt: Date;
}

interface NewSetupLink {
  workspaceId: string;
  tokenHash: string;
  role: Role;
  expiresAt: Date;
}

export async function createSetupLink(args: NewSetupLink): Promise<{ linkId: string }> {
  const row = await getPrisma().setupLink.create({ data: { id: createId(), ...args }, select: { id: true } });
  return { linkId: row.id };
}

/** Makes a link and removes the unused earlier ones of the same role: the last one given out is the one that works. */
export async function replaceSetupLink(args: NewSetupLink): Promise<{ linkId: string }> {
  return getPrisma().$transaction(async (db) => {
    await db.setupLink.deleteMany({
      where: { workspaceId: args.workspaceId, role: args.role, usedAt: null },
    });
    const row = await db.setupLink.create({ data: { id: createId(), ...args }, select: { id: true } });
    return { linkId: row.id };
  });
}

/** null: wrong, used or expired. The token is the authority, so there is no workspace to scope by. */
export async function findSetupLink(args: { tokenHash: string; now: Date }): Promise<SetupLink | null> {
  const row = await getPrisma().setupLink.findFirst({
    where: { tokenHash: args.tokenHash, usedAt: null, expiresAt: { gt: args.now } },
    select: {
      id: true,
      workspaceId: true,
      role: true,
      expiresAt: true,
      workspace: { select: { name: true } },
    },
  });
  if (!row) return null;
  const { workspace, ...link } = row;
  return { ...link, workspaceName: workspace.name };
}

/**
 * Uses the link up and makes the user a member, together or not at all.
 * @returns false when the link is wrong, expired or was used in the meantime
 */
export async function redeemSetupLink(args: {
  tokenHash: string;
  userId: string;
  now: Date;
  audit?: Omit<AuditInput, 'subjectId' | 'userId' | 'subjectType'>;
}): Promise<boolean> {
  const { tokenHash, userId, now, audit } = args;
  return getPrisma().$transaction(async (db) => {
    const [used] = await db.setupLink.updateManyAndReturn({
      where: { tokenHash, usedAt: null, expiresAt: { gt: now } },
      data: { usedAt: now },
      select: { workspaceId: true, role: true },
    });
    if (!used) return false;
    const member = await db.member.create({
      data: { id: createId(), userId, ...used },
      select: { id: true },
    });
    if (audit) {
      await insertAuditEntry(db, used.workspaceId, {
        ...audit,
        userId,
        subjectType: 'member',
        subjectId: member.id,
      });
    }
    return true;
  });
}
