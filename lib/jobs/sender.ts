/** The queue's sender of a process that only sends, such as the web server. */
import type PgBoss from 'pg-boss';
import { getLogger } from './log';
import { openQueue } from './queue';

/** One sender a process; kept on globalThis because a development server reloads modules. */
const holder = globalThis as typeof globalThis & { elbowroomSender?: Promise<PgBoss> | null };

/**
 * Never fails: the row of the work is already stored, and a worker's sweep finds queued work that has no job within seconds.
 * Without a queue the work only starts a little later.
 * @param id of the work, for the log
 */
export async function sendThroughQueue(id: string, send: (boss: PgBoss) => Promise<void>): Promise<void> {
  try {
    holder.elbowroomSender ??= openQueue('sender');
    await send(await holder.elbowroomSender);
  } catch (error) {
    holder.elbowroomSender = null;
    getLogger().warn({ err: error, id }, 'work not sent; the sweep will');
  }
}

/** Closes the sender, so that a short-lived process can end. */
export async function closeSender(): Promise<void> {
  const opened = holder.elbowroomSender;
  holder.elbowroomSender = null;
  if (opened) await (await opened).stop({ graceful: false });
}
