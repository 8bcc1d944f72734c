/**
 * Accounts: email and password, kept by better-auth in the app's own database. No call leaves the server.
 * Open sign-up is closed; `accept-setup-link.ts` makes every account. Passwords are hashed by better-auth (scrypt).
 * Its HTTP routes are not mounted: pages sign in and out through `sign-in.ts` and `sign-out.ts`, which count tries.
 */
import 'server-only';
import { prismaAdapter } from 'better-auth/adapters/prisma';
import { betterAuth } from 'better-auth/minimal';
import { getPrisma } from '../store/client';
import { readAuthSecret } from './auth-secret';
import { getSettings } from './env';
import { MAX_PASSWORD_LENGTH, MIN_PASSWORD_LENGTH } from './form-limits';

/** A session ends this long after sign-in, used or not: a page of a server component cannot prolong its cookie. */
const SESSION_SECONDS = 30 * 24 * 60 * 60;

type Auth = ReturnType<typeof createAuth>;

/** One for each pool; there is one pool a process. */
const auths = new WeakMap<object, Auth>();

/** Made on first use, so that a build needs neither settings nor a database. */
export function getAuth(): Auth {
  const prisma = getPrisma();
  const auth = auths.get(prisma) ?? createAuth();
  auths.set(prisma, auth);
  return auth;
}

function createAuth() {
  const settings = getSettings();
  return betterAuth({
    appName: 'Elbowroom',
    baseURL: settings.appUrl,
    secret: readAuthSecret(settings),
    database: prismaAdapter(getPrisma(), { provider: 'postgresql', transaction: true }),
    emailAndPassword: {
      enabled: true,
      disableSignUp: true,
      minPasswordLength: MIN_PASSWORD_LENGTH,
      maxPasswordLength: MAX_PASSWORD_LENGTH,
    },
    session: { expiresIn: SESSION_SECONDS, disableSessionRefresh: true },
    // Tries are counted in the services, for each account as well as for each address.
    rateLimit: { enabled: false },
    telemetry: { enabled: false },
    logger: { disabled: true },
    advanced: { useSecureCookies: settings.isHttps, cookiePrefix: 'elbowroom' },
  });
}
