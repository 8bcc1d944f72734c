/** Services on real databases: roles, scope, staleness, issued forecasts and their links. */
import { afterAll, beforeEach, expect, it } from 'vitest';
import type { Push } from '@/lib/dynamics/push';
import { issuedForecastSchema } from '@/lib/issue/format';
import { runFitJob } from '@/lib/jobs/fit-job';
import { getLogger } from '@/lib/jobs/log';
import { closeSender } from '@/lib/jobs/sender';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { addRevision } from '@/lib/services/add-revision';
import { archiveMarket } from '@/lib/services/archive-market';
import { cancelFit } from '@/lib/services/cancel-fit';
import { TRY_LIMITS } from '@/lib/services/count-tries';
import { createForecastLink } from '@/lib/services/create-forecast-link';
import { createMarket } from '@/lib/services/create-market';
import { editMarket } from '@/lib/services/edit-market';
import { issueForecast } from '@/lib/services/issue-forecast';
import { listMarkets } from '@/lib/services/list-markets';
import { openForecastLink } from '@/lib/services/open-forecast-link';
import { readDraws } from '@/lib/services/read-draws';
import { readFitProgress } from '@/lib/services/read-fit-progress';
import { readIssued } from '@/lib/services/read-issued';
import { type MarketPage, readMarket } from '@/lib/services/read-market';
import { requestFit } from '@/lib/services/request-fit';
import { restoreMarket } from '@/lib/services/restore-market';
import { revokeForecastLink } from '@/lib/services/revoke-forecast-link';
import { saveScenario } from '@/lib/services/save-scenario';
import type { Viewer } from '@/lib/services/viewer';
import { listAuditEntries } from '@/lib/store/audit';
import { getPrisma } from '@/lib/store/client';
import { describeOnDatabases } from './database';
import { createFakeRun, sampleResult } from './fake-run';
import { asMember, makeViewer, visitorHeaders } from './people';
import { marketForm, revisionForm, SAMPLE_SERIES, uploadMarket } from './sample-market';

const PUSH: Push = {
  firm: 2,
  kind: 'growth-lift',
  startMonth: 0,
  lengthMonths: 6,
  size: 0.5,
  rampMonths: 0,
  carryOverHalfLifeMonths: 0,
};

getLogger().level = 'silent';

