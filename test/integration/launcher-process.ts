/** Runs `node start.mjs` as a person would, on a data folder and a port of its own. */
import { type ChildProcess, spawn } from 'node:child_process';
import { createServer } from 'node:net';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../..', import.meta.url));

export interface LauncherEnd {
  code: number | null;
  stdout: string;
  stderr: string;
}

export interface LauncherProcess {
  pid: number;
  /** Resolves with everything on standard output once it holds the text; rejects when the launcher ends before. */
  waitFor: (text: string) => Promise<string>;
  /** Text on standard error so far. */
  readErrors: () => string;
  signal: (signal: NodeJS.Signals) => void;
  ended: Promise<LauncherEnd>;
}

export function startLauncher(
  environment: Record<string, string>,
  options: { nodeArgs?: string[]; args?: string[] } = {},
): LauncherProcess {
  const { nodeArgs = [], args = [] } = options;
  const child = spawn(process.execPath, [...nodeArgs, 'start.mjs', ...args], {
    cwd: ROOT,
    env: cleanEnvironment(environment),
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const text = { stdout: '', stderr: '' };
  for (const name of ['stdout', 'stderr'] as const) {
    child[name].setEncoding('utf8').on('data', (chunk: string) => {
      text[name] += chunk;
    });
  }
  const ended = new Promise<LauncherEnd>((resolve) => {
    child.once('close', (code) => resolve({ code, ...text }));
  });
  return {
    pid: child.pid!,
    waitFor: (wanted) => waitForText(child, ended, () => text.stdout, wanted),
    readErrors: () => text.stderr,
    signal: (signal) => void child.kill(signal),
    ended,
  };
}

/** A port that nothing listens on at the moment. */
export async function findFreePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, resolve));
  const address = server.address();
  await new Promise((resolve) => server.close(resolve));
  if (address === null || typeof address === 'string') throw new Error('no port was given');
  return address.port;
}

/** The launcher's settings come from the test alone; a test runner's own variables would change the app's. */
function cleanEnvironment(environment: Record<string, string>): NodeJS.ProcessEnv {
  const { PATH, HOME, TMPDIR, LANG } = process.env;
  return { PATH, HOME, TMPDIR, LANG, ...environment } as unknown as NodeJS.ProcessEnv;
}

async function waitForText(
  child: ChildProcess,
  ended: Promise<LauncherEnd>,
  read: () => string,
  wanted: string,
): Promise<string> {
  const found = new Promise<string>((resolve) => {
    const look = () => {
      if (read().includes(wanted)) resolve(read());
    };
    child.stdout!.on('data', look);
    look();
  });
  const tooSoon = ended.then(({ code, stderr }) => {
    throw new Error(`the launcher ended with ${code} before "${wanted}": ${stderr}`);
  });
  return Promise.race([found, tooSoon]);
}
