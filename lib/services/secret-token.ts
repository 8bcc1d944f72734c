/**
 * Tokens of set-up and forecast links. A token is 256 random bits, shown once; the database keeps its SHA-256 only.
 * No salt and no slow hash are needed: unlike a password, nobody can try all tokens.
 */
import { createHash, randomBytes } from 'node:crypto';
import { encodeToken, TOKEN_BYTES } from '../issue/token';

export interface SecretToken {
  token: string;
  tokenHash: string;
}

export function createSecretToken(): SecretToken {
  const token = encodeToken(randomBytes(TOKEN_BYTES));
  return { token, tokenHash: hashToken(token) };
}

export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('base64url');
}
