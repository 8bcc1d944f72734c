/** Ids of rows: 128 random bits as 22 characters that need no escaping in an address. */
import { randomBytes } from 'node:crypto';

const ID_BYTES = 16;

export function createId(): string {
  return randomBytes(ID_BYTES).toString('base64url');
}
