/**
 * Drives a run of the engine slice by slice: reports what is true so far, obeys, and stores its end once.
 * The row is the only truth; each write names the claim, so of two workers at most one can end the work.
 */
import { setImmediate, setTimeout } from 'node:timers/promises';
import type { WorkOrder } from '../store/claimed-work';
import { ENGINE_ERROR } from './failure';
import type { Logger } from './log';

/** A report is one small write; more often than this a page could not show it anyway. */
const REPORT_EVERY_MS = 300;
/** How often waiting work looks whether it may go on. */
const WAIT_MS = 50;

export interface JobTools {
  /** Aborted when the process is told to stop: the work goes back to the queue. */
  stop: AbortSignal;
  log: Logger;
  /** Something more urgent is running in this process: keep the claim, leave it the processor. */
  mustWait?: () => boolean;
}

export type JobEnd =
  | 'done'
  | 'failed'
  | 'cancelled'
  | 'put-back'
  /** Somebody else's, or gone, before or after the claim. Nothing was written. */
  | 'not-mine';

type AnyStep = { done: false; progress: object } | { done: true };
type ProgressOf<Step> = Extract<Step, { done: false; progress: object }>['progress'];
type EndOf<Step> = Extract<Step, { done: true }>;

/** Claimed work: its run, and its row in the store. */
export interface DrivenWork<Step extends AnyStep> {
  /** For the log. */
  id: string;
  createRun(): { next(): Step };
  /** @throws when the end is no result: the engine's fault @returns a result ready to store, or the code of a failure */
  readEnd(end: EndOf<Step>): { store: () => Promise<boolean> } | { failure: string };
  /** Progress absent: a heartbeat. */
  report(progress?: ProgressOf<Step>): Promise<WorkOrder>;
  fail(code: string): Promise<boolean>;
  endCancelled(): Promise<boolean>;
  release(): Promise<boolean>;
}

/** What the engine threw: the same input throws again, so the work has failed and is not retried. */
class EngineFault extends Error {}

/** @throws whatever the database throws; the work then stays "running" and silent until a sweep takes it back. */
export async function driveRun<Step extends AnyStep>(
  work: DrivenWork<Step>,
  tools: JobTools,
): Promise<JobEnd> {
  try {
    return await drive(work, tools);
  } catch (error) {
    if (!(error instanceof EngineFault)) throw error;
    tools.log.error({ err: error.cause, id: work.id }, 'the engine threw');
    return fail(work, ENGINE_ERROR);
  }
}

async function drive<Step extends AnyStep>(work: DrivenWork<Step>, tools: JobTools): Promise<JobEnd> {
  const run = runEngine(() => work.createRun());
  let reportedAt = Number.NEGATIVE_INFINITY;
  let progress: ProgressOf<Step> | undefined;
  for (;;) {
    const mustWait = tools.mustWait?.() ?? false;
    if (!mustWait) {
      const step = runEngine(() => run.next());
      if (step.done) return storeEnd(work, step as EndOf<Step>);
      progress = step.progress as ProgressOf<Step>;
    }
    if (tools.stop.aborted) return (await work.release()) ? 'put-back' : 'not-mine';
    if (performance.now() - reportedAt >= REPORT_EVERY_MS) {
      const order = await work.report(progress);
      reportedAt = performance.now();
      if (order !== 'go-on') return obey(work, order);
    }
    // Gives signals and timers their turn; a slice itself never waits.
    await (mustWait ? setTimeout(WAIT_MS) : setImmediate());
  }
}

async function storeEnd<Step extends AnyStep>(work: DrivenWork<Step>, end: EndOf<Step>): Promise<JobEnd> {
  const reading = runEngine(() => work.readEnd(end));
  if ('failure' in reading) return fail(work, reading.failure);
  if (await reading.store()) return 'done';
  return obey(work, await work.report());
}

async function fail<Step extends AnyStep>(work: DrivenWork<Step>, code: string): Promise<JobEnd> {
  return (await work.fail(code)) ? 'failed' : 'not-mine';
}

async function obey<Step extends AnyStep>(work: DrivenWork<Step>, order: WorkOrder): Promise<JobEnd> {
  return order === 'cancel' && (await work.endCancelled()) ? 'cancelled' : 'not-mine';
}

function runEngine<T>(work: () => T): T {
  try {
    return work();
  } catch (cause) {
    throw new EngineFault('the engine threw', { cause });
  }
}
