/** Analyses that follow a fit: asked for by themselves, made once, kept for the revision, behind every fit. */
import { setTimeout } from 'node:timers/promises';
import { afterAll, afterEach, beforeEach, expect, it } from 'vitest';
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import { requestAnalysesAfter, runAnalysisJob } from '@/lib/jobs/analysis-job';
import { runFitJob } from '@/lib/jobs/fit-job';
import { getLogger } from '@/lib/jobs/log';
import { closeSender } from '@/lib/jobs/sender';
import { startWorker, type Worker } from '@/lib/jobs/start-worker';
import { addRevision } from '@/lib/services/add-revision';
import { cancelAnalysis } from '@/lib/services/cancel-analysis';
import { issueForecast } from '@/lib/services/issue-forecast';
import { readAnalysis } from '@/lib/services/read-analysis';
import { readIssued } from '@/lib/services/read-issued';
import { readMarket } from '@/lib/services/read-market';
import { requestAnalysis } from '@/lib/services/request-analysis';
import { requestFit } from '@/lib/services/request-fit';
import type { Viewer } from '@/lib/services/viewer';
import { analysisWork } from '@/lib/store/analysis-work';
import { getPrisma } from '@/lib/store/client';
import { editMarket } from '@/lib/store/markets';
import { describeOnDatabases } from './database';
import { FAKE_BACKTEST, type FakeAnalysisOptions, fakeAnalyses } from './fake-analysis';
import { createFakeRun } from './fake-run';
import { asMember, makeViewer } from './people';
import { revisionForm, SAMPLE_SERIES, uploadMarket } from './sample-market';

type FakeEnd = ReturnType<NonNullable<FakeAnalysisOptions['end']>>;

getLogger().level = 'silent';

