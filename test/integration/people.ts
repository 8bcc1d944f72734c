/** People and workspaces for tests of the services. */
import { acceptSetupLink } from '@/lib/services/accept-setup-link';
import type { SessionCookie } from '@/lib/services/session-cookies';
import type { Role, Viewer } from '@/lib/services/viewer';
import { createId } from '@/lib/store/ids';
import { createWorkspace } from '@/lib/store/workspaces';

export const PASSWORD = 'correct horse battery';

/** Requests from addresses of their own do not share a count of tries. */
let lastAddress = 0;
export function visitorHeaders(cookies: SessionCookie[] = []): Headers {
  const cookie = cookies.map(({ name, value }) => `${name}=${encodeURIComponent(value)}`).join('; ');
  const headers = new Headers({ 'x-forwarded-for': `10.0.${lastAddress >> 8}.${lastAddress & 255}` });
  lastAddress += 1;
  if (cookie) headers.set('cookie', cookie);
  return headers;
}

/** A member of a new workspace, without an account: services trust the viewer they are given. */
export async function makeViewer(role: Role = 'owner'): Promise<Viewer> {
  const workspace = await createWorkspace({ name: 'Umbra Analytics' });
  return asMember({ workspaceId: workspace.id, workspaceName: workspace.name }, role);
}

export function asMember(of: Pick<Viewer, 'workspaceId' | 'workspaceName'>, role: Role): Viewer {
  const { workspaceId, workspaceName } = of;
  return { userId: createId(), userName: `Some ${role}`, workspaceId, workspaceName, role };
}

/** Token of a set-up link, from its address or path. */
export function tokenOf(link: string): string {
  return link.split('/').at(-1) ?? '';
}

export async function signUp(link: string, email: string, headers = visitorHeaders()) {
  return acceptSetupLink({ token: tokenOf(link), name: 'Ines Marlow', email, password: PASSWORD }, headers);
}
