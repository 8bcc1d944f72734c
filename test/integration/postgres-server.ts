/** A PostgreSQL server of this machine on a temporary folder, reached over a Unix socket and gone after the test. */
import { execFile } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { chown } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';

const run = promisify(execFile);

const VERSIONS_FOLDER = '/usr/lib/postgresql';
/** Account that runs the server when the tests run as root, which the server refuses. */
const SERVER_ACCOUNT = 'postgres';
/** The data is thrown away, so nothing needs to reach the disk. */
const SERVER_OPTIONS = '-c listen_addresses= -c fsync=off -c full_page_writes=off -c synchronous_commit=off';

/** Folder of initdb and pg_ctl of the newest version, or null. */
export function findServerPrograms(): string | null {
  if (!existsSync(VERSIONS_FOLDER)) return null;
  const versions = readdirSync(VERSIONS_FOLDER).sort((a, b) => Number(b) - Number(a));
  const folders = versions.map((version) => join(VERSIONS_FOLDER, version, 'bin'));
  return (
    folders.find((folder) => existsSync(join(folder, 'pg_ctl')) && existsSync(join(folder, 'initdb'))) ?? null
  );
}

/** Starts a server with an empty database. */
export async function startServer(): Promise<{ url: string; stop: () => Promise<void> }> {
  const programs = findServerPrograms();
  if (programs === null) throw new Error(`no PostgreSQL server under ${VERSIONS_FOLDER}`);
  const folder = mkdtempSync(join(tmpdir(), 'elbowroom-pg-'));
  const data = join(folder, 'data');
  if (isRoot()) await giveToServerAccount(folder);
  await runAsServer(join(programs, 'initdb'), [
    '-D',
    data,
    '-U',
    SERVER_ACCOUNT,
    '-A',
    'trust',
    '--no-sync',
    '-E',
    'UTF8',
  ]);
  const options = `${SERVER_OPTIONS} -c unix_socket_directories=${folder}`;
  await runAsServer(join(programs, 'pg_ctl'), [
    '-D',
    data,
    '-l',
    join(folder, 'log'),
    '-o',
    options,
    '-w',
    'start',
  ]);
  return {
    url: `postgresql://${SERVER_ACCOUNT}@localhost/postgres?host=${encodeURIComponent(folder)}`,
    stop: async () => {
      await runAsServer(join(programs, 'pg_ctl'), ['-D', data, '-m', 'immediate', '-w', 'stop']);
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

function isRoot(): boolean {
  return process.getuid?.() === 0;
}

async function giveToServerAccount(folder: string): Promise<void> {
  const [uid, gid] = await Promise.all(
    ['-u', '-g'].map(async (flag) => Number((await run('id', [flag, SERVER_ACCOUNT])).stdout)),
  );
  await chown(folder, uid!, gid!);
}

async function runAsServer(program: string, args: string[]): Promise<void> {
  if (!isRoot()) await run(program, args);
  else
    await run('su', ['-s', '/bin/sh', '-c', 'exec "$0" "$@"', '--', SERVER_ACCOUNT, program, ...args], {
      cwd: tmpdir(),
    });
}