describeOnDatabases('analyses', () => {
  let viewer: Viewer;
  let marketId: string;
  let fitId: string;
  const workers: Worker[] = [];
  const never = new AbortController().signal;

  beforeEach(async () => {
    await getPrisma().issuedForecast.deleteMany();
    await getPrisma().workspace.deleteMany();
    viewer = await makeViewer();
    ({ marketId, fitId } = await uploadMarket(viewer));
  });
  afterEach(async () => {
    await Promise.all(workers.splice(0).map((worker) => worker.stop()));
  });
  afterAll(closeSender);

  const runFit = (id = fitId) =>
    runFitJob(
      { fitId: id, workspaceId: viewer.workspaceId },
      { createRun: createFakeRun({ slices: 1 }), stop: never, log: getLogger() },
    );
  const readRows = () => getPrisma().analysis.findMany({ orderBy: { createdAt: 'asc' } });
  const standing = async () => {
    const outcome = await readAnalysis(viewer, marketId, 'backtest');
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value;
  };

  /** Fits the market and asks for its analyses, as a worker does. */
  async function fitAndAsk(id = fitId) {
    expect(await runFit(id)).toBe('done');
    const runs = fakeAnalyses({ slices: 1 });
    return requestAnalysesAfter({ fitId: id, workspaceId: viewer.workspaceId }, runs);
  }

  const run = async (options: FakeAnalysisOptions, stop = never, mustWait?: () => boolean) => {
    const [row] = await readRows();
    const item = { id: row!.id, workspaceId: viewer.workspaceId };
    return runAnalysisJob(item, { runs: fakeAnalyses(options), stop, log: getLogger(), mustWait });
  };

  async function work(fitSlices: number, options: FakeAnalysisOptions): Promise<void> {
    const createRun = createFakeRun({ slices: fitSlices, sliceMilliseconds: 10 });
    workers.push(await startWorker({ createRun, analyses: fakeAnalyses(options) }));
  }

  it('follow a fit by themselves, and their result comes with the market and its issued forecast', async () => {
    await work(2, { slices: 3 });
    await waitUntil(async () => (await readRows())[0]?.state === 'done');
    const page = await readMarket(viewer, marketId);
    expect(page).toMatchObject({
      ok: true,
      value: { analyses: { backtest: { state: 'done' } }, facts: { backtest: FAKE_BACKTEST } },
    });
    const issued = await issueForecast(viewer, marketId, { scenarios: [], mayReadersTry: false });
    if (!issued.ok) throw new Error(issued.code);
    const read = await readIssued(viewer, issued.value.issuedId);
    expect(read).toMatchObject({ ok: true, value: { content: { backtest: FAKE_BACKTEST } } });
  });

  it('report how far they are on the way', async () => {
    await fitAndAsk();
    const seen: unknown[] = [];
    const onSlice = (slice: number) => slice === 12 && void standing().then((view) => seen.push(view));
    expect(await run({ slices: 16, sliceMilliseconds: 40, onSlice })).toBe('done');
    expect(seen).toMatchObject([{ state: 'running', progress: { total: 16 }, result: null }]);
    expect(await standing()).toMatchObject({ state: 'done', result: FAKE_BACKTEST });
  });

  it('are kept for the revision: another fit of the same counts asks for nothing, another measurement error does', async () => {
    await fitAndAsk();
    await run({ slices: 1 });
    const [first] = await readRows();
    const again = await requestFit(viewer, marketId);
    expect(await fitAndAsk(again.ok ? again.value.fitId : '')).toEqual([]);
    expect(await readRows()).toEqual([first]);

    await editMarket({ workspaceId: viewer.workspaceId, marketId, changes: { rivalError: 0.2 } });
    const other = await requestFit(viewer, marketId);
    expect(await fitAndAsk(other.ok ? other.value.fitId : '')).toHaveLength(1);
    expect(await readRows()).toMatchObject([{ id: first!.id, state: 'queued', progress: null }]);
    expect(await standing()).toMatchObject({ state: 'queued', result: null });
  });

  it('of an older revision are cancelled by new counts', async () => {
    await fitAndAsk();
    const focal = SAMPLE_SERIES.focal.map((count) => count && count + 1);
    const added = await addRevision(viewer, marketId, revisionForm({ ...SAMPLE_SERIES, focal }));
    expect(added).toMatchObject({ ok: true });
    expect(await readRows()).toMatchObject([{ state: 'cancelled' }]);
  });

  it('are cancelled while they wait or run, and start again when asked for', async () => {
    await fitAndAsk();
    expect(await cancelAnalysis(viewer, marketId, 'backtest')).toMatchObject({ ok: true });
    expect(await standing()).toMatchObject({ state: 'cancelled' });
    expect(await run({ slices: 1 })).toBe('not-mine');
    expect(await cancelAnalysis(viewer, marketId, 'backtest')).toEqual({
      ok: false,
      code: 'nothing-running',
    });

    expect(await requestAnalysis(viewer, marketId, 'backtest')).toMatchObject({ ok: true });
    const onSlice = (slice: number) => slice === 2 && void cancelAnalysis(viewer, marketId, 'backtest');
    expect(await run({ slices: 200, sliceMilliseconds: 20, onSlice })).toBe('cancelled');
    expect(await readRows()).toMatchObject([{ state: 'cancelled', result: null }]);
  });

  it('are put back by a worker that stops, and taken back from one that died', async () => {
    await fitAndAsk();
    const stopping = new AbortController();
    const onSlice = (slice: number) => slice === 3 && stopping.abort();
    expect(await run({ slices: 50, onSlice }, stopping.signal)).toBe('put-back');
    expect(await readRows()).toMatchObject([{ state: 'queued', attempts: 0 }]);
    let next: Promise<unknown> = Promise.resolve();
    const takeBack = (slice: number) => {
      if (slice !== 2) return;
      next = analysisWork
        .sweep({ silentSeconds: -1, maxAttempts: 4 })
        .then(() => run({ slices: 200, sliceMilliseconds: 5 }));
    };
    expect(await run({ slices: 120, sliceMilliseconds: 5, onSlice: takeBack })).toBe('not-mine');
    expect(await next).toBe('done');
    expect(await readRows()).toMatchObject([{ state: 'done', attempts: 2 }]);
  });

  it('leave the processor to a fit and keep their claim meanwhile', async () => {
    await fitAndAsk();
    let isFitting = true;
    let slices = 0;
    const running = run({ slices: 3, onSlice: () => void slices++ }, never, () => isFitting);
    await setTimeout(700);
    expect(slices).toBe(0);
    const [row] = await readRows();
    expect(row).toMatchObject({ state: 'running' });
    expect(Date.now() - row!.heartbeatAt!.getTime()).toBeLessThan(600);
    isFitting = false;
    expect(await running).toBe('done');
  });

  it('let a fit that comes later pass in the same worker, and go on from where they were', async () => {
    await fitAndAsk();
    let slices = 0;
    const onSlice = () => {
      slices += 1;
    };
    await work(20, { slices: 2000, sliceMilliseconds: 10, onSlice });
    await waitUntil(async () => (await readRows())[0]?.state === 'running');
    const later = await uploadMarket(viewer);
    const readFit = () => getPrisma().fit.findUniqueOrThrow({ where: { id: later.fitId } });
    await waitUntil(async () => (await readFit()).state === 'done');
    const before = slices;
    await waitUntil(async () => slices > before);
    expect(await readRows()).toMatchObject([{ state: 'running', attempts: 1 }, { state: 'queued' }]);
  });

  it('that a dead worker never asked for are asked for by the sweep', async () => {
    expect(await runFit()).toBe('done');
    expect((await standing()).state).toBe('absent');
    // The stand-in report is of this version of the engine, as the fit is.
    expect(await getPrisma().fit.count({ where: { engineVersion: ENGINE_VERSION } })).toBe(1);
    await work(1, { slices: 1 });
    await waitUntil(async () => (await readRows())[0]?.state === 'done');
  });

  it.each([
    ['its code', (): FakeEnd => ({ done: true, failure: 'too-few-origins' }), 'too-few-origins'],
    [
      'a fault of the engine',
      () => {
        throw new Error('singular');
      },
      'engine-error',
    ],
    [
      'a fault, where the result is no result',
      (): FakeEnd => ({ done: true, result: { ...FAKE_BACKTEST, horizons: [] } }),
      'engine-error',
    ],
  ])('end as failed with %s', async (_name, end, failureCode) => {
    await fitAndAsk();
    expect(await run({ slices: 1, end })).toBe('failed');
    expect(await standing()).toMatchObject({ state: 'failed', failureCode, result: null });
  });

  it('are nothing to a reader to start or cancel, nor to another workspace', async () => {
    await fitAndAsk();
    const reader = asMember(viewer, 'reader');
    expect(await requestAnalysis(reader, marketId, 'backtest')).toEqual({ ok: false, code: 'not-allowed' });
    expect(await cancelAnalysis(reader, marketId, 'backtest')).toEqual({ ok: false, code: 'not-allowed' });
    expect(await readAnalysis(reader, marketId, 'backtest')).toMatchObject({ ok: true });
    const stranger = await makeViewer();
    expect(await readAnalysis(stranger, marketId, 'backtest')).toEqual({ ok: false, code: 'no-result' });
    expect(await requestAnalysis(stranger, marketId, 'backtest')).toEqual({ ok: false, code: 'no-result' });
    expect(await cancelAnalysis(stranger, marketId, 'backtest')).toEqual({
      ok: false,
      code: 'nothing-running',
    });
    expect(await readRows()).toMatchObject([{ state: 'queued', cancelAsked: false }]);
  });
});

async function waitUntil(isSo: () => Promise<boolean>, milliseconds = 30_000): Promise<void> {
  const deadline = performance.now() + milliseconds;
  while (!(await isSo())) {
    if (performance.now() > deadline) throw new Error(`not so within ${milliseconds} ms: ${isSo}`);
    await setTimeout(50);
  }
}
