/** Runs a worker as a process: starts it, waits for a sign to stop, stops it, and ends. */
import { getLogger } from './log';
import type { Worker } from './start-worker';

const SIGNS_TO_STOP = ['SIGTERM', 'SIGINT', 'disconnect'] as const;

export async function runProcess(start: () => Promise<Worker>): Promise<void> {
  const log = getLogger();
  try {
    // Listening before starting: a sign that comes during the start must not be lost.
    const sign = waitForSign();
    const worker = await start();
    log.info('worker ready');
    log.info({ sign: await sign }, 'worker stopping');
    await worker.stop();
    process.exit(0);
  } catch (error) {
    log.fatal({ err: error }, 'worker failed');
    process.exit(1);
  }
}

function waitForSign(): Promise<string> {
  return new Promise((resolve) => {
    for (const sign of SIGNS_TO_STOP) process.once(sign, () => resolve(sign));
  });
}
