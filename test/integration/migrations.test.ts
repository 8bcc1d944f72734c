/** The migrations against real databases: they agree with the schema, keep what is stored, and stop safely. */
import type { MigrationList } from '@prisma/schema-engine-wasm/schema_engine_bg';
import pg from 'pg';
import { afterEach, describe, expect, it } from 'vitest';
import { applyMigrations, resolveMigration } from '@/prisma/apply-migrations';
import { explainHalfApplied } from '@/prisma/explain';
import { readMigrations, readSchema } from '@/prisma/migration-files';
import { findSchemaDifference } from '@/prisma/schema-difference';
import { DATABASE_KINDS, type DatabaseKind, startMigrated, type TestDatabase } from './database';
import { fillDatabase, readEverything } from './every-table';

const BROKEN = '29990101000000_broken';

/** Migrations up to and without the last `count`. */
function withoutLast(count: number): MigrationList {
  const all = readMigrations();
  return { ...all, migrationDirectories: all.migrationDirectories.slice(0, -count) };
}

function withMigration(name: string, script: string): MigrationList {
  const all = readMigrations();
  const migrationFile = { path: 'migration.sql', content: { tag: 'ok' as const, value: script } };
  return { ...all, migrationDirectories: [...all.migrationDirectories, { path: name, migrationFile }] };
}

describe('schema and migrations', () => {
  it('agree: nothing separates a migrated database from the schema', async () => {
    expect(await findSchemaDifference()).toBeNull();
  });

  it('would be seen to differ: leaving out the last migration is a difference', async () => {
    expect(await findSchemaDifference(withoutLast(1))).toContain('CREATE');
  });

  it('would be seen to differ: a changed delete rule and a new column are a difference', async () => {
    const [file] = readSchema().files;
    const changed = file!.content
      .replace('isDemo      Boolean', 'extra Int?\n  isDemo      Boolean')
      .replace('onDelete: NoAction', 'onDelete: Restrict');
    const difference = await findSchemaDifference(readMigrations(), {
      files: [{ ...file!, content: changed }],
    });
    expect(difference).toContain('ADD COLUMN     "extra" INTEGER');
    expect(difference).toContain('ON DELETE RESTRICT');
  });
});

for (const kind of DATABASE_KINDS) {
  const place = kind.missing === null ? kind.name : `${kind.name} (skipped: ${kind.missing})`;
  describe.skipIf(kind.missing !== null)(`migrations on ${place}`, () => {
    defineMigrationTests(kind);
  });
}

function defineMigrationTests(kind: DatabaseKind): void {
  let database: TestDatabase | null = null;
  afterEach(async () => {
    await database?.stop();
    database = null;
  });

  async function query<Row extends pg.QueryResultRow>(sql: string, values: unknown[] = []): Promise<Row[]> {
    const client = new pg.Client({ connectionString: database!.url });
    await client.connect();
    try {
      return (await client.query<Row>(sql, values)).rows;
    } finally {
      await client.end();
    }
  }

  it('applied twice change nothing the second time', async () => {
    database = await startMigrated(kind);
    const before = await query('select * from _prisma_migrations order by migration_name');
    expect(await applyMigrations(database.url)).toEqual({ code: 'migrated', applied: [] });
    expect(await query('select * from _prisma_migrations order by migration_name')).toEqual(before);
    expect(before).toHaveLength(readMigrations().migrationDirectories.length);
  });

  it.runIf(kind.isServer)('applied by two processes at once are applied once', async () => {
    database = await kind.startEmpty();
    const ends = await Promise.all([applyMigrations(database.url), applyMigrations(database.url)]);
    expect(ends.map((end) => end.code)).toEqual(['migrated', 'migrated']);
    const names = readMigrations().migrationDirectories.map((directory) => directory.path);
    expect(ends.flatMap((end) => (end.code === 'migrated' ? end.applied : []))).toEqual(names);
  });

  it('keep every row of a database filled at the previous migration', async () => {
    database = await startMigrated(kind, withoutLast(1));
    await fillDatabase(query);
    const before = await readEverything(query);
    expect(Object.values(before).every((rows) => rows.length > 0)).toBe(true);

    const end = await applyMigrations(database.url);
    expect(end).toMatchObject({ code: 'migrated', applied: [expect.any(String)] });
    const after = await readEverything(query);
    for (const [table, rows] of Object.entries(before)) expect(after[table], table).toEqual(rows);
  });

  it('stop whole at a broken script, name it, and go on once it is taken back', async () => {
    database = await startMigrated(kind);
    const broken = withMigration(BROKEN, `CREATE TABLE "half" ("a" TEXT DEFAULT ';'); SELECT 1 / 0;`);
    const first = await applyMigrations(database.url, broken);
    expect(first).toEqual({ code: 'half-applied', name: BROKEN, reason: 'division by zero' });
    expect(await query(`select to_regclass('half') as half`)).toEqual([{ half: null }]);

    const repaired = withMigration(BROKEN, `CREATE TABLE "half" ("a" TEXT DEFAULT ';');`);
    const second = await applyMigrations(database.url, repaired);
    expect(second).toEqual({ code: 'half-applied', name: BROKEN, reason: null });
    await resolveMigration(database.url, BROKEN, 'rolled-back', repaired);
    expect(await applyMigrations(database.url, repaired)).toEqual({ code: 'migrated', applied: [BROKEN] });
  });

  it('go on after a broken script was finished by hand', async () => {
    database = await startMigrated(kind);
    const broken = withMigration(BROKEN, 'SELECT 1 / 0;');
    await applyMigrations(database.url, broken);
    await resolveMigration(database.url, BROKEN, 'applied', broken);
    expect(await applyMigrations(database.url, broken)).toEqual({ code: 'migrated', applied: [] });
  });
}

it('a migration that stopped part-way is explained in one sentence that gives both ways out', () => {
  const sentence = explainHalfApplied('20260101000000_x', 'division by zero');
  expect(sentence).not.toContain('\n');
  expect(sentence.match(/\.(\s|$)/g)).toHaveLength(1);
  expect(sentence).toContain('npm run migrate -- --rolled-back 20260101000000_x');
  expect(sentence).toContain('npm run migrate -- --applied 20260101000000_x');
});
