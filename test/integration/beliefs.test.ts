/** What a market says besides its counts: events that may change the firms, the addressable market, priors. */
import { afterAll, beforeEach, expect, it } from 'vitest';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import { runFitJob } from '@/lib/jobs/fit-job';
import { getLogger } from '@/lib/jobs/log';
import { closeSender } from '@/lib/jobs/sender';
import { addEvent } from '@/lib/services/add-event';
import { changePriors } from '@/lib/services/change-priors';
import { editMarket } from '@/lib/services/edit-market';
import { listMarkets } from '@/lib/services/list-markets';
import { readMarket } from '@/lib/services/read-market';
import { removeEvent } from '@/lib/services/remove-event';
import { requestFit } from '@/lib/services/request-fit';
import type { Viewer } from '@/lib/services/viewer';
import { getPrisma } from '@/lib/store/client';
import { readFitOptions } from '@/lib/store/fits';
import { readMarket as readStored } from '@/lib/store/markets';
import { describeOnDatabases } from './database';
import { createFakeRun } from './fake-run';
import { makeViewer } from './people';
import { SAMPLE_SERIES, uploadMarket } from './sample-market';

getLogger().level = 'silent';

const MONTH = SAMPLE_SERIES.firstMonth + 7;
const PRIORS = { ...USUAL_PRIORS, noCompetition: 0.5 };

describeOnDatabases('what a market says besides its counts', () => {
  let viewer: Viewer;
  let marketId: string;
  let fitId: string;

  beforeEach(async () => {
    await getPrisma().issuedForecast.deleteMany();
    await getPrisma().workspace.deleteMany();
    viewer = await makeViewer('analyst');
    ({ marketId, fitId } = await uploadMarket(viewer));
  });
  afterAll(closeSender);

  async function endFit(id: string): Promise<void> {
    const tools = {
      stop: new AbortController().signal,
      log: getLogger(),
      createRun: createFakeRun({ slices: 1 }),
    };
    expect(await runFitJob({ fitId: id, workspaceId: viewer.workspaceId }, tools)).toBe('done');
  }
  const staleReasons = async () => {
    const page = await readMarket(viewer, marketId);
    return page.ok ? page.value.outlook?.staleReasons : null;
  };
  const optionsOf = (id: string) => readFitOptions({ workspaceId: viewer.workspaceId, fitId: id });
  async function fitAnew(): Promise<string> {
    const asked = await requestFit(viewer, marketId);
    if (!asked.ok) throw new Error(asked.code);
    return asked.value.fitId;
  }

  it('an event from which the firms may differ makes the outlook stale, and reaches the next fit', async () => {
    await endFit(fitId);
    const note = { month: MONTH, note: 'New prices', changesParameters: false };
    const plain = await addEvent(viewer, marketId, note);
    expect(await staleReasons()).toEqual([]);
    const marked = await addEvent(viewer, marketId, { ...note, changesParameters: true });
    expect(await staleReasons()).toEqual(['events-changed']);
    const [row] = await listMarkets(viewer);
    expect(row.fit?.isStale).toBe(true);

    const next = await fitAnew();
    expect((await optionsOf(next))?.changeMonths).toEqual([MONTH]);
    await endFit(next);
    expect(await staleReasons()).toEqual([]);
    if (!plain.ok || !marked.ok) throw new Error('not added');
    await removeEvent(viewer, marketId, plain.value.eventId);
    expect(await staleReasons()).toEqual([]);
    await removeEvent(viewer, marketId, marked.value.eventId);
    expect(await staleReasons()).toEqual(['events-changed']);
    expect((await optionsOf(await fitAnew()))?.changeMonths).toBeUndefined();
  });

  it('an estimate of the addressable market does likewise, and can be taken back', async () => {
    await endFit(fitId);
    await editMarket(viewer, marketId, { focalAddressable: 4e5, addressableError: 0.3 });
    expect(await staleReasons()).toEqual(['addressable-changed']);
    const next = await fitAnew();
    expect((await optionsOf(next))?.addressable).toEqual({ focal: 4e5, rival: null, relativeError: 0.3 });
    await editMarket(viewer, marketId, { focalAddressable: null });
    await endFit(next);
    expect(await staleReasons()).toEqual(['addressable-changed']);
    const refused = await editMarket(viewer, marketId, { focalAddressable: -5 });
    expect(refused).toMatchObject({ ok: false, code: 'invalid-input' });
  });

  it('priors are stored, fitted with at once, and go back to the usual ones', async () => {
    await endFit(fitId);
    const changed = await changePriors(viewer, marketId, { priors: PRIORS });
    if (!changed.ok) throw new Error(changed.code);
    const scope = { workspaceId: viewer.workspaceId, marketId };
    expect((await readStored(scope))?.priors).toEqual(PRIORS);
    expect((await optionsOf(changed.value.fitId))?.priors).toEqual(PRIORS);
    expect(await staleReasons()).toEqual(['priors-changed']);
    await endFit(changed.value.fitId);
    expect(await staleReasons()).toEqual([]);

    const usual = await changePriors(viewer, marketId, { priors: null });
    if (!usual.ok) throw new Error(usual.code);
    expect((await readStored(scope))?.priors).toBeNull();
    expect((await optionsOf(usual.value.fitId))?.priors).toBeUndefined();
  });

  it('priors out of their ranges and readers who would change them are refused', async () => {
    const silly = { ...PRIORS, growth: { meanLog: 12, sdLog: 0.5 } };
    expect(await changePriors(viewer, marketId, { priors: silly })).toMatchObject({ code: 'invalid-input' });
    const reader = { ...viewer, role: 'reader' as const };
    expect(await changePriors(reader, marketId, { priors: PRIORS })).toMatchObject({ code: 'not-allowed' });
    const stranger = await makeViewer('owner');
    expect(await changePriors(stranger, marketId, { priors: PRIORS })).toMatchObject({ code: 'not-found' });
    expect((await readStored({ workspaceId: viewer.workspaceId, marketId }))?.priors).toBeNull();
  });

  it('a fit on its way with other options is not taken for the one that is asked for', async () => {
    const same = await fitAnew();
    expect(same).toBe(fitId);
    await editMarket(viewer, marketId, { rivalError: 0.25 });
    expect(await fitAnew()).not.toBe(fitId);
  });
});
