/**
 * The link with which the first person signs up as owner. The launcher prints it at each start while there is no owner;
 * each printing replaces the link before.
 */
import { hasOwner } from '../store/members';
import { replaceSetupLink } from '../store/setup-links';
import { createWorkspace, FIRST_WORKSPACE_NAME, findFirstWorkspace } from '../store/workspaces';
import { getSettings } from './env';
import { createSecretToken } from './secret-token';
import { setupLinkExpiry, setupLinkPath } from './setup-link';

/** Full address of the link, or null once there is an owner. */
export async function createOwnerSetupLink(): Promise<string | null> {
  const workspace = (await findFirstWorkspace()) ?? (await createWorkspace({ name: FIRST_WORKSPACE_NAME }));
  if (await hasOwner({ workspaceId: workspace.id })) return null;
  const { token, tokenHash } = createSecretToken();
  await replaceSetupLink({
    workspaceId: workspace.id,
    tokenHash,
    role: 'owner',
    expiresAt: setupLinkExpiry(new Date()),
  });
  return `${getSettings().appUrl}${setupLinkPath(token)}`;
}
