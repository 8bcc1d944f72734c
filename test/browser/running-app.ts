/** Starts the app as a person would, `node start.mjs`, on a free port with a data folder of its own, and stops it again. */
import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = fileURLToPath(new URL('../..', import.meta.url));
/** A cold start builds the web app first. */
const START_LIMIT_MS = 280_000;

export interface RunningApp {
  address: string;
  /** The one-time link of the owner, as printed. */
  ownerLink: string;
  stop(): Promise<number | null>;
}

export async function startApp(): Promise<RunningApp> {
  const dataFolder = mkdtempSync(join(tmpdir(), 'elbowroom-browser-'));
  const port = await findFreePort();
  const { DATABASE_URL: _unset, ...inherited } = process.env;
  const child = spawn(process.execPath, ['start.mjs'], {
    cwd: ROOT,
    env: { ...inherited, PORT: String(port), APP_URL: '', DATA_DIR: dataFolder, NODE_ENV: 'production' },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const printed = await readUntilReady(child);
  const ownerLink = /https?:\/\/\S+\/setup\/\S+/.exec(printed)?.[0];
  if (!ownerLink) throw new Error(`No set-up link was printed:\n${printed}`);
  return {
    address: `http://localhost:${port}`,
    ownerLink,
    async stop() {
      const ended = once(child, 'exit');
      child.kill('SIGINT');
      const [code] = await ended;
      rmSync(dataFolder, { recursive: true, force: true });
      return code;
    },
  };
}

function readUntilReady(child: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let printed = '';
    const timer = setTimeout(() => reject(new Error(`The app did not start:\n${printed}`)), START_LIMIT_MS);
    child.stderr?.on('data', (chunk) => {
      printed += chunk;
    });
    child.stdout?.on('data', (chunk) => {
      printed += chunk;
      if (!printed.includes('Stop it with Ctrl-C')) return;
      clearTimeout(timer);
      resolve(printed);
    });
    child.once('exit', (code) => {
      clearTimeout(timer);
      reject(new Error(`The app ended with ${code}:\n${printed}`));
    });
  });
}

function findFreePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen(0, () => {
      const address = server.address();
      server.close(() => resolve(typeof address === 'object' && address ? address.port : 0));
    });
  });
}
