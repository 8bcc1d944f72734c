/**
 * A worker: takes fits and analyses from their queues and sweeps up after workers that died.
 * One piece of work at a time, because each fills a processor; more processors are used by more worker processes. Fits come
 * first: an analysis under way keeps its claim and waits while a fit runs here.
 */
import type PgBoss from 'pg-boss';
import { analysisWork } from '../store/analysis-work';
import { closePrisma } from '../store/client';
import { listQueuedFits, sweepFits } from '../store/fit-work';
import { requestAnalysesAfter, requestMissingAnalyses, runAnalysisJob } from './analysis-job';
import type { AnalysisRuns } from './analysis-runs';
import type { JobEnd } from './drive-run';
import { type FitJobTools, runFitJob } from './fit-job';
import { getLogger } from './log';
import {
  ANALYSIS_QUEUE,
  analysisJobSchema,
  FIT_QUEUE,
  fitJobSchema,
  openQueue,
  sendAnalysis,
  sendFit,
} from './queue';

/** How often an idle worker looks for a job. */
const POLL_SECONDS = 0.5;
/** How often a worker that runs no fit sweeps. */
const SWEEP_EVERY_MS = 4000;
/** Running work reports every 0.3 s; after so long without a report its worker counts as dead. */
export const SILENT_SECONDS = 8;
/** Workers that may die over one piece of work before it fails: what kills its worker must not do so for ever. */
export const MAX_ATTEMPTS = 4;
/** Waiting rows that one sweep looks at. */
const SWEEP_LIMIT = 200;
/** A slice is far shorter; after so long a stop no longer waits for running work. */
const STOP_TIMEOUT_MS = 10_000;

export interface WorkerParts {
  createRun: FitJobTools['createRun'];
  /** Kinds made here; each follows a fit that ended well. */
  analyses: AnalysisRuns;
}

export interface Worker {
  /** Puts running work back, then closes the queue and the database. Safe to call twice. */
  stop: () => Promise<void>;
}

export async function startWorker({ createRun, analyses }: WorkerParts): Promise<Worker> {
  const log = getLogger();
  const stopping = new AbortController();
  const boss = await openQueue('worker');
  const tools = { stop: stopping.signal, log };
  let isFitting = false;
  let analysisId: string | null = null;

  async function handleFit([job]: PgBoss.Job[]): Promise<void> {
    const parsed = fitJobSchema.safeParse(job?.data);
    if (!parsed.success) return log.error({ jobId: job?.id }, 'a job that is no fit');
    isFitting = true;
    try {
      const end = await logEnd('fit', parsed.data.fitId, () =>
        runFitJob(parsed.data, { ...tools, createRun }),
      );
      if (end !== 'done') return;
      for (const item of await requestAnalysesAfter(parsed.data, analyses)) await sendAnalysis(boss, item);
    } finally {
      isFitting = false;
    }
  }

  async function handleAnalysis([job]: PgBoss.Job[]): Promise<void> {
    const parsed = analysisJobSchema.safeParse(job?.data);
    if (!parsed.success) return log.error({ jobId: job?.id }, 'a job that is no analysis');
    analysisId = parsed.data.id;
    const mustWait = () => isFitting;
    try {
      await logEnd('analysis', parsed.data.id, () =>
        runAnalysisJob(parsed.data, { ...tools, runs: analyses, mustWait }),
      );
    } finally {
      analysisId = null;
    }
  }

  /** Not while a fit runs: this worker could not take what it finds, and after a pause might give away its own fit. */
  async function sweepWhenFree(): Promise<void> {
    if (!isFitting && !stopping.signal.aborted) await sweep(boss, analyses, analysisId);
  }

  await sweepWhenFree();
  const polling = { batchSize: 1, pollingIntervalSeconds: POLL_SECONDS };
  await boss.work(FIT_QUEUE, polling, handleFit);
  await boss.work(ANALYSIS_QUEUE, polling, handleAnalysis);
  const timer = setInterval(sweepWhenFree, SWEEP_EVERY_MS);
  let stopped: Promise<void> | null = null;

  async function stopInOrder(): Promise<void> {
    stopping.abort();
    clearInterval(timer);
    await boss.stop({ graceful: true, timeout: STOP_TIMEOUT_MS });
    await closePrisma();
  }

  return { stop: () => (stopped ??= stopInOrder()) };
}

async function logEnd(what: string, id: string, work: () => Promise<JobEnd>): Promise<JobEnd> {
  const startedAt = performance.now();
  try {
    const end = await work();
    getLogger().info(
      { id, end, milliseconds: Math.round(performance.now() - startedAt) },
      `${what} job ended`,
    );
    return end;
  } catch (error) {
    getLogger().error({ err: error, id }, `${what} job broke off`);
    throw error;
  }
}

/**
 * Takes work of dead workers back and gives all waiting work a job; what has a job already keeps it.
 * @param ownAnalysisId runs in this very worker, which may only have been paused
 */
async function sweep(boss: PgBoss, runs: AnalysisRuns, ownAnalysisId: string | null): Promise<void> {
  const log = getLogger();
  const limits = { silentSeconds: SILENT_SECONDS, maxAttempts: MAX_ATTEMPTS };
  try {
    const fits = await sweepFits(limits);
    await requestMissingAnalyses(runs, SWEEP_LIMIT);
    const analyses = await analysisWork.sweep({ ...limits, exceptId: ownAnalysisId });
    const ids = [...fits.map((fit) => fit.fitId), ...analyses.map((analysis) => analysis.id)];
    if (ids.length > 0) log.warn({ ids }, 'work taken back from a silent worker');
    for (const fit of await listQueuedFits({ limit: SWEEP_LIMIT })) await sendFit(boss, fit);
    for (const item of await analysisWork.listQueued({ limit: SWEEP_LIMIT })) await sendAnalysis(boss, item);
  } catch (error) {
    log.error({ err: error }, 'sweep failed');
  }
}
