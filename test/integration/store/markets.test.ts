/** Markets with their revisions, events and scenarios: what goes in comes out, whole or not at all. */
import { beforeEach, describe, expect, it } from 'vitest';
import { getPrisma } from '@/lib/store/client';
import { addEvent, listEvents, removeEvent } from '@/lib/store/events';
import { createId } from '@/lib/store/ids';
import * as issued from '@/lib/store/issued-forecasts';
import * as markets from '@/lib/store/markets';
import * as revisions from '@/lib/store/revisions';
import * as scenarios from '@/lib/store/scenarios';
import { describeOnDatabases } from '../database';
import { MARKET, makeWorkspace, NEW_FIT, PUSH, REVISION, SERIES, storeIssued, storeMarket } from './fixtures';

describeOnDatabases('markets', () => {
  let workspaceId: string;
  beforeEach(async () => {
    workspaceId = await makeWorkspace();
  });

  describe('and revisions', () => {
    it('give back every count to the last bit, gaps and zeros included', async () => {
      const { marketId, revisionId } = await storeMarket(workspaceId);
      expect((await revisions.readRevision({ workspaceId, revisionId }))!.series).toEqual(SERIES);
      const latest = await revisions.latestRevision({ workspaceId, marketId });
      expect(latest).toMatchObject({ id: revisionId, number: 1, fileName: 'counts.csv', series: SERIES });
      expect(latest!.contentHash).toBe(revisions.hashContent({ series: SERIES, exclusions: [] }));
    });

    it('keep ids that were given', async () => {
      const ids = { marketId: createId(), revisionId: createId(), fitId: createId() };
      const made = await markets.createMarket({
        workspaceId,
        market: { ...MARKET, id: ids.marketId, isDemo: true },
        revision: { ...REVISION, id: ids.revisionId },
        fit: { ...NEW_FIT, id: ids.fitId },
      });
      expect(made).toEqual(ids);
    });

    it('are stored whole or not at all: a fit that cannot be stored takes the market with it', async () => {
      const { fitId } = await storeMarket(workspaceId);
      const twice = markets.createMarket({
        workspaceId,
        market: MARKET,
        revision: REVISION,
        fit: { ...NEW_FIT, id: fitId },
      });
      await expect(twice).rejects.toThrow();
      expect(await markets.listMarkets({ workspaceId })).toHaveLength(1);
    });

    it('number revisions 1, 2, 3, … also when two arrive at once', async () => {
      const { marketId } = await storeMarket(workspaceId);
      const add = () => revisions.addRevision({ workspaceId, marketId, revision: REVISION, fit: NEW_FIT });
      const made = await Promise.all([add(), add(), add()]);
      expect(made.map((end) => (end?.code === 'added' ? end.revisionNumber : 0)).sort()).toEqual([2, 3, 4]);
      expect((await revisions.listRevisions({ workspaceId, marketId })).map(({ number }) => number)).toEqual([
        4, 3, 2, 1,
      ]);
    });

    it('are listed with the newest revision and fit, own before demo, archived ones left out', async () => {
      const demo = await markets.createMarket({
        workspaceId,
        market: { ...MARKET, isDemo: true },
        revision: REVISION,
        fit: null,
      });
      const own = await storeMarket(workspaceId);
      const gone = await storeMarket(workspaceId);
      expect(await markets.archiveMarket({ workspaceId, marketId: gone.marketId })).toBe(true);
      expect(await markets.archiveMarket({ workspaceId, marketId: gone.marketId })).toBe(false);
      await revisions.addRevision({
        workspaceId,
        marketId: own.marketId,
        revision: { ...REVISION, series: { ...SERIES, firstMonth: 24_300 } },
        fit: NEW_FIT,
      });
      const list = await markets.listMarkets({ workspaceId });
      expect(list.map(({ id }) => id)).toEqual([own.marketId, demo.marketId]);
      expect(list[0]).toMatchObject({
        revision: { number: 2, lastMonth: 24_303, months: 4 },
        fit: { state: 'queued', revisionId: list[0]!.revision!.id },
      });
      expect(list[1]).toMatchObject({ isDemo: true, fit: null, revision: { number: 1 } });
    });

    it('leave the list when archived and come back to it when restored, once each', async () => {
      const { marketId } = await storeMarket(workspaceId);
      expect(await markets.restoreMarket({ workspaceId, marketId })).toBe(false);
      await markets.archiveMarket({ workspaceId, marketId });
      expect(await markets.listMarkets({ workspaceId })).toEqual([]);
      expect(await markets.listArchivedMarkets({ workspaceId })).toMatchObject([{ id: marketId }]);
      expect(await markets.restoreMarket({ workspaceId, marketId })).toBe(true);
      expect(await markets.listMarkets({ workspaceId })).toMatchObject([{ id: marketId }]);
      expect(await markets.listArchivedMarkets({ workspaceId })).toEqual([]);
    });

    it('change only what is named', async () => {
      const { marketId } = await storeMarket(workspaceId);
      expect(await markets.editMarket({ workspaceId, marketId, changes: { name: 'Day passes' } })).toBe(true);
      expect(await markets.readMarket({ workspaceId, marketId })).toMatchObject({
        ...MARKET,
        name: 'Day passes',
      });
    });

    it('delete a market with all that hangs on it, issued forecasts included', async () => {
      const { marketId, issuedId } = await storeIssued(workspaceId);
      await getPrisma().market.delete({ where: { id: marketId } });
      expect(await issued.readIssuedForecast({ workspaceId, issuedId })).toBeNull();
    });

    it('do not give up a fit that an issued forecast stands on', async () => {
      const { fitId } = await storeIssued(workspaceId);
      await expect(getPrisma().fit.delete({ where: { id: fitId } })).rejects.toThrow();
    });
  });

  describe('with events and scenarios', () => {
    it('come back as they were stored, in their order, until removed', async () => {
      const { marketId } = await storeMarket(workspaceId);
      const later = await addEvent({
        workspaceId,
        marketId,
        month: 24_299,
        note: 'outage',
        changesParameters: false,
      });
      await addEvent({ workspaceId, marketId, month: 24_290, note: 'new price', changesParameters: true });
      expect((await listEvents({ workspaceId, marketId })).map(({ note }) => note)).toEqual([
        'new price',
        'outage',
      ]);
      expect(await removeEvent({ workspaceId, marketId, eventId: later!.eventId })).toBe(true);
      expect(await listEvents({ workspaceId, marketId })).toHaveLength(1);
    });

    it('keep the pushes of a scenario through storing and changing', async () => {
      const { marketId } = await storeMarket(workspaceId);
      const made = await scenarios.createScenario({
        workspaceId,
        marketId,
        name: 'Spring push',
        pushes: [PUSH],
      });
      const scenarioId = made!.scenarioId;
      expect(await scenarios.readScenario({ workspaceId, scenarioId })).toMatchObject({
        name: 'Spring push',
        pushes: [PUSH],
      });
      const pushes = [PUSH, { ...PUSH, lengthMonths: null }];
      expect(await scenarios.changeScenario({ workspaceId, scenarioId, name: 'Both', pushes })).toBe(true);
      expect(await scenarios.listScenarios({ workspaceId, marketId })).toEqual([
        expect.objectContaining({ name: 'Both', pushes }),
      ]);
      expect(await scenarios.removeScenario({ workspaceId, scenarioId })).toBe(true);
      expect(await scenarios.removeScenario({ workspaceId, scenarioId })).toBe(false);
    });

    it('refuse a push that no form would take', async () => {
      const { marketId } = await storeMarket(workspaceId);
      const pushes = [{ ...PUSH, size: -1 }];
      await expect(scenarios.createScenario({ workspaceId, marketId, name: 'x', pushes })).rejects.toThrow();
    });
  });
});
