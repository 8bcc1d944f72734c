'use server';

import { headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { acceptSetupLink } from '@/lib/services/accept-setup-link';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { applyCookies } from '../_lib/apply-cookies';
import { explainFields, type FieldSentences } from '../_lib/explain-field';

export interface SetupState {
  name: string;
  email: string;
  fields: FieldSentences;
  explanation: Explanation | null;
}

/** Makes the account that a set-up link allows, signs it in and opens the markets. The service parses the form's schema. */
export async function acceptSetupLinkAction(_previous: SetupState, data: FormData): Promise<SetupState> {
  const read = (field: string) => String(data.get(field) ?? '');
  const form = { token: read('token'), name: read('name'), email: read('email'), password: read('password') };
  const outcome = await acceptSetupLink(form, await headers());
  if (!outcome.ok) {
    const fields = outcome.code === 'invalid-input' ? explainFields(outcome.fields) : {};
    return { name: form.name, email: form.email, fields, explanation: explainCode(outcome.code) };
  }
  await applyCookies(outcome.value.cookies);
  redirect('/');
}
