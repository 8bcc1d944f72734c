/**
 * A worker: takes fits from the queue one at a time and, when idle, sweeps up after workers that died.
 * One fit at a time, because a fit fills a processor; more processors are used by more worker processes.
 */
import type PgBoss from 'pg-boss';
import { closePrisma } from '../store/client';
import { listQueuedFits, sweepFits } from '../store/fit-work';
import { type FitJobTools, runFitJob } from './fit-job';
import { getLogger, type Logger } from './log';
import { FIT_QUEUE, fitJobSchema, openQueue, sendFit } from './queue';

/** How often an idle worker looks for a job. */
const POLL_SECONDS = 0.5;
/** How often an idle worker sweeps. */
const SWEEP_EVERY_MS = 4000;
/** A running fit reports every 0.3 s; after so long without a report its worker counts as dead. */
export const SILENT_SECONDS = 8;
/** Workers that may die over one fit before it fails: a fit that kills its worker must not do so for ever. */
export const MAX_ATTEMPTS = 4;
/** Waiting fits that one sweep looks at. */
const SWEEP_LIMIT = 200;
/** A slice is far shorter; after so long a stop no longer waits for the running fit. */
const STOP_TIMEOUT_MS = 10_000;

export interface FitWorker {
  /** Puts a running fit back, then closes the queue and the database. Safe to call twice. */
  stop: () => Promise<void>;
}

export async function startFitWorker(createRun: FitJobTools['createRun']): Promise<FitWorker> {
  const log = getLogger();
  const stopping = new AbortController();
  const boss = await openQueue('worker');
  let isBusy = false;

  async function handle([job]: PgBoss.Job[]): Promise<void> {
    isBusy = true;
    try {
      if (job) await handleJob(job, { createRun, stop: stopping.signal, log });
    } finally {
      isBusy = false;
    }
  }

  /** Idle workers only: a busy one could not take what it finds, and after a pause might give away its own fit. */
  async function sweepWhenIdle(): Promise<void> {
    if (!isBusy && !stopping.signal.aborted) await sweep(boss, log);
  }

  await sweepWhenIdle();
  await boss.work(FIT_QUEUE, { batchSize: 1, pollingIntervalSeconds: POLL_SECONDS }, handle);
  const timer = setInterval(sweepWhenIdle, SWEEP_EVERY_MS);
  let stopped: Promise<void> | null = null;

  async function stopInOrder(): Promise<void> {
    stopping.abort();
    clearInterval(timer);
    await boss.stop({ graceful: true, timeout: STOP_TIMEOUT_MS });
    await closePrisma();
  }

  return { stop: () => (stopped ??= stopInOrder()) };
}

async function handleJob(job: PgBoss.Job, tools: FitJobTools): Promise<void> {
  const parsed = fitJobSchema.safeParse(job.data);
  if (!parsed.success) {
    tools.log.error({ jobId: job.id }, 'a job that is no fit');
    return;
  }
  const startedAt = performance.now();
  const { fitId } = parsed.data;
  try {
    const end = await runFitJob(parsed.data, tools);
    tools.log.info({ fitId, end, milliseconds: Math.round(performance.now() - startedAt) }, 'fit job ended');
  } catch (error) {
    tools.log.error({ err: error, fitId }, 'fit job broke off');
    throw error;
  }
}

/** Takes fits of dead workers back and gives every waiting fit a job; one that has a job already keeps it. */
async function sweep(boss: PgBoss, log: Logger): Promise<void> {
  try {
    const takenBack = await sweepFits({ silentSeconds: SILENT_SECONDS, maxAttempts: MAX_ATTEMPTS });
    if (takenBack.length > 0)
      log.warn({ fitIds: takenBack.map((fit) => fit.fitId) }, 'fits taken back from a silent worker');
    for (const fit of await listQueuedFits({ limit: SWEEP_LIMIT })) await sendFit(boss, fit);
  } catch (error) {
    log.error({ err: error }, 'sweep failed');
  }
}
