/** An owner invites an analyst or a reader: a one-time set-up link, shown once. */

import { addAuditEntry } from '../store/audit';
import { createSetupLink } from '../store/setup-links';
import { type FieldProblem, listFieldProblems } from './field-problems';
import { type MemberLinkForm, memberLinkFormSchema } from './forms';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import { createSecretToken } from './secret-token';
import { setupLinkExpiry, setupLinkPath } from './setup-link';
import { canInvite, type Viewer } from './viewer';

export async function createMemberLink(
  viewer: Viewer,
  form: MemberLinkForm,
): Promise<
  | Success<{ path: string; expiresAt: Date }>
  | Refusal<'not-allowed'>
  | Refusal<'invalid-input', { fields: FieldProblem[] }>
> {
  if (!canInvite(viewer)) return refuse('not-allowed');
  const parsed = memberLinkFormSchema.safeParse(form);
  if (!parsed.success) return refuse('invalid-input', { fields: listFieldProblems(parsed.error) });
  const { token, tokenHash } = createSecretToken();
  const expiresAt = setupLinkExpiry(new Date());
  const { workspaceId, userId } = viewer;
  const { linkId } = await createSetupLink({ workspaceId, tokenHash, role: parsed.data.role, expiresAt });
  await addAuditEntry({
    workspaceId,
    userId,
    action: 'create-member-link',
    subjectType: 'setup-link',
    subjectId: linkId,
    detail: { role: parsed.data.role },
  });
  return succeed({ path: setupLinkPath(token), expiresAt });
}
