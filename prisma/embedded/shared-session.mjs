/**
 * One PGlite session shared by many client connections without mixing their messages.
 *
 * PGlite has a single session. The socket server hands it one protocol message at a time and keeps to one client only
 * inside BEGIN … COMMIT. A query with parameters is a run of messages (Parse, Bind, Describe, Execute, Sync) that lives in
 * the session's unnamed statement, so a message of another client in between makes it answer the wrong query. This
 * wrapper reports "in a transaction" until the run has ended with Sync, and the server then keeps to that client.
 *
 * Limit: what PostgreSQL keeps per session (SET, named statements, LISTEN) is common to all clients. Nothing here uses it.
 */

/** First bytes of the messages after which the session is idle again: Sync and a query of one message. */
const ENDS_RUN = new Set(['S', 'Q'].map((letter) => letter.charCodeAt(0)));
/** First bytes of the messages that belong to no run: Terminate, and a start-up packet, whose first byte is of its length. */
const BELONGS_TO_NO_RUN = new Set(['X'.charCodeAt(0), 0]);
/** Sync message: type byte and length 4. */
const SYNC_MESSAGE = Uint8Array.of('S'.charCodeAt(0), 0, 0, 0, 4);

/**
 * @param {import('@electric-sql/pglite').PGlite} database an open PGlite
 * @param {(error: Error) => void} onBroken called once when the session fails in a way it cannot go on from
 * @returns {import('@electric-sql/pglite').PGlite} the part of PGlite that PGLiteSocketServer uses
 */
export function shareSession(database, onBroken) {
  let isRunOpen = false;

  async function execProtocolRawStream(message, options) {
    if (!BELONGS_TO_NO_RUN.has(message[0])) isRunOpen = !ENDS_RUN.has(message[0]);
    try {
      await database.execProtocolRawStream(message, options);
    } catch (error) {
      onBroken(error);
      throw error;
    }
  }

  /** The server calls this to roll back for a client that went away, perhaps in the middle of a run. */
  async function exec(sql) {
    if (isRunOpen) {
      isRunOpen = false;
      await database.runExclusive(() =>
        database.execProtocolRawStream(SYNC_MESSAGE, { onRawData: () => {} }),
      );
    }
    return database.exec(sql);
  }

  return /** @type {any} */ ({
    waitReady: database.waitReady,
    isInTransaction: () => isRunOpen || database.isInTransaction(),
    runExclusive: (work) => database.runExclusive(work),
    execProtocolRawStream,
    exec,
  });
}
