/** Tells whether something made from sources is out of date: a hash of their names and bytes, kept beside what was made. */
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';

/**
 * @param {string} root
 * @param {string[]} names files and folders below root; missing ones count as empty
 * @returns {string} SHA-256, hexadecimal
 */
export function hashSources(root, names) {
  const hash = createHash('sha256');
  for (const name of names) {
    if (existsSync(join(root, name))) addToHash(hash, root, name);
  }
  return hash.digest('hex');
}

/** @returns {boolean} whether the stamp holds that hash */
export function hasStamp(stampPath, hash) {
  return existsSync(stampPath) && readFileSync(stampPath, 'utf8') === hash;
}

function addToHash(hash, root, name) {
  const path = join(root, name);
  if (statSync(path).isDirectory()) {
    for (const entry of readdirSync(path).sort()) addToHash(hash, root, join(name, entry));
    return;
  }
  const bytes = readFileSync(path);
  hash.update(`${name}\0${bytes.length}\0`).update(bytes);
}
