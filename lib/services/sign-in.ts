/** Signs a person in. A wrong password and an unknown account look alike; tries are counted before the password is looked at. */
import { APIError } from 'better-auth/api';
import { getAuth } from './auth';
import { readClientAddress } from './client-address';
import { countTries, forgiveTries, type Try } from './count-tries';
import { type SignInForm, signInFormSchema } from './forms';
import { type Outcome, refuse, succeed } from './outcome';
import { readSessionCookies, type SessionCookie } from './session-cookies';

export async function signIn(
  form: SignInForm,
  headers: Headers,
): Promise<Outcome<{ cookies: SessionCookie[] }, 'wrong-credentials' | 'too-many-tries'>> {
  const parsed = signInFormSchema.safeParse(form);
  if (!parsed.success) return refuse('wrong-credentials');
  const tries = listTries(parsed.data.email, readClientAddress(headers));
  if (!(await countTries(tries))) return refuse('too-many-tries');
  const cookies = await startSession(parsed.data, headers);
  if (!cookies) return refuse('wrong-credentials');
  await forgiveTries(tries);
  return succeed({ cookies });
}

/** Cookies of a new session, or null when e-mail and password do not belong together. */
export async function startSession(
  credentials: { email: string; password: string },
  headers: Headers,
): Promise<SessionCookie[] | null> {
  try {
    const answer = await getAuth().api.signInEmail({ body: credentials, headers, returnHeaders: true });
    return readSessionCookies(answer.headers);
  } catch (error) {
    if (error instanceof APIError && (error.statusCode === 401 || error.statusCode === 400)) return null;
    throw error;
  }
}

function listTries(email: string, address: string): Try[] {
  return [
    { kind: 'signInPair', subject: `${address} ${email}` },
    { kind: 'signInAccount', subject: email },
    { kind: 'signInAddress', subject: address },
  ];
}
