/** Sets the cookies that a service asks for. Server actions only: a page cannot set cookies while it renders. */
import 'server-only';
import { cookies } from 'next/headers';
import type { SessionCookie } from '@/lib/services/session-cookies';

export async function applyCookies(list: SessionCookie[]): Promise<void> {
  const jar = await cookies();
  for (const { name, value, options } of list) jar.set(name, value, options);
}
