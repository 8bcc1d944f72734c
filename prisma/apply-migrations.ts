/** Applies migrations to a database, and records by hand how one that stopped part-way was repaired. */
import type { MigrationList } from '@prisma/schema-engine-wasm/schema_engine_bg';
import { NO_FILTER, readMigrations } from './migration-files';
import { type SchemaEngine, withSchemaEngine } from './schema-engine';

export type MigrationEnd =
  | { code: 'migrated'; applied: string[] }
  /** A migration stopped part-way, now or earlier; nothing after it was tried. */
  | { code: 'half-applied'; name: string; reason: string | null };

/**
 * Applies what the database lacks; a database that is up to date is left alone. On a server, a second process waits
 * until the first has ended. The embedded database cannot make it wait; there, only the launcher migrates.
 * @param url connection string of a PostgreSQL database
 * @throws Error when the database cannot be reached
 */
export async function applyMigrations(
  url: string,
  migrationsList: MigrationList = readMigrations(),
): Promise<MigrationEnd> {
  return withDatabase(url, async (engine) => {
    try {
      const { appliedMigrationNames } = await engine.applyMigrations({ migrationsList, filters: NO_FILTER });
      return { code: 'migrated', applied: appliedMigrationNames };
    } catch (error) {
      const name = await findHalfApplied(engine, migrationsList);
      if (name === null) throw error;
      return { code: 'half-applied', name, reason: readReason(error) };
    }
  });
}

/** Records that a migration which stopped part-way has been finished, or taken back, by hand. */
export async function resolveMigration(
  url: string,
  migrationName: string,
  end: 'applied' | 'rolled-back',
  migrationsList: MigrationList = readMigrations(),
): Promise<void> {
  await withDatabase(url, async (engine) => {
    if (end === 'applied') await engine.markMigrationApplied({ migrationName, migrationsList });
    else await engine.markMigrationRolledBack({ migrationName });
  });
}

async function withDatabase<T>(url: string, work: (engine: SchemaEngine) => Promise<T>): Promise<T> {
  const emptyDatabase = () =>
    Promise.reject(new Error('applying migrations must not need a second database'));
  return withSchemaEngine({ database: async () => url, emptyDatabase }, null, work);
}

async function findHalfApplied(engine: SchemaEngine, migrationsList: MigrationList): Promise<string | null> {
  const { failedMigrationNames } = await engine.diagnoseMigrationHistory({
    migrationsList,
    optInToShadowDatabase: false,
    filters: NO_FILTER,
  });
  return failedMigrationNames[0] ?? null;
}

/** The database's own words, without the engine's stack of places. */
function readReason(error: unknown): string | null {
  const message = error instanceof Error ? error.message : '';
  return message.match(/ERROR: (.+)/)?.[1] ?? null;
}
