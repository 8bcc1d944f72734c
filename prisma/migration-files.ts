/** The schema and the migrations on disk, as Prisma lays them out. */
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type {
  MigrationList,
  SchemaFilter,
  SchemasContainer,
} from '@prisma/schema-engine-wasm/schema_engine_bg';

const MIGRATIONS_FOLDER = fileURLToPath(new URL('./migrations', import.meta.url));
const SCHEMA_FILE = fileURLToPath(new URL('./schema.prisma', import.meta.url));
const LOCK_FILE = 'migration_lock.toml';
const SCRIPT_FILE = 'migration.sql';

/** The schema's tables are all ours; those of the queue live in a database schema of their own. */
export const NO_FILTER: SchemaFilter = { externalTables: [], externalEnums: [] };

export function readSchema(): SchemasContainer {
  return { files: [{ path: SCHEMA_FILE, content: readFileSync(SCHEMA_FILE, 'utf8') }] };
}

/** Migrations in the order of their names, which start with the time they were made. */
export function readMigrations(folder: string = MIGRATIONS_FOLDER): MigrationList {
  const names = readdirSync(folder, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name)
    .sort();
  return {
    baseDir: folder,
    lockfile: { path: LOCK_FILE, content: readFileSync(join(folder, LOCK_FILE), 'utf8') },
    shadowDbInitScript: '',
    migrationDirectories: names.map((name) => ({
      path: name,
      migrationFile: {
        path: SCRIPT_FILE,
        content: { tag: 'ok', value: readFileSync(join(folder, name, SCRIPT_FILE), 'utf8') },
      },
    })),
  };
}

/** @returns path of the new script */
export function writeMigration(name: string, script: string, folder: string = MIGRATIONS_FOLDER): string {
  mkdirSync(join(folder, name));
  const path = join(folder, name, SCRIPT_FILE);
  writeFileSync(path, script, { flag: 'wx' });
  return path;
}
