/** Makes what the app runs from, when it is missing or older than its sources: the database client and the web build. */
import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { hashSources, hasStamp } from './source-hash.mjs';

/** Sources of the web build. Tests and demo data are not among them. */
const WEB_SOURCES = [
  'app',
  'lib',
  'public',
  'prisma/schema.prisma',
  'proxy.ts',
  'next.config.js',
  'tsconfig.json',
  'package-lock.json',
];
const CLIENT_SOURCES = ['prisma/schema.prisma', 'prisma.config.ts', 'package-lock.json'];
const CLIENT_FOLDER = join('prisma', 'generated');
const STAMP = '.source-hash';

/**
 * @param {string} root
 * @param {(args: string[], what: string) => Promise<void>} runNode runs Node to its end; rejects with a sentence
 */
export async function ensureClient(root, runNode) {
  const stamp = join(root, CLIENT_FOLDER, STAMP);
  const hash = hashSources(root, CLIENT_SOURCES);
  if (existsSync(join(root, CLIENT_FOLDER, 'client.ts')) && hasStamp(stamp, hash)) return;
  await runNode(['node_modules/prisma/build/index.js', 'generate'], 'Generating the database client');
  writeFileSync(stamp, hash);
}

/**
 * @param {string} root
 * @param {string} distFolder folder of the build, relative to root
 * @param {(args: string[], what: string) => Promise<void>} runNode
 * @param {() => void} onBuild called before a build starts
 */
export async function ensureBuilt(root, distFolder, runNode, onBuild) {
  // Taken before the build: a source that changes while it runs must make the next start build again.
  const hash = hashSources(root, WEB_SOURCES);
  const stamp = join(root, distFolder, STAMP);
  if (existsSync(join(root, distFolder, 'BUILD_ID')) && hasStamp(stamp, hash)) return;
  onBuild();
  await runNode(['node_modules/next/dist/bin/next', 'build'], 'Building the web app');
  writeFileSync(stamp, hash);
}

/** Notes that the build was made from the sources as they are now. */
export function stampBuild(root, distFolder) {
  writeFileSync(join(root, distFolder, STAMP), hashSources(root, WEB_SOURCES));
}
