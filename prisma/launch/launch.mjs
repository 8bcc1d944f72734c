/**
 * Starts the whole app and keeps it running until it is told to stop:
 * packages, database client, web build, database, migrations, demo markets, worker, web server.
 * Whatever happens, everything that was started is stopped again, the database last.
 */
import { mkdirSync } from 'node:fs';
import { ensureBuilt, ensureClient } from './build.mjs';
import { runToEnd, startChild } from './children.mjs';
import { takeDataLock } from './data-lock.mjs';
import { startDatabase } from './database.mjs';
import { ensureInstalled } from './install.mjs';
import { keepWorkerRunning } from './keep-worker-running.mjs';
import { LaunchProblem } from './problem.mjs';
import { readSettings, VERBOSE } from './settings.mjs';
import { checkPortIsFree, waitForWeb } from './web-port.mjs';

const SIGNS_TO_STOP = ['SIGINT', 'SIGTERM', 'SIGHUP'];
/** TypeScript scripts run as they stand; "react-server" lets them import what only servers may. */
const RUN_TYPESCRIPT = ['--conditions=react-server', '--import', 'tsx'];
/** Why everything is stopped, when a person or the system asked for it. */
const TOLD_TO_STOP = new Error('told to stop');
const NEXT = 'node_modules/next/dist/bin/next';

/**
 * @param {string} root folder of the project
 * @param {string[]} args command line after the script
 * @returns {Promise<number>} exit code
 */
export async function launch(root, args) {
  const stopping = new AbortController();
  for (const sign of SIGNS_TO_STOP) process.on(sign, () => stopping.abort(TOLD_TO_STOP));
  /** What to stop, in the order it was started. */
  const running = [];
  try {
    const settings = readSettings(root, args);
    await start(settings, running, stopping);
    await untilAborted(stopping.signal);
    stopping.signal.throwIfAborted();
  } catch (error) {
    // Whatever was waited for when the stop came fails in its own way; the reason of the stop is what counts.
    const cause = stopping.signal.aborted ? stopping.signal.reason : error;
    if (cause !== TOLD_TO_STOP) {
      complain(cause);
      return 1;
    }
    say('Stopping …');
  } finally {
    stopping.abort();
    await stopAll(running);
  }
  return 0;
}

/** The last that was started is stopped first; one that cannot be stopped does not keep the others running. */
async function stopAll(running) {
  for (const stop of running.reverse()) {
    try {
      await stop();
    } catch (error) {
      complain(error);
    }
  }
}

/** A person gets a sentence. Other errors are faults of the launcher; what helps to find them is shown on request. */
function complain(error) {
  const isFault = !(error instanceof LaunchProblem);
  const isVerbose = process.argv.includes(VERBOSE);
  const sentence = isFault
    ? `Elbowroom could not go on: ${isVerbose ? error.stack : error.message}`
    : error.message;
  process.stderr.write(`${sentence}\n`);
}

async function start(settings, running, stopping) {
  const { root, port, dataFolder, isVerbose } = settings;
  const fail = (sentence) => stopping.abort(new LaunchProblem(sentence));
  makeDataFolder(dataFolder);
  if (settings.databaseUrl === null)
    running.push(await takeDataLock(dataFolder, { address: settings.address }));
  await checkPortIsFree(port);
  ensureInstalled(root, () => say('Installing packages …'));
  const database = await startDatabase(settings, (error) =>
    fail(`The embedded database failed (${error.message}), so everything was stopped: start again.`),
  );
  running.push(database.stop);
  await makeFromSources(settings, stopping.signal);

  const env = childEnvironment(settings, database.url);
  const script = (path, what) =>
    runToEnd({ args: [...RUN_TYPESCRIPT, path], what, root, env, signal: stopping.signal });
  await script('prisma/migrate.ts', 'Migrating the database');
  await script('seed/run.ts', 'Storing the demo markets');

  const worker = keepWorkerRunning(() =>
    startChild({ name: 'worker', args: [...RUN_TYPESCRIPT, 'lib/jobs/worker.ts'], root, env, isVerbose }),
  );
  running.push(worker.stop);
  const web = startChild({ name: 'web', args: webArguments(settings), root, env, isVerbose });
  running.push(web.stop);
  web.ended.then((end) =>
    fail(`The web server ended by itself (${end}), so everything was stopped: start again.`),
  );
  const [ownerLink] = await Promise.all([
    script('lib/cli/print-owner-link.ts', 'Making the set-up link'),
    waitForWeb(port, stopping.signal),
  ]);
  sayReady(settings, ownerLink.trim());
}

/** A new one is this account's alone: it holds the database, its socket and the secret of the sessions. */
function makeDataFolder(folder) {
  try {
    mkdirSync(folder, { recursive: true, mode: 0o700 });
  } catch (error) {
    throw new LaunchProblem(
      `The data folder ${folder} cannot be used (${error.code}): set DATA_DIR to a folder that you may write to.`,
    );
  }
}

/** Neither needs the database, and a build must not depend on where it is made. */
async function makeFromSources({ root, distFolder, isDev }, signal) {
  const env = { ...process.env, NEXT_TELEMETRY_DISABLED: '1', PRISMA_HIDE_UPDATE_MESSAGE: '1' };
  const runNode = async (args, what) => {
    await runToEnd({ args, what, root, env, signal });
  };
  await ensureClient(root, runNode);
  if (!isDev)
    await ensureBuilt(root, distFolder, runNode, () => say('Building the web app, which takes a minute …'));
}

function childEnvironment({ port, dataFolder }, databaseUrl) {
  return {
    ...process.env,
    DATABASE_URL: databaseUrl,
    DATA_DIR: dataFolder,
    PORT: String(port),
    LOG_LEVEL: process.env.LOG_LEVEL || 'warn',
    NEXT_TELEMETRY_DISABLED: '1',
  };
}

function webArguments({ isDev, port }) {
  return [NEXT, isDev ? 'dev' : 'start', '--port', String(port)];
}

/** @param {string} ownerLink empty once there is an owner */
function sayReady({ address }, ownerLink) {
  say(`Elbowroom is ready at ${address}`);
  if (ownerLink) say(`Nobody owns it yet. Open this one-time link to become its owner:\n  ${ownerLink}`);
  say('Stop it with Ctrl-C.');
}

function say(text) {
  process.stdout.write(`${text}\n`);
}

function untilAborted(signal) {
  return new Promise((resolve) => {
    if (signal.aborted) resolve();
    signal.addEventListener('abort', () => resolve(), { once: true });
  });
}
