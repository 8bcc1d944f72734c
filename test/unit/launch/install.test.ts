import { expect, it } from 'vitest';
import { explainOldNode } from '@/prisma/launch/install.mjs';
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
