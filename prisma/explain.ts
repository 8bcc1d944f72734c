/** Sentences for whoever migrates: what happened, why, and what to do. They never show a password. */
import { describePlace } from './launch/database-place.mjs';

export function explainHalfApplied(name: string, reason: string | null): string {
  const why = reason === null ? '' : ` (${reason})`;
  return (
    `The migration ${name} stopped part-way${why}: nothing after it was applied, so repair the cause and run ` +
    `"npm run migrate -- --rolled-back ${name}" to try it again, or, if its changes are all in place, ` +
    `"npm run migrate -- --applied ${name}".`
  );
}

export function explainFailure(url: string, error: unknown): string {
  const first = (error instanceof Error ? error.message : String(error)).split('\n')[0]!.replace(/\.$/, '');
  return (
    `The database at ${describePlace(url)} could not be migrated: ${first}. ` +
    'Check that it runs and that DATABASE_URL names a user who may create tables.'
  );
}
