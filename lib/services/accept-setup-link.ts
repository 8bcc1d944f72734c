/** The way into the app: whoever holds an unused set-up link makes an account with it, once. */
import { findSetupLink } from '../store/setup-links';
import { signUpWithLink } from '../store/sign-up';
import { getAuth } from './auth';
import { readClientAddress } from './client-address';
import { countTries, hasTriesLeft, type Try } from './count-tries';
import { type FieldProblem, listFieldProblems } from './field-problems';
import { type SetupForm, setupFormSchema } from './forms';
import { type Outcome, type Refusal, refuse, succeed } from './outcome';
import { hashToken } from './secret-token';
import type { SessionCookie } from './session-cookies';
import { startSession } from './sign-in';
import type { Role } from './viewer';

type LinkRefusal = Refusal<'not-available'> | Refusal<'too-many-tries'>;

/** Whether the link still opens, and into what. Wrong, used and expired look alike. */
export async function checkSetupLink(
  token: string,
  headers: Headers,
): Promise<Outcome<{ role: Role; workspaceName: string }, 'not-available' | 'too-many-tries'>> {
  const guess: Try = { kind: 'setupLink', subject: readClientAddress(headers) };
  if (!(await hasTriesLeft(guess))) return refuse('too-many-tries');
  const link = await findSetupLink({ tokenHash: hashToken(token), now: new Date() });
  if (link) return succeed({ role: link.role, workspaceName: link.workspaceName });
  await countTries([guess]);
  return refuse('not-available');
}

/** Makes the account and signs it in; the returned cookies carry the session. */
export async function acceptSetupLink(
  input: SetupForm & { token: string },
  headers: Headers,
): Promise<
  | { ok: true; value: { cookies: SessionCookie[] } }
  | LinkRefusal
  | Refusal<'invalid-input', { fields: FieldProblem[] }>
  | Refusal<'email-taken'>
> {
  const form = setupFormSchema.safeParse(input);
  if (!form.success) return refuse('invalid-input', { fields: listFieldProblems(form.error) });
  // Before the costly hashing, so that a wrong link costs the server little.
  const link = await checkSetupLink(input.token, headers);
  if (!link.ok) return link;
  const { name, email, password } = form.data;
  const passwordHash = await (await getAuth().$context).password.hash(password);
  const end = await signUpWithLink({
    tokenHash: hashToken(input.token),
    name,
    email,
    passwordHash,
    now: new Date(),
  });
  if (end === 'link-gone') return refuse('not-available');
  if (end === 'email-taken') return refuse('email-taken');
  const cookies = await startSession({ email, password }, headers);
  // Without cookies the account is there and the sign-in page will open it.
  return succeed({ cookies: cookies ?? [] });
}
