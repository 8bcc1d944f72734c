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
  const embedded = await startEmbedded({ dataFolder: null, socketFolder: null });
  // The engine wants a database of its own and an empty one to try the migrations in; it leaves its own alone.
  const connect = async () => embedded.url;
  try {
    return await withSchemaEngine({ database: connect, emptyDatabase: connect }, schema, async (engine) => {
      const difference = await engine.diff({
        from: { tag: 'migrations', ...migrationsList },
        to: { tag: 'schemaDatamodel', ...schema },
        script: true,
        exitCode: true,
        filters: NO_FILTER,
      });
      return difference.exitCode === DIFFERENT ? difference.stdout : null;
    });
  } finally {
    await embedded.stop();
  }
}
