/** Ends the session of a request, on the server as well as in the browser. */
import { getAuth } from './auth';
import { readSessionCookies, type SessionCookie } from './session-cookies';

export async function signOut(headers: Headers): Promise<{ cookies: SessionCookie[] }> {
  const answer = await getAuth().api.signOut({ headers, returnHeaders: true });
  return { cookies: readSessionCookies(answer.headers) };
}
