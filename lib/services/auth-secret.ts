/**
 * The secret that signs session cookies: AUTH_SECRET, or one made at the first start and kept in the data folder,
 * readable by its owner only. Without either, everybody would be signed out at each restart.
 */
import { randomBytes } from 'node:crypto';
import { linkSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { AppError } from './app-error';
import type { Settings } from './env';

const SECRET_FILE = 'auth-secret';
const SECRET_BYTES = 32;

/** @throws AppError 'no-secret' when there is none and none can be kept. */
export function readAuthSecret(settings: Settings): string {
  if (settings.authSecret) return settings.authSecret;
  const path = join(settings.dataFolder, SECRET_FILE);
  try {
    return readSecret(path) ?? makeSecret(settings.dataFolder, path);
  } catch (cause) {
    throw new AppError('no-secret', `AUTH_SECRET is not set and ${path} cannot be read or made`, { cause });
  }
}

function readSecret(path: string): string | null {
  try {
    return readFileSync(path, 'utf8').trim();
  } catch (error) {
    if (isErrno(error, 'ENOENT')) return null;
    throw error;
  }
}

/** Written aside and linked into place: of several processes one wins, and nobody reads a half-written file. */
function makeSecret(folder: string, path: string): string {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const secret = randomBytes(SECRET_BYTES).toString('base64url');
  const draft = `${path}.${process.pid}`;
  writeFileSync(draft, `${secret}\n`, { mode: 0o600 });
  try {
    linkSync(draft, path);
    return secret;
  } catch (error) {
    const other = isErrno(error, 'EEXIST') ? readSecret(path) : null;
    if (other) return other;
    throw error;
  } finally {
    rmSync(draft, { force: true });
  }
}

function isErrno(error: unknown, code: string): boolean {
  return error instanceof Error && 'code' in error && error.code === code;
}
