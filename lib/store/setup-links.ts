/** One-time links that let their holder sign up into a workspace. The token itself is never stored, only its hash. */
import { type Deed, insertAuditEntry } from './audit';
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

export async function createSetupLink(args: NewSetupLink & { audit?: Deed }): Promise<{ linkId: string }> {
  const { audit, ...columns } = args;
  return getPrisma().$transaction(async (db) => {
    const { id } = await db.setupLink.create({ data: { id: createId(), ...columns }, select: { id: true } });
    if (audit) {
      await insertAuditEntry(db, args.workspaceId, { ...audit, subjectType: 'setup-link', subjectId: id });
    }
    return { linkId: id };
  });
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
