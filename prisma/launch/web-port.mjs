/** The port of the web server: free before it starts, answering before its address is printed. */
import { createServer } from 'node:net';
import { setTimeout as wait } from 'node:timers/promises';
import { LaunchProblem } from './problem.mjs';

/** Cheap page that needs the database. */
const HEALTH_PATH = '/api/health';
/** Milliseconds. */
const START_TIMEOUT_MS = 120_000;
const ASK_EVERY_MS = 250;
const ANSWER_TIMEOUT_MS = 30_000;
/** Answers from this status on are failures of the server. */
const SERVER_ERROR = 500;

/** @throws {LaunchProblem} when something listens on the port, or listening on it is not allowed */
export async function checkPortIsFree(port) {
  const server = createServer();
  try {
    await new Promise((resolve, reject) => {
      server.once('error', reject);
      server.listen(port, resolve);
    });
  } catch (error) {
    if (error.code === 'EADDRINUSE') {
      throw new LaunchProblem(
        `Port ${port} is in use by another program: stop that one, or set PORT to another number.`,
      );
    }
    throw new LaunchProblem(`Port ${port} cannot be used (${error.code}): set PORT to another number.`);
  }
  await new Promise((resolve) => server.close(resolve));
}

/**
 * @param {number} port
 * @param {AbortSignal} signal gives up waiting
 * @throws {LaunchProblem} when no good answer comes
 */
export async function waitForWeb(port, signal) {
  const deadline = Date.now() + START_TIMEOUT_MS;
  let answer = 'no answer';
  while (Date.now() < deadline) {
    signal.throwIfAborted();
    answer = await ask(port, signal);
    if (answer === null) return;
    await wait(ASK_EVERY_MS, undefined, { signal });
  }
  throw new LaunchProblem(
    `The web server did not get ready (${answer}): start again with --verbose to see what it says.`,
  );
}

/** @returns {Promise<string | null>} null for a good answer, else what came */
async function ask(port, signal) {
  try {
    const response = await fetch(`http://127.0.0.1:${port}${HEALTH_PATH}`, {
      redirect: 'manual',
      signal: AbortSignal.any([signal, AbortSignal.timeout(ANSWER_TIMEOUT_MS)]),
    });
    await response.arrayBuffer();
    return response.status < SERVER_ERROR ? null : `status ${response.status}`;
  } catch (error) {
    return error.cause?.code ?? error.message;
  }
}
