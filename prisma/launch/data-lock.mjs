/**
 * One launcher at a time on a data folder: two embedded databases on the same files would destroy them.
 * The lock is a file that names its holder. A holder that was killed leaves it behind; its process number may since
 * belong to another program, so where the system tells, the time that the process started is compared as well.
 */
import { randomBytes } from 'node:crypto';
import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { LaunchProblem } from './problem.mjs';

const LOCK_FILE = 'lock';
/** Milliseconds until a lock that two starts replaced at the same moment has settled on one of them. */
const SETTLE_MS = 60;

/**
 * @param {string} folder data folder; must exist
 * @param {{ address: string }} about shown to whoever finds the folder in use
 * @returns {Promise<() => void>} gives the lock back
 * @throws {LaunchProblem} when another launcher that still runs has it
 */
export async function takeDataLock(folder, about) {
  const path = join(folder, LOCK_FILE);
  const token = randomBytes(8).toString('hex');
  const mine = { pid: process.pid, started: readProcessStart(process.pid), token, ...about };
  if (!writeNew(path, mine)) {
    const holder = readLock(path);
    if (holder && isRunning(holder)) throw inUse(folder, holder);
    rmSync(path, { force: true });
    if (!writeNew(path, mine)) throw inUse(folder, readLock(path));
  }
  await wait(SETTLE_MS);
  const holder = readLock(path);
  if (holder?.token !== token) throw inUse(folder, holder);
  return () => rmSync(path, { force: true });
}

function inUse(folder, holder) {
  const who = holder ? `process ${holder.pid}, ${holder.address}` : 'another process';
  return new LaunchProblem(
    `The data folder ${folder} is in use by Elbowroom already (${who}): use that one, stop it first, or set DATA_DIR to another folder.`,
  );
}

function writeNew(path, lock) {
  try {
    writeFileSync(path, JSON.stringify(lock), { flag: 'wx', mode: 0o600 });
    return true;
  } catch (error) {
    if (error.code === 'EEXIST') return false;
    throw error;
  }
}

/** A file that cannot be read as a lock is nobody's. */
function readLock(path) {
  try {
    const lock = JSON.parse(readFileSync(path, 'utf8'));
    return Number.isInteger(lock.pid) ? lock : null;
  } catch {
    return null;
  }
}

function isRunning({ pid, started }) {
  if (pid === process.pid) return false;
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (error.code === 'ESRCH') return false;
  }
  return started === null || started === readProcessStart(pid);
}

/** Clock ticks from boot to the start of the process (proc(5), field 22 of stat); null where the system does not tell. */
function readProcessStart(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The command in field 2 may hold spaces and brackets; the fields after its last bracket do not.
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? null;
  } catch {
    return null;
  }
}
