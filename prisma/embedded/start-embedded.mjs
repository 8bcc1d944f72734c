/**
 * The embedded PostgreSQL: PGlite behind a Unix socket, reached with the same driver as a real server.
 * The caller makes sure that only one process opens a data folder at a time (`lib/cli/launch/data-lock.mjs`).
 */
import { mkdirSync } from 'node:fs';
import { PGlite } from '@electric-sql/pglite';
import { PGLiteSocketServer } from '@electric-sql/pglite-socket';
import { shareSession } from './shared-session.mjs';
import { makeSocketFolder } from './socket-folder.mjs';

/** Pools of the web server, the worker and its queue together stay well below this. */
const MAX_CONNECTIONS = 100;

/**
 * @typedef {object} EmbeddedDatabase
 * @property {string} url connection string for any PostgreSQL client on this machine and account
 * @property {() => Promise<void>} stop closes all connections, then the database; safe to call twice
 */

/**
 * @param {object} options
 * @param {string | null} options.dataFolder where the database is kept, made for this account alone; null: in memory
 * @param {string | null} options.socketFolder where its socket goes if the path is short enough; null: a temporary folder
 * @param {(error: Error) => void} [options.onBroken] called when the database cannot go on
 * @returns {Promise<EmbeddedDatabase>}
 */
export async function startEmbedded({ dataFolder, socketFolder, onBroken = () => {} }) {
  if (dataFolder !== null) mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
  const database = await PGlite.create(dataFolder ?? 'memory://');
  const socket = makeSocketFolder(socketFolder);
  const server = new PGLiteSocketServer({
    db: shareSession(database, onBroken),
    path: socket.path,
    maxConnections: MAX_CONNECTIONS,
  });
  await server.start();
  let stopping = null;
  return {
    url: `postgresql://postgres@localhost/postgres?host=${encodeURIComponent(socket.folder)}`,
    stop: () => (stopping ??= stopInOrder(server, database, socket)),
  };
}

async function stopInOrder(server, database, socket) {
  await server.stop();
  await database.close();
  socket.remove();
}
