/** The embedded database shared by many clients: no mixed answers, no stuck transaction, nothing lost. */
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { startEmbedded } from '@/prisma/embedded/start-embedded.mjs';

const PROCESS = fileURLToPath(new URL('./embedded-process.mjs', import.meta.url));

type Embedded = Awaited<ReturnType<typeof startEmbedded>>;

// One data folder for the whole file: making a new one takes seconds, opening it again does not.
let folder: string;
let embedded: Embedded;
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'elbowroom-embedded-'));
  embedded = await start();
});
afterAll(async () => {
  await embedded.stop();
  rmSync(folder, { recursive: true, force: true });
});

function start(socketFolder = join(folder, 'socket')): Promise<Embedded> {
  return startEmbedded({ dataFolder: join(folder, 'database'), socketFolder });
}

async function connect(): Promise<pg.Client> {
  const client = new pg.Client({ connectionString: embedded.url });
  client.on('error', () => {});
  await client.connect();
  return client;
}

function socketFolderOf({ url }: Embedded): string {
  return new URL(url).searchParams.get('host') ?? '';
}

it('answers every client with its own rows, through errors and transactions', async () => {
  const answers = await Promise.all(Array.from({ length: 8 }, (_, client) => askOften(client)));
  expect(answers).toEqual(Array.from({ length: 8 }, () => ({ own: 200, refused: 20 })));
});

async function askOften(number: number): Promise<{ own: number; refused: number }> {
  const client = await connect();
  const counts = { own: 0, refused: 0 };
  for (let i = 0; i < 200; i++) {
    const isTransaction = i % 5 === 0;
    if (isTransaction) await client.query('BEGIN');
    const { rows } = await client.query(`SELECT $1::int AS "n${number}"`, [i]);
    if (rows[0][`n${number}`] === i) counts.own += 1;
    if (i % 10 === 0) await client.query('SELECT 1 / $1::int', [0]).catch(() => (counts.refused += 1));
    if (isTransaction) await client.query('ROLLBACK');
  }
  await client.end();
  return counts;
}

it('rolls back for a client that vanishes inside a transaction, and serves the others', async () => {
  const [leaving, staying] = await Promise.all([connect(), connect()]);
  await staying.query('CREATE TABLE visits (a int)');
  await leaving.query('BEGIN');
  await leaving.query('INSERT INTO visits VALUES ($1)', [1]);
  const waiting = staying.query('SELECT count(*)::int AS n FROM visits');
  vanish(leaving);
  expect((await waiting).rows).toEqual([{ n: 0 }]);
  await staying.end();
});

it('goes on after a client that vanishes in the middle of a query', async () => {
  const leaving = await connect();
  leaving.query('SELECT length($1)', ['x'.repeat(5_000_000)]).catch(() => {});
  await new Promise(setImmediate);
  vanish(leaving);
  const staying = await connect();
  expect((await staying.query('SELECT $1::int AS n', [7])).rows).toEqual([{ n: 7 }]);
  await staying.end();
});

it('goes on after a client that says good-bye between a failed message and its end', async () => {
  const leaving = await connect();
  const { connection } = leaving as unknown as { connection: RawConnection };
  connection.parse({ text: 'SELECT no_such_column', name: '', types: [] }, true);
  connection.flush();
  await once(connection as unknown as NodeJS.EventEmitter, 'errorMessage');
  connection.end();
  const staying = await connect();
  expect((await staying.query('SELECT $1::int AS n', [8])).rows).toEqual([{ n: 8 }]);
  await staying.end();
});

/** The part of pg's connection that sends single messages. */
interface RawConnection {
  parse(query: { text: string; name: string; types: number[] }, more: boolean): void;
  flush(): void;
  end(): void;
}

function vanish(client: pg.Client): void {
  (client as unknown as { connection: { stream: { destroy(): void } } }).connection.stream.destroy();
}

it('keeps what was stored through a stop and a start', async () => {
  const before = await connect();
  await before.query('CREATE TABLE t (a double precision)');
  await before.query('INSERT INTO t VALUES ($1)', [Math.PI]);
  await before.end();
  await embedded.stop();
  embedded = await start();
  const after = await connect();
  expect((await after.query('SELECT a FROM t')).rows).toEqual([{ a: Math.PI }]);
  await after.end();
});

it('loses no row that was acknowledged when its process is killed', async () => {
  await embedded.stop();
  const child = spawn(process.execPath, [PROCESS, join(folder, 'database'), join(folder, 'socket')], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const exited = once(child, 'exit');
  await once(child.stdout, 'data');
  const client = await connect();
  await client.query('CREATE TABLE acknowledged (a int)');
  let rows = 0;
  setTimeout(() => child.kill('SIGKILL'), 400);
  try {
    for (;;) {
      await client.query('INSERT INTO acknowledged VALUES ($1)', [rows]);
      rows += 1;
    }
  } catch {
    // The process is gone, and with it the connection.
  }
  await exited;
  embedded = await start();
  const after = await connect();
  const { rows: found } = await after.query('SELECT count(*)::int AS n FROM acknowledged');
  await after.end();
  expect(rows).toBeGreaterThan(0);
  expect(found[0].n).toBeGreaterThanOrEqual(rows);
});

it('lets only this account near its data and its socket, and takes a short folder when the path would be too long', async () => {
  const preferred = socketFolderOf(embedded);
  expect(preferred).toBe(join(folder, 'socket'));
  expect(statSync(preferred).mode & 0o777).toBe(0o700);
  expect(statSync(join(folder, 'database')).mode & 0o777).toBe(0o700);
  await embedded.stop();

  embedded = await start(join(folder, 'very-long-name-'.repeat(8)));
  const short = socketFolderOf(embedded);
  expect(dirname(short)).toBe(tmpdir());
  expect(statSync(short).mode & 0o777).toBe(0o700);
  const client = await connect();
  expect((await client.query('SELECT 1 AS n')).rows).toEqual([{ n: 1 }]);
  await client.end();
  await embedded.stop();
  expect(() => statSync(short)).toThrow('ENOENT');
});

it('stops once, however often it is told to', async () => {
  await Promise.all([embedded.stop(), embedded.stop()]);
  await embedded.stop();
});
