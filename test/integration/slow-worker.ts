/** A worker process like the app's own, with a slow stand-in for the engine: something to kill in the middle of a fit. */
import { startFitWorker } from '@/lib/jobs/fit-worker';
import { runProcess } from '@/lib/jobs/run-process';
import { createFakeRun } from './fake-run';

const slices = Number(process.env.FAKE_SLICES);

await runProcess(() => startFitWorker(createFakeRun({ slices, sliceMilliseconds: 50 })));
