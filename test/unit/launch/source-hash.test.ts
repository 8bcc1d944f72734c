import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { hashSources, hasStamp } from '@/prisma/launch/source-hash.mjs';

let root: string;
const hash = () => hashSources(root, ['app', 'one.ts', 'missing']);

beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'elbowroom-hash-'));
  mkdirSync(join(root, 'app', 'deep'), { recursive: true });
  writeFileSync(join(root, 'app', 'deep', 'a.ts'), 'a');
  writeFileSync(join(root, 'one.ts'), '1');
});
afterEach(() => rmSync(root, { recursive: true, force: true }));

it('stays the same when nothing changes, or something that is no source', () => {
  const before = hash();
  writeFileSync(join(root, 'two.ts'), '2');
  expect(hash()).toBe(before);
});

it('changes with a byte, a new file, a removed file and a new name', () => {
  const seen = [hash()];
  writeFileSync(join(root, 'app', 'deep', 'a.ts'), 'b');
  seen.push(hash());
  writeFileSync(join(root, 'app', 'b.ts'), '');
  seen.push(hash());
  renameSync(join(root, 'app', 'b.ts'), join(root, 'app', 'c.ts'));
  seen.push(hash());
  rmSync(join(root, 'one.ts'));
  seen.push(hash());
  expect(new Set(seen).size).toBe(seen.length);
});

it('is found again in its stamp, and in no other', () => {
  const stamp = join(root, 'stamp');
  expect(hasStamp(stamp, hash())).toBe(false);
  writeFileSync(stamp, hash());
  expect(hasStamp(stamp, hash())).toBe(true);
  expect(hasStamp(stamp, 'other')).toBe(false);
});
