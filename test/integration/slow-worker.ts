/** A worker process like the app's own, with a slow stand-in for the engine: something to kill in the middle of a fit. */
import { runProcess } from '@/lib/jobs/run-process';
import { startWorker } from '@/lib/jobs/start-worker';
import { createFakeRun } from './fake-run';

const slices = Number(process.env.FAKE_SLICES);

await runProcess(() =>
  startWorker({ createRun: createFakeRun({ slices, sliceMilliseconds: 50 }), analyses: {} }),
);
