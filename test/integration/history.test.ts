/** The history of a market's counts on real databases: revisions, exclusions, restoring, events, two people saving at once. */
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { getLogger } from '@/lib/jobs/log';
import { closeSender } from '@/lib/jobs/sender';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { mergeSeries } from '@/lib/series/merge-series';
import { addEvent } from '@/lib/services/add-event';
import { addRevision } from '@/lib/services/add-revision';
import { createMarket } from '@/lib/services/create-market';
import { editEvent } from '@/lib/services/edit-event';
import { listHistory } from '@/lib/services/list-history';
import { type MarketPage, readMarket } from '@/lib/services/read-market';
import { type Revision, readRevision } from '@/lib/services/read-revision';
import { removeEvent } from '@/lib/services/remove-event';
import { restoreRevision } from '@/lib/services/restore-revision';
import type { Viewer } from '@/lib/services/viewer';
import { listAuditEntries } from '@/lib/store/audit';
import { getPrisma } from '@/lib/store/client';
import { seriesForFit } from '@/lib/store/revisions';
import { describeOnDatabases } from './database';
import { asMember, makeViewer } from './people';
import { marketForm, revisionForm, SAMPLE_SERIES, uploadMarket } from './sample-market';

getLogger().level = 'silent';

const HASH = 'ab'.repeat(32);
const MONTH = SAMPLE_SERIES.firstMonth;
/** Names and notes that break careless programs: markup, formulas, quotes, control and direction marks, other scripts. */
const NAUGHTY = [
  '<script>alert(1)</script>',
  '=HYPERLINK("http://example.org","x")',
  "Robert'); DROP TABLE market;--",
  '\u202eevil\u202c',
  'a\u0000b\u0007c',
  '\ud83d\udc69\u200d\ud83d\udc69\u200d\ud83d\udc67 \u0645\u0631\u062d\u0628\u0627 \u7530\u4e2d',
  '%s%d{{7*7}}',
  '__proto__',
];

