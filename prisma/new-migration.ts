/**
 * Writes the migration that takes the database from the existing migrations to `schema.prisma`:
 *   npm run migration:new -- name-of-the-change
 * Look at the script before you commit it.
 */
import { writeMigration } from './migration-files';
import { findSchemaDifference } from './schema-difference';

/** 20260131235959 in UTC, as Prisma starts the names of migrations. */
function writeTime(time: Date): string {
  return time.toISOString().replace(/\D/g, '').slice(0, 14);
}

async function main(name: string | undefined): Promise<number> {
  const words = name?.trim().toLowerCase().replace(/\W+/g, '_');
  if (!words) {
    console.error('Name the change, for example: npm run migration:new -- add-passcodes');
    return 2;
  }
  const script = await findSchemaDifference();
  if (script === null) console.log('The migrations already give the schema; nothing was written.');
  else console.log(writeMigration(`${writeTime(new Date())}_${words}`, script));
  return 0;
}

process.exitCode = await main(process.argv[2]);
