/** The database that the app runs on: the server of DATABASE_URL, or the embedded one in the data folder. */
import { join } from 'node:path';
import { describePlace } from './database-place.mjs';
import { LaunchProblem } from './problem.mjs';

/** Milliseconds. */
const CONNECT_TIMEOUT_MS = 8000;

/**
 * @param {import('./settings.mjs').LaunchSettings} settings
 * @param {(error: Error) => void} onBroken called when the embedded database cannot go on
 * @returns {Promise<{ url: string, stop: () => Promise<void> }>}
 * @throws {LaunchProblem} when it cannot be reached or opened
 */
export async function startDatabase(settings, onBroken) {
  if (settings.databaseUrl === null) return startEmbeddedDatabase(settings.dataFolder, onBroken);
  await checkReachable(settings.databaseUrl);
  return { url: settings.databaseUrl, stop: async () => {} };
}

async function startEmbeddedDatabase(dataFolder, onBroken) {
  const { startEmbedded } = await import('../embedded/start-embedded.mjs');
  const database = join(dataFolder, 'database');
  try {
    return await startEmbedded({ dataFolder: database, socketFolder: join(dataFolder, 'socket'), onBroken });
  } catch (error) {
    throw new LaunchProblem(
      `The embedded database in ${database} could not be opened (${firstLine(error)}): restore the folder from a backup, or set DATA_DIR to another one.`,
    );
  }
}

async function checkReachable(url) {
  const { default: pg } = await import('pg');
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: CONNECT_TIMEOUT_MS });
  client.on('error', () => {});
  try {
    await client.connect();
    await client.query('SELECT 1');
  } catch (error) {
    throw new LaunchProblem(
      `The database at ${describePlace(url)} cannot be reached (${firstLine(error)}): check that it runs and that DATABASE_URL is right.`,
    );
  } finally {
    await client.end().catch(() => {});
  }
}

/** Attempts at several addresses fail together, with their reasons inside. */
function firstLine(error) {
  const text = error.message || error.errors?.[0]?.message || error.code || String(error);
  return text.split('\n')[0];
}
