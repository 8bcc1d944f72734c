/**
 * What must be there before anything else can run: a new enough Node and the packages of package-lock.json.
 * Written for an old Node too, so that it can say what is wrong: only long-standing syntax and built-ins.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { LaunchProblem } from './problem.mjs';

/** Oldest Node that works, as in package.json. */
const OLDEST_NODE = [20, 19];

/** @returns {string | null} one sentence when this Node is too old, else null */
export function explainOldNode(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  const isNewEnough = major > OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor >= OLDEST_NODE[1]);
  if (isNewEnough) return null;
  return `Elbowroom needs Node ${OLDEST_NODE.join('.')} or newer, and this is Node ${version}: install a newer one and start again.`;
}

/**
 * Runs `npm ci` unless the installed packages are those of the lockfile.
 * @param {string} root folder of package.json
 * @param {() => void} onInstall called before the installation starts
 * @throws {LaunchProblem} when it fails
 */
export function ensureInstalled(root, onInstall = () => {}) {
  if (isInstalled(root)) return;
  onInstall();
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
  const { status, error } = spawnSync('npm', args, { cwd: root, stdio: ['ignore', 'ignore', 'inherit'] });
  if (status === 0) return;
  const why = error ? `could not be run: ${error.message}` : 'failed for the reason above';
  throw new LaunchProblem(`"npm ci" ${why}. Check the network and the free disk space, then start again.`);
}

/** npm keeps what it installed in a lockfile of its own; optional packages depend on the machine. */
function isInstalled(root) {
  const kept = join(root, 'node_modules', '.package-lock.json');
  if (!existsSync(kept)) return false;
  const wanted = readPackages(join(root, 'package-lock.json'));
  const installed = readPackages(kept);
  return Object.entries(wanted).every(
    ([path, entry]) =>
      path === '' || entry.optional || (installed[path] && installed[path].version === entry.version),
  );
}

function readPackages(path) {
  return JSON.parse(readFileSync(path, 'utf8')).packages;
}
