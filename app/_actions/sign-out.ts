'use server';

import { headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { signOut } from '@/lib/services/sign-out';
import { applyCookies } from '../_lib/apply-cookies';

/** Ends the session and leads to the sign-in page. */
export async function signOutAction(): Promise<void> {
  const { cookies } = await signOut(await headers());
  await applyCookies(cookies);
  redirect('/sign-in');
}
