/**
 * Databases for integration tests, of both kinds the app runs on: the embedded one behind its socket, and a PostgreSQL
 * server of the machine, started on a temporary folder. Each test file gets a database of its own, so files cannot
 * disturb each other.
 *
 *   describeOnDatabases('fits', () => {
 *     it('…', async () => { … });      // DATABASE_URL points at a migrated, empty database
 *   });
 */
import { afterAll, beforeAll, describe } from 'vitest';
import { closePrisma } from '@/lib/store/client';
import { applyMigrations } from '@/prisma/apply-migrations';
import { startEmbedded } from '@/prisma/embedded/start-embedded.mjs';
import { readMigrations } from '@/prisma/migration-files';
import { findServerPrograms, startServer } from './postgres-server';

export interface TestDatabase {
  url: string;
  stop: () => Promise<void>;
}

export interface DatabaseKind {
  name: string;
  /** Why tests on it are skipped, or null. */
  missing: string | null;
  /** Clients have sessions of their own. */
  isServer: boolean;
  /** A database without any table. */
  startEmpty: () => Promise<TestDatabase>;
}

export const DATABASE_KINDS: DatabaseKind[] = [
  {
    name: 'embedded PostgreSQL',
    missing: null,
    isServer: false,
    startEmpty: () => startEmbedded({ dataFolder: null, socketFolder: null }),
  },
  {
    name: 'PostgreSQL server',
    missing: findServerPrograms() === null ? 'no pg_ctl under /usr/lib/postgresql on this machine' : null,
    isServer: true,
    startEmpty: startServer,
  },
];

/** Defines the same tests for each kind of database; `define` gets a function that reads the connection string. */
export function describeOnDatabases(name: string, define: (readUrl: () => string) => void): void {
  for (const kind of DATABASE_KINDS) {
    const place = kind.missing === null ? kind.name : `${kind.name} (skipped: ${kind.missing})`;
    describe.skipIf(kind.missing !== null)(`${name} on ${place}`, () => {
      let database: TestDatabase;
      beforeAll(async () => {
        database = await startMigrated(kind);
        process.env.DATABASE_URL = database.url;
      });
      afterAll(async () => {
        await closePrisma();
        delete process.env.DATABASE_URL;
        await database.stop();
      });
      define(() => database.url);
    });
  }
}

/** A database with all migrations, or those given. */
export async function startMigrated(
  kind: DatabaseKind,
  migrations = readMigrations(),
): Promise<TestDatabase> {
  const database = await kind.startEmpty();
  const end = await applyMigrations(database.url, migrations);
  if (end.code !== 'migrated') throw new Error(`test database: ${end.name} stopped part-way: ${end.reason}`);
  return database;
}
