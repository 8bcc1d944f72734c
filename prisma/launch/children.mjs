/**
 * The processes that the launcher starts. Each gets a process group of its own, so that Ctrl-C in a terminal reaches the
 * launcher alone and the order of ending is the launcher's. Lines they print are shown with their name in front.
 */
import { spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { LaunchProblem } from './problem.mjs';
import { makeReadable } from './readable-line.mjs';

/** Milliseconds that a child has to end by itself before it is killed. */
const PATIENCE_MS = 12_000;
/** Lines of a failed step that are shown. */
const SHOWN_LINES = 30;
/** Longest name, for lining up what they print. */
const NAME_WIDTH = 6;

/** Preloaded into children that run on: a launcher that is killed takes them with it. */
const EXIT_WITH_LAUNCHER = fileURLToPath(new URL('./exit-with-launcher.mjs', import.meta.url));

/**
 * @typedef {object} Child
 * @property {Promise<string>} ended resolves with how it ended, e.g. "exit code 1"
 * @property {() => Promise<void>} stop asks it to end, kills it when it does not
 */

/**
 * Starts a process that runs until it is stopped.
 * @param {object} options
 * @param {string} options.name
 * @param {string[]} options.args for Node
 * @param {string} options.root
 * @param {NodeJS.ProcessEnv} options.env
 * @param {boolean} options.isVerbose also show what it prints on standard output
 * @returns {Child}
 */
export function startChild({ name, args, root, env, isVerbose }) {
  const child = spawn(process.execPath, ['--import', EXIT_WITH_LAUNCHER, ...args], {
    cwd: root,
    env,
    detached: true,
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  const show = (line) => {
    process.stderr.write(`${name.padEnd(NAME_WIDTH)} | ${isVerbose ? line : makeReadable(line)}\n`);
  };
  createInterface({ input: child.stdout }).on('line', isVerbose ? show : () => {});
  createInterface({ input: child.stderr }).on('line', show);
  const ended = waitForEnd(child);
  return { ended, stop: () => stop(child, ended) };
}

/**
 * Runs a process to its end.
 * @param {object} options
 * @param {string[]} options.args for Node
 * @param {string} options.what for the sentence when it fails, e.g. "Building the web app"
 * @param {string} options.root
 * @param {NodeJS.ProcessEnv} options.env
 * @param {AbortSignal} options.signal ends it
 * @returns {Promise<string>} what it printed on standard output
 * @throws {LaunchProblem} when it fails: its own sentence when it printed just one line, else its last lines
 */
export async function runToEnd({ args, what, root, env, signal }) {
  signal.throwIfAborted();
  const child = spawn(process.execPath, args, {
    cwd: root,
    env,
    detached: true,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const output = { standard: '', all: '' };
  child.stdout.setEncoding('utf8').on('data', (text) => {
    output.standard += text;
    output.all += text;
  });
  child.stderr.setEncoding('utf8').on('data', (text) => {
    output.all += text;
  });
  const ended = waitForEnd(child);
  const abort = () => stop(child, ended);
  signal.addEventListener('abort', abort);
  const end = await ended;
  signal.removeEventListener('abort', abort);
  signal.throwIfAborted();
  if (child.exitCode === 0) return output.standard;
  const lines = output.all.trim().split('\n');
  if (lines.length === 1 && lines[0]) throw new LaunchProblem(lines[0]);
  throw new LaunchProblem(
    `${lines.slice(-SHOWN_LINES).join('\n')}\n${what} failed (${end}); the reason is above.`,
  );
}

function waitForEnd(child) {
  return new Promise((resolve) => {
    child.once('error', (error) => resolve(error.message));
    child.once('exit', (code, signal) => resolve(signal ? `signal ${signal}` : `exit code ${code}`));
  });
}

async function stop(child, ended) {
  signalGroup(child, 'SIGTERM');
  const timer = setTimeout(() => signalGroup(child, 'SIGKILL'), PATIENCE_MS);
  await ended;
  clearTimeout(timer);
}

/** The child and whatever it started. */
function signalGroup(child, signal) {
  if (child.pid === undefined || child.exitCode !== null || child.signalCode !== null) return;
  try {
    process.kill(-child.pid, signal);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}
