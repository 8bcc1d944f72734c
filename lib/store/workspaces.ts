/** Workspaces: the scope of everything else. */
import { getPrisma } from './client';
import { createId } from './ids';

/** Name of the workspace that is made when there is none yet. */
export const FIRST_WORKSPACE_NAME = 'Our workspace';

export interface Workspace {
  id: string;
  name: string;
}

export async function createWorkspace(args: { id?: string; name: string }): Promise<Workspace> {
  return getPrisma().workspace.create({
    data: { id: args.id ?? createId(), name: args.name },
    select: { id: true, name: true },
  });
}

/** Makes it when it is not there; leaves an existing one, and its name, as it is. */
export async function ensureWorkspace(args: { id: string; name: string }): Promise<Workspace> {
  return getPrisma().workspace.upsert({
    where: { id: args.id },
    create: { id: args.id, name: args.name },
    update: {},
    select: { id: true, name: true },
  });
}

export async function findWorkspace(args: { workspaceId: string }): Promise<Workspace | null> {
  return getPrisma().workspace.findUnique({
    where: { id: args.workspaceId },
    select: { id: true, name: true },
  });
}

/** The workspace that was made first: the one whose owner the set-up link is for. */
export async function findFirstWorkspace(): Promise<Workspace | null> {
  return getPrisma().workspace.findFirst({
    orderBy: [{ createdAt: 'asc' }, { id: 'asc' }],
    select: { id: true, name: true },
  });
}
