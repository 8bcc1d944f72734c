/** Fits as jobs on real databases: ended once, whatever happens to their workers. */
import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout } from 'node:timers/promises';
import { afterAll, afterEach, beforeEach, expect, it } from 'vitest';
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import type { OutlookStep } from '@/lib/forecast/outlook-run';
import { enqueueFit } from '@/lib/jobs/enqueue-fit';
import { type FitJobTools, runFitJob, STORED_DRAWS } from '@/lib/jobs/fit-job';
import { getLogger } from '@/lib/jobs/log';
import { FIT_QUEUE, openQueue } from '@/lib/jobs/queue';
import { closeSender } from '@/lib/jobs/sender';
import {
  MAX_ATTEMPTS,
  SILENT_SECONDS,
  startWorker as startAppWorker,
  type Worker,
} from '@/lib/jobs/start-worker';
import { cancelFit } from '@/lib/services/cancel-fit';
import { readFitProgress } from '@/lib/services/read-fit-progress';
import { requestFit } from '@/lib/services/request-fit';
import type { Viewer } from '@/lib/services/viewer';
import { getPrisma } from '@/lib/store/client';
import { sweepFits } from '@/lib/store/fit-work';
import { readDoneFit, readDraws } from '@/lib/store/fits';
import { describeOnDatabases } from './database';
import { createFakeRun, type FakeOptions, sampleResult } from './fake-run';
import { makeViewer } from './people';
import { SAMPLE_SERIES, uploadMarket } from './sample-market';

/** A kill shows only after the silence, the next sweep and the next look into the queue; the rest is a slow machine. */
const PICKED_UP_WITHIN_MS = (SILENT_SECONDS + 20) * 1000;

const WORKER = 'lib/jobs/worker.ts';
const SLOW_WORKER = 'test/integration/slow-worker.ts';

getLogger().level = 'silent';

