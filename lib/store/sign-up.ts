/** Making an account through a set-up link. The columns of user and account are better-auth's, as its own sign-up fills them. */
import { Prisma } from '../../prisma/generated/client';
import { insertAuditEntry } from './audit';
import { getPrisma } from './client';
import { createId } from './ids';

/** Better-auth's name for the provider "e-mail and password". */
const PASSWORD_PROVIDER = 'credential';
/** Prisma's code for a broken unique constraint. */
const UNIQUE_VIOLATION = 'P2002';

export interface SignUp {
  tokenHash: string;
  name: string;
  /** Lower case. */
  email: string;
  passwordHash: string;
  now: Date;
}

export type SignUpEnd = 'signed-up' | 'link-gone' | 'email-taken';

/**
 * Uses the link up, makes the account and makes it a member: together or not at all.
 * The guarded update of the link lets one of two simultaneous visitors through.
 */
export async function signUpWithLink(signUp: SignUp): Promise<SignUpEnd> {
  try {
    return await getPrisma().$transaction(async (db) => {
      const [link] = await db.setupLink.updateManyAndReturn({
        where: { tokenHash: signUp.tokenHash, usedAt: null, expiresAt: { gt: signUp.now } },
        data: { usedAt: signUp.now },
        select: { workspaceId: true, role: true },
      });
      if (!link) return 'link-gone';
      const userId = createId();
      await db.user.create({ data: { id: userId, ...newUser(signUp, userId) }, select: { id: true } });
      await db.member.create({ data: { id: createId(), userId, ...link }, select: { id: true } });
      await insertAuditEntry(db, link.workspaceId, {
        userId,
        action: 'accept-setup-link',
        subjectType: 'user',
        subjectId: userId,
        detail: { role: link.role },
      });
      return 'signed-up';
    });
  } catch (error) {
    if (error instanceof Prisma.PrismaClientKnownRequestError && error.code === UNIQUE_VIOLATION)
      return 'email-taken';
    throw error;
  }
}

function newUser({ name, email, passwordHash }: SignUp, userId: string) {
  const account = {
    id: createId(),
    accountId: userId,
    providerId: PASSWORD_PROVIDER,
    password: passwordHash,
  };
  return { name, email, accounts: { create: account } };
}
