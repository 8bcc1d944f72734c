/** The way into the app: whoever holds an unused set-up link makes an account with it, once. */
import { isTokenShaped } from '../issue/token';
import { findSetupLink } from '../store/setup-links';
import { signUpWithLink } from '../store/sign-up';
import { getAuth } from './auth';
import { readClientAddress } from './client-address';
import { countTries, hasTriesLeft, type Try } from './count-tries';
import { type SetupForm, setupFormSchema } from './forms';
import { type Refusal, refuse, type Success, succeed } from './outcome';
import { type InvalidInput, parseForm } from './parse-form';
import { hashToken } from './secret-token';
import type { SessionCookie } from './session-cookies';
import { startSession } from './sign-in';
import type { Role } from './viewer';

type LinkRefusal = Refusal<'not-available'> | Refusal<'too-many-tries'>;

/** Whether the link still opens, and into what. Wrong, used and expired look alike. */
export async function checkSetupLink(
  token: string,
  headers: Headers,
): Promise<Success<{ role: Role; workspaceName: string }> | LinkRefusal> {
  if (!isTokenShaped(token)) return refuse('not-available');
  const guess: Try = { kind: 'setupLink', subject: readClientAddress(headers) };
  if (!(await hasTriesLeft(guess))) return refuse('too-many-tries');
  const link = await findSetupLink({ tokenHash: hashToken(token), now: new Date() });
  if (link) return succeed({ role: link.role, workspaceName: link.workspaceName });
  await countTries([guess]);
  return refuse('not-available');
}

/** Makes the account and signs it in; the returned cookies carry the session. */
export async function acceptSetupLink(
  { token, ...form }: SetupForm & { token: string },
  headers: Headers,
): Promise<Success<{ cookies: SessionCookie[] }> | LinkRefusal | InvalidInput | Refusal<'email-taken'>> {
  const parsed = parseForm(setupFormSchema, form);
  if (!parsed.ok) return parsed;
  // Before the costly hashing, so that a wrong link costs the server little.
  const link = await checkSetupLink(token, headers);
  if (!link.ok) return link;
  const { name, email, password } = parsed.value;
  const passwordHash = await (await getAuth().$context).password.hash(password);
  const tokenHash = hashToken(token);
  const end = await signUpWithLink({ tokenHash, name, email, passwordHash, now: new Date() });
  if (end === 'link-gone') return refuse('not-available');
  if (end === 'email-taken') return refuse('email-taken');
  const cookies = await startSession({ email, password }, headers);
  // Without cookies the account is there and the sign-in page will open it.
  return succeed({ cookies: cookies ?? [] });
}
