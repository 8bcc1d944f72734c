/**
 * Preloaded into the launcher's children, and so into their children. The channel to the parent closes when the parent
 * ends, even when it was killed; a child without a launcher would keep the port and has no database, so it ends too.
 */

/** Milliseconds for a child that has its own way of ending on this sign. */
const GRACE_MS = 5000;

process.once('disconnect', () => {
  const hasOwnWay = process.listenerCount('disconnect') > 0;
  setTimeout(() => process.exit(1), hasOwnWay ? GRACE_MS : 0).unref();
});
