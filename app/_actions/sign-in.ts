'use server';

import { headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { type Explanation, explainCode } from '@/lib/services/explain';
import { listFieldProblems } from '@/lib/services/field-problems';
import { signInFormSchema } from '@/lib/services/forms';
import { signIn } from '@/lib/services/sign-in';
import { applyCookies } from '../_lib/apply-cookies';
import { explainFields, type FieldSentences } from '../_lib/explain-field';
import { readSafePath } from '../_lib/safe-path';

export interface SignInState {
  email: string;
  fields: FieldSentences;
  explanation: Explanation | null;
}

/** Signs in and opens the page that was asked for, or says why not. */
export async function signInAction(_previous: SignInState, data: FormData): Promise<SignInState> {
  const email = String(data.get('email') ?? '');
  const form = signInFormSchema.safeParse({ email, password: data.get('password') });
  if (!form.success)
    return { email, fields: explainFields(listFieldProblems(form.error)), explanation: null };
  const outcome = await signIn(form.data, await headers());
  if (!outcome.ok) return { email, fields: {}, explanation: explainCode(outcome.code) };
  await applyCookies(outcome.value.cookies);
  redirect(readSafePath(data.get('next')));
}
