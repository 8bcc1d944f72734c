/**
 * What separates the migrations from `schema.prisma`. It works in memory: no database needs to run and none is changed.
 * (The engine's own createMigration insists on a database server that it may create databases on.)
 */
import type { MigrationList } from '@prisma/schema-engine-wasm/schema_engine_bg';
import { startEmbedded } from './embedded/start-embedded.mjs';
import { NO_FILTER, readMigrations, readSchema } from './migration-files';
import { withSchemaEngine } from './schema-engine';

/** The engine's exit code for "there is a difference". */
const DIFFERENT = 2;

/** @returns the SQL that takes a database from the migrations to the schema; null when they agree */
export async function findSchemaDifference(
  migrationsList: MigrationList = readMigrations(),
  schema = readSchema(),
): Promise<string | null> {
  return withEmptyDatabases((start) =>
    withSchemaEngine({ database: start, emptyDatabase: start }, schema, async (engine) => {
      const difference = await engine.diff({
        from: { tag: 'migrations', ...migrationsList },
        to: { tag: 'schemaDatamodel', ...schema },
        script: true,
        exitCode: true,
        filters: NO_FILTER,
      });
      return difference.exitCode === DIFFERENT ? difference.stdout : null;
    }),
  );
}

async function withEmptyDatabases<T>(work: (start: () => Promise<string>) => Promise<T>): Promise<T> {
  const started: Awaited<ReturnType<typeof startEmbedded>>[] = [];
  try {
    return await work(async () => {
      const embedded = await startEmbedded({ dataFolder: null, socketFolder: null });
      started.push(embedded);
      return embedded.url;
    });
  } finally {
    await Promise.all(started.map((embedded) => embedded.stop()));
  }
}
