#!/usr/bin/env node
/**
 * The command `elbowroom`. Runs the TypeScript sources as they stand (through tsx), so it needs `npm ci` and nothing else:
 * no build, no database. This file is plain JavaScript that even an old Node can read, to tell it what is wrong.
 */
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const INTERNAL_ERROR = 1;

/** True when `version` ("20.20.1") is at least `wanted` ("20.19"). */
function isAtLeast(version, wanted) {
  const have = version.split('.').map(Number);
  const want = wanted.split('.').map(Number);
  for (let part = 0; part < want.length; part++) {
    if (have[part] !== want[part]) return have[part] > want[part];
  }
  return true;
}

function fail(sentence) {
  process.stderr.write(`elbowroom: ${sentence}\n`);
  process.exitCode = INTERNAL_ERROR;
}

async function start() {
  const root = new URL('../../', import.meta.url);
  const wanted = JSON.parse(readFileSync(new URL('package.json', root), 'utf8')).engines.node.replace(
    /[^\d.]/g,
    '',
  );
  if (!isAtLeast(process.versions.node, wanted)) {
    fail(`Node ${wanted} or newer is needed, this is Node ${process.versions.node}.`);
    return;
  }
  let tsx;
  try {
    tsx = await import('tsx/esm/api');
  } catch {
    fail(`its packages are not installed; run "npm ci" in ${fileURLToPath(root)} first.`);
    return;
  }
  tsx.register({ tsconfig: fileURLToPath(new URL('tsconfig.json', root)) });
  const { main } = await import('./main.ts');
  process.exitCode = await main(process.argv.slice(2));
}

await start();
