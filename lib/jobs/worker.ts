/**
 * The worker process. Started by the launcher beside the web server, with DATABASE_URL set:
 *   node --conditions=react-server --import tsx lib/jobs/worker.ts
 * SIGTERM, SIGINT, or the end of the launcher's channel: the running fit goes back to the queue and the process ends.
 */
import { createOutlookRun } from '../forecast/outlook-run';
import { startFitWorker } from './fit-worker';
import { runProcess } from './run-process';

await runProcess(() => startFitWorker(createOutlookRun));
