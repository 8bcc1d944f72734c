/**
 * One fit, from claim to end: drives the run slice by slice, reports what is true so far, and stores the result once.
 * The fit's row is the only truth; each write names the claim, so of two workers at most one can end a fit.
 */
import { setImmediate } from 'node:timers/promises';
import { thinDraws } from '../estimate/draws';
import type { FitInput } from '../estimate/types';
import type { OutlookRun, OutlookStep } from '../forecast/outlook-run';
import { fitReportSchema } from '../forecast/report';
import {
  beatHeart,
  type ClaimedFit,
  claimFit,
  endCancelledFit,
  type FitJob,
  type FitOrder,
  failFit,
  finishFit,
  releaseFit,
  saveProgress,
} from '../store/fit-work';
import { readRevision } from '../store/revisions';
import { ENGINE_ERROR, type FailureCode } from './failure';
import type { Logger } from './log';

/** Draws kept with a fit: 2,000 rows of some 16 columns are 256 kB, and put 90 % bounds within a percentile. */
export const STORED_DRAWS = 2000;
/** A report is one small write; more often than this a page could not show it anyway. */
const REPORT_EVERY_MS = 300;

export interface FitJobTools {
  createRun: (input: FitInput) => OutlookRun;
  /** Aborted when the process is told to stop: the fit goes back to the queue. */
  stop: AbortSignal;
  log: Logger;
}

export type FitJobEnd =
  | 'done'
  | 'failed'
  | 'cancelled'
  | 'put-back'
  /** Somebody else's, or gone, before or after the claim. Nothing was written. */
  | 'not-mine';

/** What the engine threw: the same input throws again, so the fit has failed and is not retried. */
class EngineFault extends Error {}

/** @throws whatever the database throws; the fit then stays "running" and silent until a sweep takes it back. */
export async function runFitJob(job: FitJob, tools: FitJobTools): Promise<FitJobEnd> {
  const claim = await claimFit(job);
  if (!claim) return 'not-mine';
  try {
    return await driveRun(claim, tools);
  } catch (error) {
    if (!(error instanceof EngineFault)) throw error;
    tools.log.error({ err: error.cause, fitId: claim.fitId }, 'the engine threw');
    return fail(claim, ENGINE_ERROR);
  }
}

async function driveRun(claim: ClaimedFit, tools: FitJobTools): Promise<FitJobEnd> {
  const revision = await readRevision(claim);
  if (!revision) return 'not-mine';
  const run = runEngine(() => tools.createRun({ series: revision.series, options: claim.options }));
  let reportedAt = Number.NEGATIVE_INFINITY;
  for (;;) {
    const step = runEngine(() => run.next());
    if (step.done) return store(claim, step);
    if (tools.stop.aborted) return (await releaseFit(claim)) ? 'put-back' : 'not-mine';
    if (performance.now() - reportedAt >= REPORT_EVERY_MS) {
      const order = await saveProgress(claim, step.progress);
      reportedAt = performance.now();
      if (order !== 'go-on') return obey(claim, order);
    }
    // Gives signals and timers their turn; a slice itself never waits.
    await setImmediate();
  }
}

async function store(claim: ClaimedFit, step: Extract<OutlookStep, { done: true }>): Promise<FitJobEnd> {
  if ('failure' in step) return fail(claim, step.failure);
  const report = runEngine(() => fitReportSchema.parse(step.report));
  const draws = runEngine(() => thinDraws(step.draws, STORED_DRAWS));
  if (await finishFit(claim, { report, draws })) return 'done';
  return obey(claim, await beatHeart(claim));
}

async function fail(claim: ClaimedFit, code: FailureCode): Promise<FitJobEnd> {
  return (await failFit(claim, code)) ? 'failed' : 'not-mine';
}

async function obey(claim: ClaimedFit, order: FitOrder): Promise<FitJobEnd> {
  return order === 'cancel' && (await endCancelledFit(claim)) ? 'cancelled' : 'not-mine';
}

function runEngine<T>(work: () => T): T {
  try {
    return work();
  } catch (cause) {
    throw new EngineFault('the engine threw', { cause });
  }
}
