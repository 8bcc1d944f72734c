/** The demo markets in a real database: stored once, left alone afterwards, fitted like any other market. */
import { expect, it } from 'vitest';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import { runFitJob } from '@/lib/jobs/fit-job';
import { getLogger } from '@/lib/jobs/log';
import { getPrisma } from '@/lib/store/client';
import { readDoneFit } from '@/lib/store/fits';
import { archiveMarket, editMarket } from '@/lib/store/markets';
import { DEMO_MARKETS } from '@/seed/demo-markets';
import { seedDemo } from '@/seed/seed';
import { describeOnDatabases } from './database';

getLogger().level = 'silent';

/** Everything that the seed writes, row by row. */
async function readRows() {
  const prisma = getPrisma();
  return {
    workspaces: await prisma.workspace.findMany(),
    markets: await prisma.market.findMany({ orderBy: { id: 'asc' } }),
    revisions: await prisma.seriesRevision.findMany({ orderBy: { id: 'asc' } }),
    observations: await prisma.observation.findMany({ orderBy: [{ revisionId: 'asc' }, { month: 'asc' }] }),
    fits: await prisma.fit.findMany({ orderBy: { id: 'asc' } }),
  };
}

describeOnDatabases('demo markets', () => {
  it('are stored with fixed ids, and seeding again changes no row', async () => {
    const { created } = await seedDemo();
    expect(created).toEqual(DEMO_MARKETS.map(({ id }) => id));
    const rows = await readRows();
    expect(rows.markets.every(({ isDemo }) => isDemo)).toBe(true);
    expect(rows.fits.map(({ id, state }) => [id, state])).toEqual(
      DEMO_MARKETS.map(({ fitId }) => [fitId, 'queued']).sort(),
    );

    expect((await seedDemo()).created).toEqual([]);
    expect(await readRows()).toEqual(rows);
  });

  it('stay as somebody left them', async () => {
    const { workspaceId } = await seedDemo();
    const [first, second] = DEMO_MARKETS;
    await editMarket({ workspaceId, marketId: first.id, changes: { name: 'Renamed' } });
    await archiveMarket({ workspaceId, marketId: second.id });
    const rows = await readRows();
    expect((await seedDemo()).created).toEqual([]);
    expect(await readRows()).toEqual(rows);
  });

  it('are fitted by the worker’s own job, with the verdict each was made for', async () => {
    const { workspaceId } = await seedDemo();
    const decided = [];
    for (const { id, fitId } of DEMO_MARKETS) {
      const tools = { createRun: createOutlookRun, stop: new AbortController().signal, log: getLogger() };
      expect(await runFitJob({ fitId, workspaceId }, tools)).toBe('done');
      const fit = await readDoneFit({ workspaceId, fitId });
      decided.push([id, fit?.report.outlook.decided]);
    }
    expect(decided).toEqual([
      ['demo-ferry-passes', 'coexistence'],
      ['demo-cargo-bikes', 'exclusionByRival'],
      ['demo-parcel-lockers', 'headStartDecides'],
      ['demo-night-buses', null],
    ]);
  });
});