describeOnDatabases('services', () => {
  let viewer: Viewer;
  let marketId: string;
  let fitId: string;

  beforeEach(async () => {
    await getPrisma().issuedForecast.deleteMany();
    await getPrisma().workspace.deleteMany();
    await getPrisma().rateLimit.deleteMany();
    viewer = await makeViewer('analyst');
    ({ marketId, fitId } = await uploadMarket(viewer));
  });
  afterAll(closeSender);

  async function endFit(id = fitId): Promise<void> {
    const tools = {
      createRun: createFakeRun({ slices: 1 }),
      stop: new AbortController().signal,
      log: getLogger(),
    };
    expect(await runFitJob({ fitId: id, workspaceId: viewer.workspaceId }, tools)).toBe('done');
  }

  async function readPage(): Promise<MarketPage> {
    const outcome = await readMarket(viewer, marketId);
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value;
  }

  async function issue(pushes: Push[] | null = null): Promise<string> {
    const outcome = await issueForecast(viewer, marketId, {
      scenarios: pushes ? [{ name: 'Scenario', pushes }] : [],
      mayReadersTry: false,
    });
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value.issuedId;
  }

  async function makeLink(issuedId: string, expiresAt: Date | null = null) {
    const outcome = await createForecastLink(viewer, issuedId, { expiresAt });
    if (!outcome.ok) throw new Error(outcome.code);
    return { linkId: outcome.value.linkId, token: outcome.value.path.replace('/f/', '') };
  }

  const longer = () => ({
    ...SAMPLE_SERIES,
    focal: [...SAMPLE_SERIES.focal, 400_000],
    rival: [...SAMPLE_SERIES.rival, 250_000],
  });
  const revision = (series = longer()) => revisionForm(series);

  it('an upload is stored as revision 1 and fitted with the measurement errors of the market', async () => {
    const page = await readPage();
    expect(page).toMatchObject({
      revision: { number: 1, fileName: 'tickets.csv' },
      fit: { id: fitId, state: 'queued' },
    });
    expect(page).toMatchObject({ outlook: null, facts: null, issued: [], scenarios: [] });
    expect(page.series).toEqual(roundTrip(SAMPLE_SERIES));
    const row = await getPrisma().fit.findUniqueOrThrow({ where: { id: fitId } });
    expect(row.options).toMatchObject({ measurementFloor: { focal: 0, rival: 0.1 } });
  });

  it('a table that cannot be fitted is refused with its problems, and nothing is stored', async () => {
    const canonicalText = toCanonicalText({
      ...SAMPLE_SERIES,
      focal: SAMPLE_SERIES.focal.slice(0, 5),
      rival: SAMPLE_SERIES.rival.slice(0, 5),
    });
    const outcome = await createMarket(viewer, marketForm({ canonicalText }));
    expect(outcome).toMatchObject({ ok: false, code: 'unreadable-series' });
    expect(!outcome.ok && 'problems' in outcome && outcome.problems.map((problem) => problem.code)).toContain(
      'too-short-to-fit',
    );
    expect(await listMarkets(viewer)).toHaveLength(1);
  });

  it('the list and the page show the outlook once the fit has ended', async () => {
    expect((await listMarkets(viewer))[0]?.fit).toMatchObject({
      state: 'queued',
      odds: null,
      isStale: false,
    });
    await endFit();
    const { report } = sampleResult();
    const [summary] = await listMarkets(viewer);
    expect(summary).toMatchObject({ id: marketId, months: SAMPLE_SERIES.focal.length, isDemo: false });
    expect(summary?.fit).toMatchObject({
      state: 'done',
      odds: report.outlook.odds,
      decided: report.outlook.decided,
      isStale: false,
    });
    const page = await readPage();
    expect(page.facts?.report).toEqual(report);
    expect(page.facts?.market).toMatchObject({
      focalName: 'Norrland',
      measurementError: { focal: 0, rival: 0.1 },
    });
    expect(page.outlook).toEqual({ fitId, staleReasons: [] });
  });

  it('draws are handed out thinned, as plain numbers', async () => {
    await endFit();
    const outcome = await readDraws(viewer, fitId, 50);
    expect(outcome.ok && outcome.value.count).toBe(50);
    const plain = outcome.ok ? JSON.parse(JSON.stringify(outcome.value)) : null;
    expect(outcome.ok && outcome.value).toEqual(plain);
    await expect(readDraws(viewer, fitId, 0)).rejects.toThrow('count');
  });

  it('a newer revision leaves the outlook with its own data and calls it stale', async () => {
    await endFit();
    const added = await addRevision(viewer, marketId, revision());
    expect(added).toMatchObject({ ok: true, value: { revisionNumber: 2 } });
    const page = await readPage();
    expect(page.revision.number).toBe(2);
    expect(page.series.focal).toHaveLength(SAMPLE_SERIES.focal.length + 1);
    expect(page.facts).toMatchObject({ revision: { number: 1 } });
    expect(page.facts?.series).toEqual(roundTrip(SAMPLE_SERIES));
    expect(page.outlook?.staleReasons).toEqual(['newer-revision']);
    expect(page.fit).toMatchObject({ state: 'queued', isStale: true });
    expect((await listMarkets(viewer))[0]?.fit).toMatchObject({ isStale: true });
    expect(await issueForecast(viewer, marketId, { scenarios: [], mayReadersTry: false })).toEqual({
      ok: false,
      code: 'is-stale',
      reasons: ['newer-revision'],
    });
  });

  it('the same counts again are no new revision', async () => {
    const outcome = await addRevision(viewer, marketId, revision(SAMPLE_SERIES));
    expect(outcome).toEqual({ ok: false, code: 'same-series' });
    expect((await readPage()).revision.number).toBe(1);
  });

  it('other measurement errors and another engine make the outlook stale, another name does not', async () => {
    await endFit();
    await editMarket(viewer, marketId, { name: 'Ferries', rivalName: 'Halcyon Lines' });
    expect((await readPage()).outlook?.staleReasons).toEqual([]);
    await editMarket(viewer, marketId, { rivalError: 0.2 });
    expect((await readPage()).outlook?.staleReasons).toEqual(['measurement-changed']);
    const { result } = await getPrisma().fit.findUniqueOrThrow({ where: { id: fitId } });
    const older = { ...(result as object), engineVersion: '0.0.1' };
    await getPrisma().fit.update({ where: { id: fitId }, data: { result: older } });
    expect((await readPage()).outlook?.staleReasons).toEqual(['measurement-changed', 'engine-changed']);
    expect((await listMarkets(viewer))[0]?.fit).toMatchObject({ isStale: true });
  });

  it('a forecast is not issued before there is an outlook', async () => {
    expect(await issueForecast(viewer, marketId, { scenarios: [], mayReadersTry: false })).toEqual({
      ok: false,
      code: 'no-result',
    });
  });

  it('an issued forecast holds names, data, outlook and the comparison under its pushes', async () => {
    await endFit();
    const outcome = await readIssued(viewer, await issue([PUSH]));
    const content = outcome.ok ? outcome.value.content : null;
    expect(issuedForecastSchema.parse(content)).toEqual(content);
    expect(content).toMatchObject({
      issuedBy: 'Some analyst',
      market: { name: 'Ferry tickets, north' },
      revision: { number: 1 },
    });
    expect(content?.report).toEqual(sampleResult().report);
    expect(content?.scenarios?.[0]?.pushes).toEqual([PUSH]);
    expect(content?.scenarios?.[0]?.comparison.effect.worstShareDifference.q50).toBeLessThan(0);
  });

  it('an issued forecast stays as it was after a new revision, a new fit and an edit', async () => {
    await endFit();
    const issuedId = await issue([PUSH]);
    const { token } = await makeLink(issuedId);
    const before = await openForecastLink(token, visitorHeaders());
    const added = await addRevision(viewer, marketId, revision());
    await editMarket(viewer, marketId, { name: 'Renamed', focalName: 'Other', focalError: 0.3 });
    await endFit(added.ok ? added.value.fitId : '');
    expect(before).toMatchObject({ ok: true, value: { market: { name: 'Ferry tickets, north' } } });
    expect(await openForecastLink(token, visitorHeaders())).toEqual(before);
  });

  it('a link shows the forecast to anybody, and its openings are counted', async () => {
    await endFit();
    const issuedId = await issue();
    const { token, linkId } = await makeLink(issuedId);
    expect(await openForecastLink(token, visitorHeaders())).toMatchObject({
      ok: true,
      value: { scenario: null },
    });
    await openForecastLink(token, visitorHeaders());
    const page = await readIssued(viewer, issuedId);
    expect(page.ok && page.value.links).toMatchObject([
      { id: linkId, openedCount: 2, hint: token.slice(0, 4) },
    ]);
    expect(JSON.stringify(await getPrisma().forecastLink.findMany())).not.toContain(token);
  });

  it('wrong, expired and revoked links look alike', async () => {
    await endFit();
    const issuedId = await issue();
    const gone = { ok: false, code: 'not-available' };
    const expired = await makeLink(issuedId, new Date(Date.now() + 60_000));
    expect(await openForecastLink(expired.token, visitorHeaders())).toMatchObject({ ok: true });
    await getPrisma().forecastLink.update({
      where: { id: expired.linkId },
      data: { expiresAt: new Date(Date.now() - 1) },
    });
    const revoked = await makeLink(issuedId);
    expect(await revokeForecastLink(viewer, revoked.linkId)).toMatchObject({ ok: true });
    const wrong = `${revoked.token.startsWith('A') ? 'B' : 'A'}${revoked.token.slice(1)}`;
    for (const token of [wrong, expired.token, revoked.token, 'short', `${revoked.token}/x`, '']) {
      expect(await openForecastLink(token, visitorHeaders())).toEqual(gone);
    }
    expect(await revokeForecastLink(viewer, revoked.linkId)).toEqual({ ok: false, code: 'not-found' });
  });

  it('a link needs an expiry ahead', async () => {
    await endFit();
    const issuedId = await issue();
    const outcome = await createForecastLink(viewer, issuedId, { expiresAt: new Date(Date.now() - 1000) });
    expect(outcome).toMatchObject({ ok: false, code: 'invalid-input', fields: [{ field: 'expiresAt' }] });
  });

  it('guessing at links is stopped, for the guesser alone', async () => {
    await endFit();
    const { token } = await makeLink(await issue());
    const guesser = visitorHeaders();
    for (let i = 0; i < TRY_LIMITS.forecastLink.points; i++)
      await openForecastLink(`${i}`.padStart(42, 'x').concat('A'), guesser);
    expect(await openForecastLink(token, guesser)).toEqual({ ok: false, code: 'too-many-tries' });
    expect(await openForecastLink(token, visitorHeaders())).toMatchObject({ ok: true });
  });

  it('a scenario is kept, changed and shown with its market', async () => {
    const created = await saveScenario(viewer, marketId, { name: 'Spring campaign', pushes: [PUSH] });
    const scenarioId = created.ok ? created.value.scenarioId : '';
    await saveScenario(viewer, marketId, {
      scenarioId,
      name: 'Summer campaign',
      pushes: [{ ...PUSH, size: 1 }],
    });
    expect((await readPage()).scenarios).toMatchObject([
      { id: scenarioId, name: 'Summer campaign', pushes: [{ size: 1 }] },
    ]);
    const other = await uploadMarket(viewer);
    const elsewhere = await saveScenario(viewer, other.marketId, { scenarioId, name: 'x', pushes: [PUSH] });
    expect(elsewhere).toEqual({ ok: false, code: 'not-found' });
    const tooLarge = { name: 'x', pushes: [{ ...PUSH, size: 50 }] };
    expect(await saveScenario(viewer, marketId, tooLarge)).toMatchObject({
      ok: false,
      code: 'invalid-input',
    });
  });

  /** Every service that takes an id, called with the ids of `viewer`'s workspace by somebody else. */
  async function callAll(as: Viewer) {
    await endFit();
    const issuedId = await issue();
    const { linkId } = await makeLink(issuedId);
    const scenario = await saveScenario(viewer, marketId, { name: 'Mine', pushes: [PUSH] });
    const scenarioId = scenario.ok ? scenario.value.scenarioId : '';
    const own = as.workspaceId === viewer.workspaceId ? null : await uploadMarket(as).catch(() => null);
    const before = await dump();
    const reads = {
      readMarket: await readMarket(as, marketId),
      readFitProgress: await readFitProgress(as, fitId),
      readDraws: await readDraws(as, fitId),
      readIssued: await readIssued(as, issuedId),
    };
    const writes = {
      addRevision: await addRevision(as, marketId, revision()),
      requestFit: await requestFit(as, marketId),
      cancelFit: await cancelFit(as, marketId),
      editMarket: await editMarket(as, marketId, { name: 'Taken' }),
      restoreMarket: await restoreMarket(as, marketId),
      archiveMarket: await archiveMarket(as, marketId),
      saveScenario: await saveScenario(as, marketId, { name: 'Theirs', pushes: [PUSH] }),
      changeScenario: await saveScenario(as, own?.marketId ?? marketId, {
        scenarioId,
        name: 'Theirs',
        pushes: [PUSH],
      }),
      issueForecast: await issueForecast(as, marketId, { scenarios: [], mayReadersTry: false }),
      createForecastLink: await createForecastLink(as, issuedId, { expiresAt: null }),
      revokeForecastLink: await revokeForecastLink(as, linkId),
    };
    return { reads, writes, before, after: await dump() };
  }

  it('ids of another workspace are not found by any service, and nothing changes', async () => {
    const stranger = await makeViewer('owner');
    const { reads, writes, before, after } = await callAll(stranger);
    for (const [name, outcome] of Object.entries({ ...reads, ...writes })) {
      expect({ name, outcome }).toEqual({ name, outcome: { ok: false, code: 'not-found' } });
    }
    expect(after).toEqual(before);
    expect(await listMarkets(await makeViewer('owner'))).toEqual([]);
  });

  it('a reader sees everything and changes nothing', async () => {
    const reader = asMember(viewer, 'reader');
    const { reads, writes, before, after } = await callAll(reader);
    for (const outcome of Object.values(reads)) expect(outcome.ok).toBe(true);
    for (const [name, outcome] of Object.entries(writes)) {
      expect({ name, outcome }).toEqual({ name, outcome: { ok: false, code: 'not-allowed' } });
    }
    expect(await createMarket(reader, marketForm())).toEqual({ ok: false, code: 'not-allowed' });
    expect(after).toEqual(before);
  });

  it('what was done is on the audit trail, in the order it was done', async () => {
    await endFit();
    const { linkId } = await makeLink(await issue());
    await revokeForecastLink(viewer, linkId);
    const entries = await listAuditEntries({ workspaceId: viewer.workspaceId, limit: 50 });
    expect(entries.map((entry) => entry.action)).toEqual([
      'revoke-forecast-link',
      'create-forecast-link',
      'issue-forecast',
      'create-market',
    ]);
    expect(new Set(entries.map((entry) => entry.userId))).toEqual(new Set([viewer.userId]));
  });

  /** Everything of the workspace that a service could change. */
  async function dump() {
    const where = { workspaceId: viewer.workspaceId };
    const prisma = getPrisma();
    return {
      markets: await prisma.market.findMany({ where }),
      revisions: await prisma.seriesRevision.findMany({ where }),
      fits: await prisma.fit.findMany({ where }),
      scenarios: await prisma.scenario.findMany({ where }),
      issued: await prisma.issuedForecast.findMany({ where }),
      links: await prisma.forecastLink.findMany({ where }),
      audit: await prisma.auditEntry.findMany({ where }),
    };
  }
});

/** The counts as the text of the upload carries them. */
function roundTrip<T>(value: T): T {
  return JSON.parse(JSON.stringify(value));
}
