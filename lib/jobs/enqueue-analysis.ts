/** Hands a queued analysis to the workers. Never fails, see `sender.ts`. */
import type { WorkItem } from '../store/claimed-work';
import { sendAnalysis } from './queue';
import { sendThroughQueue } from './sender';

export async function enqueueAnalysis(item: WorkItem): Promise<void> {
  await sendThroughQueue(item.id, (boss) => sendAnalysis(boss, item));
}
