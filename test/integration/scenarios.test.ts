/** Kept scenarios on real databases: what comes back, renaming, copies, removal, an earlier fit, forecasts issued with several, the audit trail. */
import { afterAll, beforeEach, expect, it } from 'vitest';
import { runFitJob } from '@/lib/jobs/fit-job';
import { getLogger } from '@/lib/jobs/log';
import { closeSender } from '@/lib/jobs/sender';
import type { Money } from '@/lib/scenario/money';
import { MAX_SIDE_BY_SIDE } from '@/lib/scenario/push-bounds';
import type { PricedPush } from '@/lib/scenario/spend';
import { TRIAL_DRAWS } from '@/lib/scenario/trial-draws';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';
import { cancelFit } from '@/lib/services/cancel-fit';
import { issueForecast } from '@/lib/services/issue-forecast';
import { readIssued } from '@/lib/services/read-issued';
import { readMarket } from '@/lib/services/read-market';
import { removeScenario } from '@/lib/services/remove-scenario';
import { requestFit } from '@/lib/services/request-fit';
import { saveScenario } from '@/lib/services/save-scenario';
import type { Viewer } from '@/lib/services/viewer';
import { listAuditEntries } from '@/lib/store/audit';
import { getPrisma } from '@/lib/store/client';
import { describeOnDatabases } from './database';
import { createFakeRun } from './fake-run';
import { asMember, makeViewer } from './people';
import { uploadMarket } from './sample-market';

const BURST: PricedPush = {
  firm: 2,
  kind: 'recruits',
  startMonth: 1,
  lengthMonths: 6,
  size: 500,
  rampMonths: 1,
  carryOverHalfLifeMonths: 2,
  spendPerMonth: 10_000,
  response: { costPerRecruit: 20, mostPerMonth: null },
};
const LASTING_PULL: PricedPush = {
  ...BURST,
  firm: 1,
  kind: 'pull',
  size: 0.1,
  lengthMonths: null,
  spendPerMonth: undefined,
  response: undefined,
};
const PUSHES = [BURST, JSON.parse(JSON.stringify(LASTING_PULL)) as PricedPush];
const MONEY: Money = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 2, rival: null },
  discountRatePerYear: 0.1,
  months: null,
};

getLogger().level = 'silent';

