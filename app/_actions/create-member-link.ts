'use server';

import { createMemberLink } from '@/lib/services/create-member-link';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { memberLinkFormSchema } from '@/lib/services/forms';
import { formatDay } from '../_lib/locale';
import { publicUrl } from '../_lib/public-url';
import { requireViewer } from '../_lib/require-viewer';

export interface MemberLinkState {
  link: { url: string; role: 'analyst' | 'reader'; expires: string } | null;
  explanation: Explanation | null;
}

/** Makes a one-time set-up link for a new member. */
export async function createMemberLinkAction(
  _previous: MemberLinkState,
  data: FormData,
): Promise<MemberLinkState> {
  const viewer = await requireViewer('/members');
  const form = memberLinkFormSchema.safeParse({ role: data.get('role') });
  if (!form.success) return { link: null, explanation: explainCode('invalid-input') };
  const outcome = await createMemberLink(viewer, form.data);
  if (!outcome.ok) return { link: null, explanation: explainCode(outcome.code) };
  const { path, expiresAt } = outcome.value;
  return {
    link: { url: publicUrl(path), role: form.data.role, expires: formatDay(expiresAt) },
    explanation: null,
  };
}
