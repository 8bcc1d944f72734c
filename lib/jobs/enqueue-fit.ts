/** Hands a queued fit to the workers. Never fails, see `sender.ts`. */
import type { FitJob } from '../store/fit-work';
import { sendFit } from './queue';
import { sendThroughQueue } from './sender';

export async function enqueueFit(job: FitJob): Promise<void> {
  await sendThroughQueue(job.fitId, (boss) => sendFit(boss, job));
}
