/**
 * Counting of tries, in the database, so that several web processes share one count and a restart forgets nothing.
 * Only failures are kept: a success gives the try back.
 */
import { createHash } from 'node:crypto';
import { RateLimiterPrisma, RateLimiterRes } from 'rate-limiter-flexible';
import { getPrisma } from '../store/client';

const MINUTE = 60;

/** Tries within a window of so many seconds. */
export const TRY_LIMITS = {
  /** From one address at one account: somebody who mistypes. */
  signInPair: { points: 10, duration: 15 * MINUTE },
  /** At one account from anywhere; NIST SP 800-63B section 5.2.2 asks for at most 100 in a row. */
  signInAccount: { points: 60, duration: 60 * MINUTE },
  /** From one address at any account: an office behind one address must still get in. */
  signInAddress: { points: 60, duration: 15 * MINUTE },
  /** Set-up tokens that were not there, from one address. */
  setupLink: { points: 30, duration: 15 * MINUTE },
  /** Forecast tokens that were not there, from one address. */
  forecastLink: { points: 60, duration: 15 * MINUTE },
} as const;

type TryKind = keyof typeof TRY_LIMITS;

export interface Try {
  kind: TryKind;
  /** Whom it is counted for; stored hashed. */
  subject: string;
}

/** For each pool; there is one pool a process. */
const limiters = new WeakMap<object, Map<TryKind, RateLimiterPrisma>>();

/** Counts the tries; false when one of them is one too many. */
export async function countTries(tries: Try[]): Promise<boolean> {
  const results = await Promise.all(tries.map(countTry));
  return results.every(Boolean);
}

/** Takes back tries that turned out well. */
export async function forgiveTries(tries: Try[]): Promise<void> {
  await Promise.all(tries.map(({ kind, subject }) => getLimiter(kind).reward(hashSubject(subject), 1)));
}

/** Whether so many tries have failed that the next is refused, without counting one. */
export async function hasTriesLeft({ kind, subject }: Try): Promise<boolean> {
  const state = await getLimiter(kind).get(hashSubject(subject));
  return state === null || state.consumedPoints < TRY_LIMITS[kind].points;
}

async function countTry({ kind, subject }: Try): Promise<boolean> {
  try {
    await getLimiter(kind).consume(hashSubject(subject), 1);
    return true;
  } catch (refusal) {
    if (refusal instanceof RateLimiterRes) return false;
    throw refusal;
  }
}

function getLimiter(kind: TryKind): RateLimiterPrisma {
  const storeClient = getPrisma();
  const ofPool = limiters.get(storeClient) ?? new Map<TryKind, RateLimiterPrisma>();
  limiters.set(storeClient, ofPool);
  const limiter = ofPool.get(kind) ?? createLimiter(kind, storeClient);
  ofPool.set(kind, limiter);
  return limiter;
}

function createLimiter(kind: TryKind, storeClient: object): RateLimiterPrisma {
  return new RateLimiterPrisma({ storeClient, tableName: 'rateLimit', keyPrefix: kind, ...TRY_LIMITS[kind] });
}

/** E-mail and network addresses are personal data: the table holds only their hash. */
function hashSubject(subject: string): string {
  return createHash('sha256').update(subject).digest('base64url');
}