describeOnDatabases('jobs', (readUrl) => {
  let viewer: Viewer;
  let marketId: string;
  let fitId: string;
  const workers: Worker[] = [];
  const processes: ChildProcess[] = [];

  beforeEach(async () => {
    await getPrisma().issuedForecast.deleteMany();
    await getPrisma().workspace.deleteMany();
    viewer = await makeViewer();
    ({ marketId, fitId } = await uploadMarket(viewer));
  });
  afterEach(async () => {
    await Promise.all(workers.splice(0).map((worker) => worker.stop()));
    await Promise.all(processes.splice(0).map(end));
  });
  afterAll(closeSender);

  const job = () => ({ fitId, workspaceId: viewer.workspaceId });
  const run = (options: FakeOptions, stop = new AbortController().signal) =>
    runFitJob(job(), tools(options, stop));
  const readRow = () => getPrisma().fit.findUniqueOrThrow({ where: { id: fitId } });

  async function startWorker(options: FakeOptions): Promise<void> {
    workers.push(await startAppWorker({ createRun: createFakeRun(options), analyses: {} }));
  }

  /** A worker as a process of its own, ready to work. */
  async function startProcess(
    program: string,
    variables: Record<string, string> = {},
  ): Promise<ChildProcess> {
    const env = { ...process.env, ...variables, DATABASE_URL: readUrl(), LOG_LEVEL: 'info' };
    const args = ['--conditions=react-server', '--import', 'tsx', program];
    const child = spawn(process.execPath, args, { env, stdio: ['ignore', 'inherit', 'pipe'] });
    processes.push(child);
    let log = '';
    child.stderr?.on('data', (chunk) => {
      log += chunk;
    });
    await waitUntil(() => {
      if (child.exitCode !== null) throw new Error(`worker process ended: ${log}`);
      return log.includes('worker ready');
    });
    return child;
  }

  async function waitForState(state: string, milliseconds = 20_000): Promise<void> {
    await waitUntil(async () => (await readRow()).state === state, milliseconds);
  }

  it('a fit ends with the report and draws of its run, and its progress was stored on the way', async () => {
    const seen: unknown[] = [];
    const watch = async () => seen.push((await readRow()).progress);
    expect(
      await run({ slices: 20, sliceMilliseconds: 40, onSlice: (slice) => slice === 15 && void watch() }),
    ).toBe('done');
    const { report, draws } = sampleResult();
    const scope = { workspaceId: viewer.workspaceId, fitId };
    expect((await readDoneFit(scope))?.report).toEqual(report);
    expect(Array.from((await readDraws(scope))?.values ?? [])).toEqual(Array.from(draws.values));
    expect(seen).toMatchObject([{ stage: 'sampling', drawsTarget: 20 }]);
    expect(await readRow()).toMatchObject({ state: 'done', attempts: 1 });
  });

  it('more draws than the store keeps are thinned to that many', async () => {
    const { report, draws } = sampleResult();
    const copies = Math.ceil((STORED_DRAWS + 1) / draws.count);
    const values = Array.from({ length: copies }, () => Array.from(draws.values)).flat();
    const many = { ...draws, count: draws.count * copies, values };
    expect(await run({ slices: 1, end: () => ({ done: true, report, draws: many }) })).toBe('done');
    expect((await readDraws({ workspaceId: viewer.workspaceId, fitId }))?.count).toBe(STORED_DRAWS);
  });

  it('of two workers at one job one runs it', async () => {
    let runs = 0;
    const onSlice = (slice: number) => {
      if (slice === 1) runs += 1;
    };
    const options = { slices: 3, onSlice };
    expect((await Promise.all([run(options), run(options)])).sort()).toEqual(['done', 'not-mine']);
    expect(runs).toBe(1);
    expect((await readRow()).attempts).toBe(1);
  });

  it('two workers at one queue run every fit once', async () => {
    const others = await Promise.all([2, 3, 4, 5].map(() => uploadMarket(viewer)));
    const fitIds = [fitId, ...others.map((market) => market.fitId)];
    await Promise.all([1, 2].map(() => startWorker({ slices: 2, sliceMilliseconds: 20 })));
    const readRows = () => getPrisma().fit.findMany({ where: { id: { in: fitIds } } });
    await waitUntil(async () => (await readRows()).every((row) => row.state === 'done'));
    expect((await readRows()).map((row) => row.attempts)).toEqual(fitIds.map(() => 1));
  });

  it('a job of another workspace, of no fit and of an ended fit does nothing', async () => {
    const signal = new AbortController().signal;
    const other = await makeViewer();
    const foreign = { fitId, workspaceId: other.workspaceId };
    expect(await runFitJob(foreign, tools({ slices: 1 }, signal))).toBe('not-mine');
    expect(await runFitJob({ ...job(), fitId: 'none' }, tools({ slices: 1 }, signal))).toBe('not-mine');
    expect((await readRow()).state).toBe('queued');
    await run({ slices: 1 });
    const before = await readRow();
    expect(await run({ slices: 1 })).toBe('not-mine');
    expect(await readRow()).toEqual(before);
  });

  it('a waiting fit is cancelled at once and never runs', async () => {
    expect(await cancelFit(viewer, marketId)).toMatchObject({ ok: true });
    expect((await readRow()).state).toBe('cancelled');
    expect(await run({ slices: 1 })).toBe('not-mine');
  });

  it('a running fit is cancelled between slices and keeps no result', async () => {
    const onSlice = (slice: number) => slice === 2 && void cancelFit(viewer, marketId);
    expect(await run({ slices: 200, sliceMilliseconds: 20, onSlice })).toBe('cancelled');
    expect(await readRow()).toMatchObject({ state: 'cancelled', result: null, draws: null });
    expect(await cancelFit(viewer, marketId)).toEqual({ ok: false, code: 'nothing-running' });
  });

  it('a cancel that no report has seen yet wins over the result', async () => {
    await getPrisma().fit.update({ where: { id: fitId }, data: { cancelAsked: true } });
    expect(await run({ slices: 0 })).toBe('cancelled');
    expect(await readRow()).toMatchObject({ state: 'cancelled', result: null });
  });

  it('a worker that is told to stop puts its fit back, and another one ends it', async () => {
    const stopping = new AbortController();
    const onSlice = (slice: number) => slice === 3 && stopping.abort();
    expect(await run({ slices: 50, onSlice }, stopping.signal)).toBe('put-back');
    expect(await readRow()).toMatchObject({ state: 'queued', heartbeatAt: null });
    expect(await run({ slices: 1 })).toBe('done');
  });

  it('a worker that was given up for dead can no longer write, even while the next one still works', async () => {
    let next: Promise<unknown> = Promise.resolve();
    const onSlice = (slice: number) => {
      if (slice !== 2) return;
      const takeBack = sweepFits({ silentSeconds: -1, maxAttempts: MAX_ATTEMPTS });
      next = takeBack.then(() => run({ slices: 300, sliceMilliseconds: 5 }));
    };
    expect(await run({ slices: 150, sliceMilliseconds: 5, onSlice })).toBe('not-mine');
    expect(await readRow()).toMatchObject({ state: 'running', attempts: 2, result: null });
    expect(await next).toBe('done');
  });

  it.each([
    [
      'throws',
      () => {
        throw new Error('singular');
      },
    ],
    [
      'gives a result that is no result',
      (): OutlookStep => {
        const { report, draws } = sampleResult();
        return { done: true, report: { ...report, months: Number.NaN }, draws };
      },
    ],
  ])('an engine that %s fails the fit with a code, once', async (_name, end) => {
    expect(await run({ slices: 1, end })).toBe('failed');
    expect(await readRow()).toMatchObject({
      state: 'failed',
      failureCode: 'engine-error',
      attempts: 1,
      result: null,
    });
  });

  it('a status without a result is the code of the failure', async () => {
    const diagnostics = sampleResult().report.diagnostics;
    expect(await run({ slices: 1, end: () => ({ done: true, failure: 'too-short', diagnostics }) })).toBe(
      'failed',
    );
    expect(await readFitProgress(viewer, fitId)).toMatchObject({
      ok: true,
      value: { state: 'failed', failureCode: 'too-short' },
    });
  });

  it('a fit that takes down every worker fails in the end', async () => {
    for (let attempt = 1; attempt <= MAX_ATTEMPTS; attempt++) {
      const asLost = { heartbeatAt: new Date(0), state: 'running', attempts: attempt } as const;
      await getPrisma().fit.update({ where: { id: fitId }, data: asLost });
      const back = await sweepFits({ silentSeconds: SILENT_SECONDS, maxAttempts: MAX_ATTEMPTS });
      expect(back).toEqual(attempt < MAX_ATTEMPTS ? [job()] : []);
    }
    expect(await readRow()).toMatchObject({ state: 'failed', failureCode: 'gave-up' });
  });

  it('a fit that lost its job is found by the sweep', async () => {
    const boss = await openQueue('sender');
    await boss.purgeQueue(FIT_QUEUE);
    await boss.stop({ graceful: false });
    await startWorker({ slices: 1 });
    await waitForState('done');
  });

  it('a fit that is sent twice waits once', async () => {
    const boss = await openQueue('sender');
    const before = await boss.getQueueSize(FIT_QUEUE);
    await enqueueFit(job());
    await enqueueFit(job());
    expect(await boss.getQueueSize(FIT_QUEUE)).toBe(before);
    await boss.stop({ graceful: false });
  });

  it('a job with a payload that is no fit is dropped, and the next one runs', async () => {
    const boss = await openQueue('sender');
    await boss.send(FIT_QUEUE, { fitId: 7 }, { priority: 1 });
    await boss.stop({ graceful: false });
    await startWorker({ slices: 1 });
    await waitForState('done');
  });

  it('asking again while a fit is on its way gives that fit', async () => {
    expect(await requestFit(viewer, marketId)).toEqual({ ok: true, value: { fitId } });
    await run({ slices: 1 });
    const again = await requestFit(viewer, marketId);
    expect(again.ok && again.value.fitId).not.toBe(fitId);
  });

  it("the app's own worker process fits a market with the engine", async () => {
    await startProcess(WORKER);
    await waitForState('done', 60_000);
    const done = await readDoneFit({ workspaceId: viewer.workspaceId, fitId });
    expect(done?.report).toMatchObject({ engineVersion: ENGINE_VERSION, months: SAMPLE_SERIES.focal.length });
    const draws = await readDraws({ workspaceId: viewer.workspaceId, fitId });
    expect(draws?.count).toBe(STORED_DRAWS);
    expect(draws?.values.every(Number.isFinite)).toBe(true);
  });

  it('a fit whose worker process is killed is picked up again and ends once', async () => {
    const child = await startProcess(SLOW_WORKER, { FAKE_SLICES: '10000' });
    await waitUntil(async () => (await readRow()).progress !== null);
    child.kill('SIGKILL');
    await once(child, 'exit');
    expect(await readRow()).toMatchObject({ state: 'running', attempts: 1 });
    let ends = 0;
    await startWorker({
      slices: 3,
      end: () => {
        ends += 1;
        return { done: true, ...sampleResult() };
      },
    });
    await waitForState('done', PICKED_UP_WITHIN_MS);
    const ended = await readRow();
    expect(ended.attempts).toBe(2);
    await setTimeout(6000);
    expect(await readRow()).toEqual(ended);
    expect(ends).toBe(1);
  });

  it('a worker process that is told to end puts its fit back and ends well', async () => {
    const child = await startProcess(SLOW_WORKER, { FAKE_SLICES: '10000' });
    await waitUntil(async () => (await readRow()).progress !== null);
    child.kill('SIGTERM');
    const [code] = await once(child, 'exit');
    expect(code).toBe(0);
    expect((await readRow()).state).toBe('queued');
  });
});

function tools(options: FakeOptions, stop: AbortSignal): FitJobTools {
  return { createRun: createFakeRun(options), stop, log: getLogger() };
}

async function waitUntil(isSo: () => boolean | Promise<boolean>, milliseconds = 30_000): Promise<void> {
  const deadline = performance.now() + milliseconds;
  while (!(await isSo())) {
    if (performance.now() > deadline) throw new Error(`not so within ${milliseconds} ms: ${isSo}`);
    await setTimeout(50);
  }
}

async function end(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  child.kill('SIGKILL');
  await once(child, 'exit');
}