describeOnDatabases('scenarios', () => {
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

  async function endFit(id = fitId): Promise<void> {
    const createRun = createFakeRun({ slices: 1 });
    const tools = { createRun, stop: new AbortController().signal, log: getLogger() };
    expect(await runFitJob({ fitId: id, workspaceId: viewer.workspaceId }, tools)).toBe('done');
  }

  async function keep(form: Parameters<typeof saveScenario>[2]): Promise<string> {
    const outcome = await saveScenario(viewer, marketId, form);
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value.scenarioId;
  }

  async function list() {
    const outcome = await readMarket(viewer, marketId);
    if (!outcome.ok) throw new Error(outcome.code);
    return outcome.value.scenarios;
  }

  it('come back with prices, money and the fit they were looked at with', async () => {
    await endFit();
    const id = await keep({ name: 'Spring', pushes: PUSHES, money: MONEY });
    expect(await list()).toMatchObject([{ id, name: 'Spring', pushes: PUSHES, money: MONEY, fitId }]);
  });

  it('are renamed in place and copied under another name', async () => {
    const id = await keep({ name: 'Spring', pushes: PUSHES, money: MONEY });
    await keep({ scenarioId: id, name: 'Summer', pushes: PUSHES, money: MONEY });
    const copyId = await keep({ name: 'Copy of Summer', pushes: PUSHES, money: MONEY });
    const names = (await list()).map((scenario) => [scenario.id, scenario.name]);
    expect(new Map(names as [string, string][])).toEqual(
      new Map([
        [id, 'Summer'],
        [copyId, 'Copy of Summer'],
      ]),
    );
  });

  it('give up their money when they are saved without', async () => {
    const id = await keep({ name: 'Spring', pushes: PUSHES, money: MONEY });
    await keep({ scenarioId: id, name: 'Spring', pushes: PUSHES, money: null });
    expect(await list()).toMatchObject([{ id, money: null }]);
  });

  it('stay with the earlier fit until they are saved again', async () => {
    await endFit();
    const id = await keep({ name: 'Spring', pushes: PUSHES });
    await getPrisma().fit.update({ where: { id: fitId }, data: { engineVersion: '0.0.1' } });
    const again = await requestFit(viewer, marketId);
    if (!again.ok) throw new Error(again.code);
    await endFit(again.value.fitId);
    expect(await list()).toMatchObject([{ id, fitId }]);
    await keep({ scenarioId: id, name: 'Spring', pushes: PUSHES });
    expect(await list()).toMatchObject([{ id, fitId: again.value.fitId }]);
  });

  it('are removed for good, once, and not by a reader, a stranger or from another market', async () => {
    const id = await keep({ name: 'Spring', pushes: PUSHES });
    const other = await uploadMarket(viewer);
    const refused = [
      await removeScenario(asMember(viewer, 'reader'), marketId, id),
      await removeScenario(await makeViewer('owner'), marketId, id),
      await removeScenario(viewer, other.marketId, id),
    ];
    expect(refused.map((outcome) => !outcome.ok && outcome.code)).toEqual([
      'not-allowed',
      'not-found',
      'not-found',
    ]);
    expect(await list()).toHaveLength(1);
    expect(await removeScenario(viewer, marketId, id)).toMatchObject({ ok: true });
    expect(await removeScenario(viewer, marketId, id)).toEqual({ ok: false, code: 'not-found' });
    expect(await list()).toEqual([]);
  });

  it.each([
    { what: 'no name', form: { name: ' ', pushes: PUSHES } },
    { what: 'a name that is too long', form: { name: 'x'.repeat(MAX_NAME_LENGTH + 1), pushes: PUSHES } },
    { what: 'no push', form: { name: 'x', pushes: [] } },
    { what: 'a push of no number', form: { name: 'x', pushes: [{ ...BURST, size: Number.NaN }] } },
    { what: 'a month before the first', form: { name: 'x', pushes: [{ ...BURST, startMonth: -1 }] } },
    {
      what: 'a discount below nothing',
      form: { name: 'x', pushes: PUSHES, money: { ...MONEY, discountRatePerYear: -2 } },
    },
  ])('with $what are refused and nothing is kept', async ({ form }) => {
    expect(await saveScenario(viewer, marketId, form)).toMatchObject({ ok: false, code: 'invalid-input' });
    expect(await list()).toEqual([]);
  });

  it('go into an issued forecast, several at once, with draws for readers only when asked', async () => {
    await endFit();
    const scenarios = [
      { name: 'Theirs', pushes: [BURST], money: MONEY },
      { name: 'Both', pushes: PUSHES },
    ];
    const issue = async (mayReadersTry: boolean) => {
      const issued = await issueForecast(viewer, marketId, { scenarios, mayReadersTry });
      if (!issued.ok) throw new Error(issued.code);
      const read = await readIssued(viewer, issued.value.issuedId);
      if (!read.ok) throw new Error(read.code);
      return read.value.content;
    };
    const content = await issue(true);
    expect(content?.scenarios?.map(({ name, pushes }) => ({ name, pushes }))).toEqual([
      { name: 'Theirs', pushes: [BURST] },
      { name: 'Both', pushes: PUSHES },
    ]);
    expect(content?.scenarios?.map(({ comparison }) => comparison.money !== undefined)).toEqual([
      true,
      false,
    ]);
    expect(content?.trial?.draws.count).toBeGreaterThan(0);
    expect(content?.trial?.draws.count).toBeLessThanOrEqual(TRIAL_DRAWS);
    expect((await issue(false))?.trial).toBeUndefined();
  });

  it('beyond those that can stand side by side are refused for issuing', async () => {
    await endFit();
    const scenarios = Array.from({ length: MAX_SIDE_BY_SIDE + 1 }, (_, index) => ({
      name: `Scenario ${index}`,
      pushes: PUSHES,
    }));
    expect(await issueForecast(viewer, marketId, { scenarios, mayReadersTry: false })).toMatchObject({
      ok: false,
      code: 'invalid-input',
    });
  });

  it('and the cancelling of a fit leave their entries on the audit trail', async () => {
    const id = await keep({ name: 'Spring', pushes: PUSHES });
    await removeScenario(viewer, marketId, id);
    await cancelFit(viewer, marketId);
    expect(await cancelFit(viewer, marketId)).toEqual({ ok: false, code: 'nothing-running' });
    const entries = await listAuditEntries({ workspaceId: viewer.workspaceId, limit: 10 });
    expect(entries.map(({ action, subjectId, userId }) => ({ action, subjectId, userId }))).toEqual([
      { action: 'cancel-fit', subjectId: fitId, userId: viewer.userId },
      { action: 'remove-scenario', subjectId: id, userId: viewer.userId },
      { action: 'save-scenario', subjectId: id, userId: viewer.userId },
      { action: 'create-market', subjectId: marketId, userId: viewer.userId },
    ]);
  });
});
