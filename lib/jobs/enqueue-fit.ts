/** Hands a queued fit to the workers from a process that only sends, such as the web server. */
import type PgBoss from 'pg-boss';
import type { FitJob } from '../store/fit-work';
import { getLogger } from './log';
import { openQueue, sendFit } from './queue';

/** One sender a process; kept on globalThis because a development server reloads modules. */
const holder = globalThis as typeof globalThis & { elbowroomSender?: Promise<PgBoss> | null };

/**
 * Never fails: the fit's row is already stored, and a worker's sweep finds a queued fit that has no job within seconds.
 * Without a queue the fit only starts a little later.
 */
export async function enqueueFit(job: FitJob): Promise<void> {
  try {
    holder.elbowroomSender ??= openQueue('sender');
    await sendFit(await holder.elbowroomSender, job);
  } catch (error) {
    holder.elbowroomSender = null;
    getLogger().warn({ err: error, fitId: job.fitId }, 'fit not sent; the sweep will');
  }
}

/** Closes the sender, so that a short-lived process can end. */
export async function closeSender(): Promise<void> {
  const opened = holder.elbowroomSender;
  holder.elbowroomSender = null;
  if (opened) await (await opened).stop({ graceful: false });
}