describeOnDatabases('the history of a market', () => {
  let viewer: Viewer;
  let marketId: string;

  beforeEach(async () => {
    viewer = await makeViewer('analyst');
    ({ marketId } = await uploadMarket(viewer));
  });
  afterAll(closeSender);

  /** The sample with one count changed. */
  const corrected = (index: number, users: number) => ({
    ...SAMPLE_SERIES,
    focal: SAMPLE_SERIES.focal.map((count, i) => (i === index ? users : count)),
  });

  async function readPage(): Promise<MarketPage> {
    const outcome = await readMarket(viewer, marketId);
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value;
  }

  async function read(number: number): Promise<Revision> {
    const outcome = await readRevision(viewer, marketId, number);
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value.revision;
  }

  describe('revisions', () => {
    it('say who stored them, from which file with which hash, why, and how it was read', async () => {
      const source = {
        fileName: 'march.xlsx',
        fileHash: HASH,
        note: 'March came in',
        sourceNote: 'published figures',
        readingNotes: ['Sheet “Users”.', 'Weeks were brought to months by their mean.'],
      };
      expect(await addRevision(viewer, marketId, revisionForm(corrected(3, 11), source))).toMatchObject({
        ok: true,
        value: { revisionNumber: 2 },
      });
      const [newest, first] = await listHistory(viewer, marketId);
      expect(newest).toMatchObject({
        ...source,
        number: 2,
        createdByName: 'Some analyst',
        restoredFrom: null,
      });
      expect(newest).toMatchObject({ firstMonth: MONTH, months: SAMPLE_SERIES.focal.length });
      expect(first).toMatchObject({ number: 1, hasOutlook: false, issuedCount: 0 });
    });

    it('are compared month by month, any two', async () => {
      await addRevision(viewer, marketId, revisionForm(corrected(3, 11)));
      await addRevision(viewer, marketId, revisionForm(corrected(4, 12), { basedOn: 2 }));
      const withPrevious = await readRevision(viewer, marketId, 3);
      const withFirst = await readRevision(viewer, marketId, 3, 1);
      const monthsOf = (outcome: typeof withFirst) =>
        outcome.ok ? outcome.value.comparison?.changes.map(({ month, kind }) => [month, kind]) : null;
      expect(monthsOf(withPrevious)).toEqual([
        [MONTH + 3, 'changed'],
        [MONTH + 4, 'changed'],
      ]);
      expect(monthsOf(withFirst)).toEqual([[MONTH + 4, 'changed']]);
      const first = await readRevision(viewer, marketId, 1);
      expect(first).toMatchObject({ ok: true, value: { comparison: null, newestNumber: 3 } });
      expect(await readRevision(viewer, marketId, 4)).toEqual({ ok: false, code: 'not-found' });
    });

    it('a text that is no canonical series is refused, whoever sends it', async () => {
      const good = toCanonicalText(SAMPLE_SERIES);
      for (const canonicalText of ['', 'month,a,b\n2024-01,1,2\n', good.trimEnd(), `${good}2050-01,1,2\n`]) {
        const outcome = await addRevision(viewer, marketId, {
          ...revisionForm(SAMPLE_SERIES),
          canonicalText,
        });
        expect(outcome).toMatchObject({ ok: false, code: 'unreadable-series' });
      }
      const twice = revisionForm({ ...SAMPLE_SERIES, rival: SAMPLE_SERIES.focal });
      expect(await addRevision(viewer, marketId, twice)).toMatchObject({
        code: 'unreadable-series',
        problems: [{ code: 'identical-firms' }],
      });
      expect(await listHistory(viewer, marketId)).toHaveLength(1);
    });

    it('are restored as a new revision with the old content; restoring the newest changes nothing', async () => {
      const exclusions = [{ month: MONTH + 2, reason: 'strike' }];
      await addRevision(viewer, marketId, revisionForm(corrected(3, 11), { exclusions }));
      const restored = await restoreRevision(viewer, marketId, { number: 1, basedOn: 2 });
      expect(restored).toMatchObject({ ok: true, value: { revisionNumber: 3 } });
      const [one, three] = [await read(1), await read(3)];
      expect(three).toMatchObject({ series: one.series, exclusions: [], contentHash: one.contentHash });
      expect(three).toMatchObject({ restoredFrom: 1, createdByName: 'Some analyst' });
      expect((await readPage()).fit).toMatchObject({ state: 'queued' });
      expect(await restoreRevision(viewer, marketId, { number: 1, basedOn: 3 })).toEqual({
        ok: false,
        code: 'same-series',
      });
      expect((await read(2)).exclusions).toEqual(exclusions);
      const later = await restoreRevision(viewer, marketId, { number: 2, basedOn: 2 });
      expect(later).toEqual({ ok: false, code: 'newer-revision' });
    });
  });

  describe('two people', () => {
    it('saving at once: one is stored, the other gets the newest to compare with, and merged nothing is lost', async () => {
      const other = asMember(viewer, 'owner');
      const [mine, theirs] = await Promise.all([
        addRevision(viewer, marketId, revisionForm(corrected(3, 11))),
        addRevision(other, marketId, revisionForm(corrected(5, 13))),
      ]);
      const [winner, loser] = mine.ok ? [mine, theirs] : [theirs, mine];
      expect(winner).toMatchObject({ ok: true, value: { revisionNumber: 2 } });
      expect(loser).toMatchObject({ ok: false, code: 'newer-revision', newest: { number: 2 } });
      expect(await listHistory(viewer, marketId)).toHaveLength(2);
      if (loser.ok || loser.code !== 'newer-revision') return;
      const lost = mine.ok ? corrected(5, 13) : corrected(3, 11);
      const base = { series: SAMPLE_SERIES, exclusions: [] };
      const merged = mergeSeries(base, { series: lost, exclusions: [] }, loser.newest);
      expect(merged.conflicts).toEqual([]);
      await addRevision(viewer, marketId, revisionForm(merged.series, { basedOn: 2 }));
      expect((await read(3)).series.focal).toMatchObject({ 3: 11, 5: 13 });
    });

    it('saving the same at once: the second is told that it is stored already', async () => {
      const form = revisionForm(corrected(3, 11));
      const ends = await Promise.all([1, 2, 3].map(() => addRevision(viewer, marketId, form)));
      expect(ends.filter(({ ok }) => ok)).toHaveLength(1);
      expect(await listHistory(viewer, marketId)).toHaveLength(2);
      expect(await addRevision(viewer, marketId, { ...form, basedOn: 2 })).toEqual({
        ok: false,
        code: 'same-series',
      });
    });
  });

  describe('excluded months', () => {
    const exclusions = [{ month: MONTH + 2, reason: 'strike of the ferries' }];

    it('stay in the record with their reason and are gaps to the fit', async () => {
      await addRevision(viewer, marketId, revisionForm(SAMPLE_SERIES, { exclusions }));
      const page = await readPage();
      expect(page.exclusions).toEqual(exclusions);
      expect(page.series.focal[2]).toBe(SAMPLE_SERIES.focal[2]);
      const used = seriesForFit(await read(2));
      expect([used.focal[2], used.rival[2]]).toEqual([null, null]);
      expect(used.focal.filter((count) => count === null)).toHaveLength(1);
    });

    it('make another content: excluding is a revision, taking in again another, the reason counts', async () => {
      const form = revisionForm(SAMPLE_SERIES, { exclusions });
      expect(await addRevision(viewer, marketId, form)).toMatchObject({ ok: true });
      expect(await addRevision(viewer, marketId, { ...form, basedOn: 2 })).toMatchObject({
        code: 'same-series',
      });
      const reworded = { ...form, basedOn: 2, exclusions: [{ month: MONTH + 2, reason: 'storm' }] };
      expect(await addRevision(viewer, marketId, reworded)).toMatchObject({ ok: true });
      const taken = revisionForm(SAMPLE_SERIES, { basedOn: 3 });
      expect(await addRevision(viewer, marketId, taken)).toMatchObject({ ok: true });
      expect((await read(4)).contentHash).toBe((await read(1)).contentHash);
    });

    it('outside the series, twice, without a reason, or too many to leave a year are refused', async () => {
      const refuse = async (months: { month: number; reason: string }[]) => {
        const outcome = await addRevision(
          viewer,
          marketId,
          revisionForm(SAMPLE_SERIES, { exclusions: months }),
        );
        return outcome.ok ? 'stored' : outcome.code;
      };
      expect(await refuse([{ month: MONTH - 1, reason: 'x' }])).toBe('unreadable-series');
      expect(await refuse([exclusions[0]!, exclusions[0]!])).toBe('unreadable-series');
      expect(await refuse([{ month: MONTH, reason: ' ' }])).toBe('invalid-input');
      const most = SAMPLE_SERIES.focal.slice(11).map((_, i) => ({ month: MONTH + 11 + i, reason: 'x' }));
      expect(await refuse(most)).toBe('unreadable-series');
      expect(await refuse(most.slice(1))).toBe('stored');
    });
  });

  describe('events', () => {
    const event = { month: MONTH + 5, note: 'price change', changesParameters: true };

    it('are added, changed and removed, in order of their months', async () => {
      const added = await addEvent(viewer, marketId, event);
      const eventId = added.ok ? added.value.eventId : '';
      await addEvent(viewer, marketId, {
        ...event,
        month: MONTH + 1,
        note: 'outage',
        changesParameters: false,
      });
      expect((await readPage()).events.map(({ note }) => note)).toEqual(['outage', 'price change']);
      expect(await editEvent(viewer, marketId, eventId, { ...event, month: MONTH })).toMatchObject({
        ok: true,
      });
      expect((await readPage()).events).toMatchObject([{ id: eventId, month: MONTH }, { note: 'outage' }]);
      expect(await removeEvent(viewer, marketId, eventId)).toMatchObject({ ok: true });
      expect(await removeEvent(viewer, marketId, eventId)).toEqual({ ok: false, code: 'not-found' });
      expect((await readPage()).events).toHaveLength(1);
    });

    it('need a note of one line and a month', async () => {
      expect(await addEvent(viewer, marketId, { ...event, note: ' \n ' })).toMatchObject({
        code: 'invalid-input',
        fields: [{ field: 'note', code: 'missing' }],
      });
      expect(await addEvent(viewer, marketId, { ...event, month: 5 })).toMatchObject({
        code: 'invalid-input',
      });
    });
  });

  it('readers and strangers change nothing', async () => {
    const added = await addEvent(viewer, marketId, { month: MONTH, note: 'x', changesParameters: false });
    const eventId = added.ok ? added.value.eventId : '';
    const before = await listAuditEntries({ workspaceId: viewer.workspaceId, limit: 50 });
    for (const [as, code] of [
      [asMember(viewer, 'reader'), 'not-allowed'],
      [await makeViewer('owner'), 'not-found'],
    ] as const) {
      const refusals = [
        await addRevision(as, marketId, revisionForm(corrected(3, 11))),
        await restoreRevision(as, marketId, { number: 1, basedOn: 1 }),
        await addEvent(as, marketId, { month: MONTH, note: 'y', changesParameters: false }),
        await editEvent(as, marketId, eventId, { month: MONTH, note: 'y', changesParameters: false }),
        await removeEvent(as, marketId, eventId),
      ];
      expect(refusals).toEqual(refusals.map(() => ({ ok: false, code })));
    }
    expect(await readRevision(asMember(viewer, 'reader'), marketId, 1)).toMatchObject({ ok: true });
    expect(await readRevision(await makeViewer('owner'), marketId, 1)).toMatchObject({ ok: false });
    expect(await listHistory(await makeViewer('owner'), marketId)).toEqual([]);
    expect(await listAuditEntries({ workspaceId: viewer.workspaceId, limit: 50 })).toEqual(before);
  });

  it('each stored change has its audit entry', async () => {
    await addRevision(viewer, marketId, revisionForm(corrected(3, 11)));
    await restoreRevision(viewer, marketId, { number: 1, basedOn: 2 });
    const event = { month: MONTH, note: 'x', changesParameters: false };
    const added = await addEvent(viewer, marketId, event);
    const eventId = added.ok ? added.value.eventId : '';
    await editEvent(viewer, marketId, eventId, event);
    await removeEvent(viewer, marketId, eventId);
    const entries = await listAuditEntries({ workspaceId: viewer.workspaceId, limit: 50 });
    expect(entries.map(({ action }) => action)).toEqual([
      'remove-event',
      'edit-event',
      'add-event',
      'restore-revision',
      'add-revision',
      'create-market',
    ]);
    expect(entries[3]).toMatchObject({ subjectType: 'revision', detail: { restoredFrom: 1, excluded: 0 } });
    expect(new Set(entries.map(({ userId }) => userId))).toEqual(new Set([viewer.userId]));
  });

  it.each(NAUGHTY)('%j as a name and a note is stored without what could harm, or refused', async (text) => {
    const outcome = await createMarket(
      viewer,
      marketForm({ name: text, focalName: text, unit: text, sourceNote: text, note: text, fileName: text }),
    );
    expect(outcome).toMatchObject({ ok: true });
    const stored = await getPrisma().market.findFirstOrThrow({
      where: { id: outcome.ok ? outcome.value.marketId : '' },
      include: { revisions: true },
    });
    const [revision] = stored.revisions;
    for (const kept of [stored.name, stored.focalName, stored.unit, revision!.note, revision!.fileName]) {
      expect(kept).toMatch(/\S/);
      expect(kept).not.toMatch(/(?!\n)\p{Cc}|[\u202a-\u202e\u2066-\u2069]/u);
    }
    expect(Object.getPrototypeOf(stored)).toBe(Object.prototype);
  });
});
