/**
 * The queues of fits and analyses: pg-boss in the schema "pgboss" of the app's own database. A job carries ids only; the row
 * of the work holds what to do and how far it is. The row rules: a job that finds its work already claimed or ended does
 * nothing, and work that lost its job gets a new one from the sweep (`start-worker.ts`). pg-boss itself therefore never retries.
 */
import PgBoss from 'pg-boss';
import { z } from 'zod';
import type { WorkItem } from '../store/claimed-work';
import { getDatabaseUrl } from '../store/client';
import type { FitJob } from '../store/fit-work';
import { getLogger } from './log';

export const FIT_QUEUE = 'fit';
export const ANALYSIS_QUEUE = 'analysis';
const SCHEMA = 'pgboss';

export const fitJobSchema = z.object({
  fitId: z.string().min(1),
  workspaceId: z.string().min(1),
}) satisfies z.ZodType<FitJob>;

export const analysisJobSchema = z.object({
  id: z.string().min(1),
  workspaceId: z.string().min(1),
}) satisfies z.ZodType<WorkItem>;

/** After this long pg-boss forgets a job whose worker died; the sweep has long made a new one. */
const EXPIRE_SECONDS = 60 * 60;
/** pg-boss's own housekeeping (archiving ended jobs), by workers only. */
const MAINTENANCE_SECONDS = 5 * 60;
const DELETE_AFTER_DAYS = 7;

/**
 * Connects to the queue, making its schema when it is not there yet.
 * A sender only sends; a worker also keeps house. Nothing here relies on LISTEN/NOTIFY: workers poll.
 */
export async function openQueue(role: 'sender' | 'worker'): Promise<PgBoss> {
  const boss = new PgBoss({
    connectionString: getDatabaseUrl(),
    schema: SCHEMA,
    max: role === 'worker' ? 2 : 1,
    application_name: `elbowroom-${role}`,
    schedule: false,
    supervise: role === 'worker',
    maintenanceIntervalSeconds: MAINTENANCE_SECONDS,
    deleteAfterDays: DELETE_AFTER_DAYS,
  });
  boss.on('error', (error) => getLogger().error({ err: error }, 'queue error'));
  await boss.start();
  // "short": at most one waiting job for each singleton key, so that sending twice is harmless.
  for (const name of [FIT_QUEUE, ANALYSIS_QUEUE]) {
    await boss.createQueue(name, { name, policy: 'short', retryLimit: 0, expireInSeconds: EXPIRE_SECONDS });
  }
  return boss;
}

export async function sendFit(boss: PgBoss, job: FitJob): Promise<void> {
  await boss.send(FIT_QUEUE, fitJobSchema.parse(job), { singletonKey: job.fitId });
}

export async function sendAnalysis(boss: PgBoss, item: WorkItem): Promise<void> {
  await boss.send(ANALYSIS_QUEUE, analysisJobSchema.parse(item), { singletonKey: item.id });
}
