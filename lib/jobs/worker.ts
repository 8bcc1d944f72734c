/**
 * The worker process. Started by the launcher beside the web server, with DATABASE_URL set:
 *   node --conditions=react-server --import tsx lib/jobs/worker.ts
 * SIGTERM, SIGINT, or the end of the launcher's channel: running work goes back to the queue and the process ends.
 */
import { createOutlookRun } from '../forecast/outlook-run';
import { ANALYSIS_RUNS } from './analysis-runs';
import { runProcess } from './run-process';
import { startWorker } from './start-worker';

await runProcess(() => startWorker({ createRun: createOutlookRun, analyses: ANALYSIS_RUNS }));
