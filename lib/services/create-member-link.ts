/** An owner invites an analyst or a reader: a one-time set-up link, shown once. */
import { createSetupLink } from '../store/setup-links';
import { type MemberLinkForm, memberLinkFormSchema } from './forms';
import { refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, parseForm } from './parse-form';
import { createSecretToken } from './secret-token';
import { setupLinkExpiry, setupLinkPath } from './setup-link';
import { canInvite, type Viewer } from './viewer';

export async function createMemberLink(
  viewer: Viewer,
  form: MemberLinkForm,
): Promise<Success<{ path: string; expiresAt: Date }> | NotAllowed | InvalidInput> {
  if (!canInvite(viewer)) return refuse('not-allowed');
  const parsed = parseForm(memberLinkFormSchema, form);
  if (!parsed.ok) return parsed;
  const { role } = parsed.value;
  const { workspaceId, userId } = viewer;
  const { token, tokenHash } = createSecretToken();
  const expiresAt = setupLinkExpiry(new Date());
  const audit = { userId, action: 'create-member-link', detail: { role } };
  await createSetupLink({ workspaceId, tokenHash, role, expiresAt, audit });
  return succeed({ path: setupLinkPath(token), expiresAt });
}
