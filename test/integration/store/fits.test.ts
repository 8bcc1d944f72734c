/** Fits from queue to end: of several writers one wins, and a worker that was given up can no longer write. */
import { setTimeout as wait } from 'node:timers/promises';
import { beforeEach, expect, it } from 'vitest';
import { GAVE_UP } from '@/lib/store/claimed-work';
import { getPrisma } from '@/lib/store/client';
import * as work from '@/lib/store/fit-work';
import * as fits from '@/lib/store/fits';
import { StoreError } from '@/lib/store/store-error';
import { describeOnDatabases } from '../database';
import {
  HOUR,
  makeWorkspace,
  NEW_FIT,
  OPTIONS,
  PROGRESS,
  RESULT,
  SAMPLE,
  storeDoneMarket,
  storeMarket,
} from './fixtures';

describeOnDatabases('the store of fits', () => {
  let workspaceId: string;
  beforeEach(async () => {
    workspaceId = await makeWorkspace();
  });

  it('go from queued over running to done, and give back report and draws to the last bit', async () => {
    const { marketId, revisionId, fitId } = await storeMarket(workspaceId);
    expect(await fits.latestDoneFit({ workspaceId, marketId })).toBeNull();
    const claim = await work.claimFit({ fitId, workspaceId });
    expect(claim).toMatchObject({ fitId, marketId, revisionId, attempt: 1, options: OPTIONS });
    expect(await work.saveProgress(claim!, PROGRESS)).toBe('go-on');
    expect(await fits.readFit({ workspaceId, fitId })).toMatchObject({
      state: 'running',
      progress: PROGRESS,
    });

    const { report } = SAMPLE.facts;
    const draws = { ...SAMPLE.draws, values: Float64Array.from(SAMPLE.draws.values) };
    draws.values.set([Number.MIN_VALUE, -0, Number.MAX_VALUE, Math.PI]);
    expect(await work.finishFit(claim!, { report, draws })).toBe(true);
    const done = await fits.latestDoneFit({ workspaceId, marketId });
    expect(done).toMatchObject({ id: fitId, state: 'done', options: OPTIONS, failureCode: null });
    expect(done!.report).toEqual(report);
    const stored = await fits.readDraws({ workspaceId, fitId });
    expect(stored).toMatchObject({ columns: draws.columns, count: draws.count, errorModel: 'ar1' });
    expect(
      Buffer.from((stored!.values as Float64Array).buffer).equals(Buffer.from(draws.values.buffer)),
    ).toBe(true);
  });

  it('are claimed by one of many workers', async () => {
    const { fitId } = await storeMarket(workspaceId);
    const claims = await Promise.all(Array.from({ length: 8 }, () => work.claimFit({ fitId, workspaceId })));
    expect(claims.filter(Boolean)).toHaveLength(1);
  });

  it('end once: after done, no other end is taken', async () => {
    const { fitId } = await storeMarket(workspaceId);
    const claim = (await work.claimFit({ fitId, workspaceId }))!;
    const ends = await Promise.all([work.finishFit(claim, RESULT), work.finishFit(claim, RESULT)]);
    expect(ends.filter(Boolean)).toHaveLength(1);
    expect(await work.failFit(claim, 'failed')).toBe(false);
    expect(await work.endCancelledFit(claim)).toBe(false);
    expect(await work.beatHeart(claim)).toBe('lost');
    expect(await fits.askCancel({ workspaceId, fitId })).toBe('ended');
  });

  it('tell why they failed', async () => {
    const { marketId, fitId } = await storeMarket(workspaceId);
    const claim = (await work.claimFit({ fitId, workspaceId }))!;
    expect(await work.failFit(claim, 'too-short')).toBe(true);
    expect(await fits.latestFit({ workspaceId, marketId })).toMatchObject({
      state: 'failed',
      failureCode: 'too-short',
    });
    expect(await fits.readDoneFit({ workspaceId, fitId })).toBeNull();
    expect(await fits.readDraws({ workspaceId, fitId })).toBeNull();
  });

  it('are cancelled at once while queued, and by their worker while running', async () => {
    const queued = await storeMarket(workspaceId);
    expect(await fits.askCancel({ workspaceId, fitId: queued.fitId })).toBe('cancelled');
    expect(await work.claimFit({ fitId: queued.fitId, workspaceId })).toBeNull();

    const running = await storeMarket(workspaceId);
    const claim = (await work.claimFit({ fitId: running.fitId, workspaceId }))!;
    expect(await fits.askCancel({ workspaceId, fitId: running.fitId })).toBe('asked');
    expect(await work.beatHeart(claim)).toBe('cancel');
    expect(await work.finishFit(claim, RESULT)).toBe(false);
    expect(await work.endCancelledFit(claim)).toBe(true);
    expect(await fits.readFit({ workspaceId, fitId: running.fitId })).toMatchObject({ state: 'cancelled' });
  });

  it('of older data are cancelled when a newer one is asked for', async () => {
    const { marketId, revisionId, fitId } = await storeMarket(workspaceId);
    const made = await fits.createFit({ workspaceId, marketId, revisionId, fit: NEW_FIT });
    expect(await fits.readFit({ workspaceId, fitId })).toMatchObject({ state: 'cancelled' });
    expect(await fits.readFit({ workspaceId, fitId: made!.fitId })).toMatchObject({ state: 'queued' });
  });

  it('are given back by a worker that stops, without counting as an attempt', async () => {
    const { fitId } = await storeMarket(workspaceId);
    const first = (await work.claimFit({ fitId, workspaceId }))!;
    expect(await work.releaseFit(first)).toBe(true);
    expect(await work.claimFit({ fitId, workspaceId })).toMatchObject({ attempt: 1 });
  });

  it('whose worker falls silent go to another one, and the first can no longer write', async () => {
    const { fitId } = await storeMarket(workspaceId);
    const first = (await work.claimFit({ fitId, workspaceId }))!;
    expect(await work.sweepFits({ silentSeconds: 60, maxAttempts: 3 })).toEqual([]);
    await fallSilent(fitId);
    const [once, twice] = await Promise.all([
      work.sweepFits({ silentSeconds: 60, maxAttempts: 3 }),
      work.sweepFits({ silentSeconds: 60, maxAttempts: 3 }),
    ]);
    expect([...once, ...twice]).toEqual([{ fitId, workspaceId }]);
    const second = (await work.claimFit({ fitId, workspaceId }))!;
    expect(second.attempt).toBe(2);
    expect(await work.saveProgress(first, PROGRESS)).toBe('lost');
    expect(await work.finishFit(first, RESULT)).toBe(false);
    expect(await work.finishFit(second, RESULT)).toBe(true);
  });

  it('that silenced too many workers fail, and cancelled ones end as cancelled', async () => {
    const { fitId } = await storeMarket(workspaceId);
    await work.claimFit({ fitId, workspaceId });
    await fallSilent(fitId);
    expect(await work.sweepFits({ silentSeconds: 60, maxAttempts: 1 })).toEqual([]);
    expect(await fits.readFit({ workspaceId, fitId })).toMatchObject({
      state: 'failed',
      failureCode: GAVE_UP,
    });

    const cancelled = await storeMarket(workspaceId);
    await work.claimFit({ fitId: cancelled.fitId, workspaceId });
    await fits.askCancel({ workspaceId, fitId: cancelled.fitId });
    await fallSilent(cancelled.fitId);
    expect(await work.sweepFits({ silentSeconds: 60, maxAttempts: 3 })).toEqual([]);
    expect(await fits.readFit({ workspaceId, fitId: cancelled.fitId })).toMatchObject({
      state: 'cancelled',
    });
  });

  it('that wait are listed oldest first', async () => {
    const first = await storeMarket(workspaceId);
    await wait(2);
    const second = await storeMarket(workspaceId);
    const listed = await work.listQueuedFits({ limit: 1000 });
    const mine = listed.filter((job) => job.workspaceId === workspaceId).map((job) => job.fitId);
    expect(mine).toEqual([first.fitId, second.fitId]);
    expect(await work.listQueuedFits({ limit: 1 })).toHaveLength(1);
  });

  it('with a result that this version cannot read are an error that names the place, not the data', async () => {
    const { marketId, fitId } = await storeDoneMarket(workspaceId);
    const { engineVersion, ...rest } = SAMPLE.facts.report;
    await getPrisma().fit.update({ where: { id: fitId }, data: { result: rest } });
    expect(engineVersion).toBeDefined();
    const failure = await fits.latestDoneFit({ workspaceId, marketId }).catch((error: unknown) => error);
    expect(failure).toBeInstanceOf(StoreError);
    expect(failure).toMatchObject({
      code: 'inconsistent-row',
      message: expect.stringContaining('engineVersion'),
    });
  });

  async function fallSilent(fitId: string): Promise<void> {
    await getPrisma().fit.update({
      where: { id: fitId },
      data: { heartbeatAt: new Date(Date.now() - HOUR) },
    });
  }
});
