import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { ensureInstalled, explainOldNode } from '@/prisma/launch/install.mjs';
import packageFile from '../../../package.json' with { type: 'json' };

it('takes every Node from the one that package.json names', () => {
  const [major, minor] = packageFile.engines.node.replace('>=', '').split('.').map(Number);
  expect(explainOldNode(`${major}.${minor}.0`)).toBeNull();
  expect(explainOldNode(`${major! + 1}.0.0`)).toBeNull();
  expect(explainOldNode(`${major}.${minor! - 1}.9`)).not.toBeNull();
  expect(explainOldNode(`${major! - 1}.99.9`)).not.toBeNull();
});

it('names the version wanted and the version found in one sentence', () => {
  expect(explainOldNode('18.20.8')).toMatch(
    /^[^.\n]+20\.19 or newer, and this is Node 18\.20\.8: [^.\n]+\.$/,
  );
});

let root: string;
beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'elbowroom-install-'));
  mkdirSync(join(root, 'node_modules'));
});
afterEach(() => rmSync(root, { recursive: true, force: true }));

type Packages = Record<string, { version: string; optional?: boolean }>;

/** Whether an installation would start, given the lockfile's packages and npm's own list of what it installed. */
function wouldInstall(wanted: Packages, installed: Packages | null): boolean {
  writeFileSync(join(root, 'package-lock.json'), JSON.stringify({ packages: wanted }));
  const kept = join(root, 'node_modules', '.package-lock.json');
  rmSync(kept, { force: true });
  if (installed) writeFileSync(kept, JSON.stringify({ packages: installed }));
  const started = new Error('installation started');
  try {
    ensureInstalled(root, () => {
      throw started;
    });
    return false;
  } catch (error) {
    if (error !== started) throw error;
    return true;
  }
}

it('installs when nothing is there, a package is missing, or one has another version', () => {
  const wanted = { '': { version: '1' }, 'node_modules/a': { version: '2' } };
  expect(wouldInstall(wanted, null)).toBe(true);
  expect(wouldInstall(wanted, {})).toBe(true);
  expect(wouldInstall(wanted, { 'node_modules/a': { version: '3' } })).toBe(true);
});

it('does not install what is there, nor for optional packages of another kind of machine', () => {
  const a = { 'node_modules/a': { version: '2' } };
  expect(wouldInstall({ '': { version: '1' }, ...a }, a)).toBe(false);
  expect(wouldInstall({ ...a, 'node_modules/b': { version: '1', optional: true } }, a)).toBe(false);
});
