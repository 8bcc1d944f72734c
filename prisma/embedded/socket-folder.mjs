/**
 * The folder of the embedded database's Unix socket, readable by this user alone.
 * The system allows about 100 bytes for the path of a socket; a data folder deeper than that gets a short folder elsewhere.
 */
import { chmodSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Name that PostgreSQL clients look for in the folder, for the port they assume. */
const SOCKET_NAME = '.s.PGSQL.5432';
/** Bytes. macOS allows 103, Linux 107. */
const MAX_SOCKET_PATH = 103;

/**
 * @param {string | null} preferred folder to use when its path is short enough; null: a new one under the system's temporary folder
 * @returns {{ folder: string, path: string, remove: () => void }} `remove` deletes what was made
 */
export function makeSocketFolder(preferred) {
  const isShort = preferred !== null && Buffer.byteLength(join(preferred, SOCKET_NAME)) <= MAX_SOCKET_PATH;
  const folder = isShort ? preferred : mkdtempSync(join(tmpdir(), 'elbowroom-'));
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  chmodSync(folder, 0o700);
  const path = join(folder, SOCKET_NAME);
  rmSync(path, { force: true });
  return { folder, path, remove: () => rmSync(folder, { recursive: true, force: true }) };
}
