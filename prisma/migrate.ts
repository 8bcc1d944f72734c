/**
 * Brings the database of DATABASE_URL up to date:
 *   npm run migrate
 *   npm run migrate -- --applied NAME      a migration that stopped part-way has been finished by hand
 *   npm run migrate -- --rolled-back NAME  its changes have been taken back by hand
 * Exit codes: 0 done, 1 not done, 2 wrong arguments.
 */
import { parseArgs } from 'node:util';
import { applyMigrations, resolveMigration } from './apply-migrations';
import { explainFailure, explainHalfApplied } from './explain';

async function main(): Promise<number> {
  const { values } = parseArgs({
    options: { applied: { type: 'string' }, 'rolled-back': { type: 'string' } },
  });
  const url = process.env.DATABASE_URL?.trim();
  if (!url) {
    console.error(
      'Set DATABASE_URL to the database to migrate; `npm start` migrates the embedded one by itself.',
    );
    return 2;
  }
  try {
    if (values.applied) await resolveMigration(url, values.applied, 'applied');
    if (values['rolled-back']) await resolveMigration(url, values['rolled-back'], 'rolled-back');
    return await migrate(url);
  } catch (error) {
    console.error(explainFailure(url, error));
    return 1;
  }
}

async function migrate(url: string): Promise<number> {
  const end = await applyMigrations(url);
  if (end.code === 'half-applied') {
    console.error(explainHalfApplied(end.name, end.reason));
    return 1;
  }
  console.log(
    end.applied.length === 0 ? 'The database is up to date.' : `Applied ${end.applied.join(', ')}.`,
  );
  return 0;
}

// The engine leaves the timer of its lock behind, which would keep the process for ten seconds.
process.exit(await main());
