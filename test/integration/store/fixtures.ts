/** Rows for tests of the store: a small market with awkward counts, and what is stored on top of it. */
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import type { FitOptions, FitProgress } from '@/lib/estimate/types';
import { ISSUE_FORMAT_VERSION, type IssuedForecast } from '@/lib/issue/format';
import type { MonthlySeries } from '@/lib/series/types';
import { claimFit, finishFit } from '@/lib/store/fit-work';
import type { NewFit } from '@/lib/store/fits';
import { createForecastLink } from '@/lib/store/forecast-links';
import { createId } from '@/lib/store/ids';
import { createIssuedForecast } from '@/lib/store/issued-forecasts';
import { createMarket, type NewMarket } from '@/lib/store/markets';
import type { NewRevision } from '@/lib/store/revisions';
import { createWorkspace } from '@/lib/store/workspaces';
import { makeSample } from '../../unit/brief/sample-report';

export const SAMPLE = makeSample('coexistence');
export const SERIES: MonthlySeries = {
  firstMonth: 24_290,
  focal: [0, 1.5, null, 1e9 + 0.25],
  rival: [1 / 3, null, 7, 1e-9],
};
export const OPTIONS: FitOptions = {
  seed: 2_147_483_647,
  horizonMonths: 24,
  measurementFloor: { focal: 0, rival: 0.1 },
  errorModel: 'ar1',
};
export const PROGRESS: FitProgress = {
  stage: 'sampling',
  startsDone: 12,
  startsTotal: 12,
  bestValue: -31.25,
  drawsKept: 250,
  drawsTarget: 2000,
  rHat: null,
  ess: 87.5,
};
export const NEW_FIT: NewFit = { options: OPTIONS, engineVersion: ENGINE_VERSION, requestedById: null };
export const REVISION: NewRevision = {
  series: SERIES,
  fileName: 'counts.csv',
  sourceNote: 'own count and a panel',
  createdById: null,
};
export const MARKET: NewMarket = {
  name: 'Ferry passes',
  unit: 'pass holders',
  focalName: 'Norrland',
  rivalName: 'Halcyon',
  focalError: 0,
  rivalError: 0.1,
};
export const PUSH = {
  firm: 2 as const,
  kind: 'recruits' as const,
  startMonth: 2,
  lengthMonths: 6,
  size: 1500.5,
  rampMonths: 1,
  carryOverHalfLifeMonths: 0,
};
export const AUDIT = { userId: 'ada', action: 'test' };
export const HOUR = 3_600_000;
/** A result that a fit may end with. */
export const RESULT = { report: SAMPLE.facts.report, draws: SAMPLE.draws };

export async function makeWorkspace(): Promise<string> {
  return (await createWorkspace({ name: 'Umbra Analytics' })).id;
}

/** A market with one revision and a queued fit. */
export async function storeMarket(workspaceId: string, audit?: typeof AUDIT) {
  const made = await createMarket({ workspaceId, market: MARKET, revision: REVISION, fit: NEW_FIT, audit });
  return { ...made, fitId: made.fitId! };
}

/** The same, with its fit done. */
export async function storeDoneMarket(workspaceId: string) {
  const made = await storeMarket(workspaceId);
  const claim = await claimFit({ fitId: made.fitId, workspaceId });
  if (!(await finishFit(claim!, RESULT))) throw new Error('the fit could not be finished');
  return made;
}

export function makeIssued(): IssuedForecast {
  const { market, series, report } = SAMPLE.facts;
  const { name, unit, focalName, rivalName } = market;
  return {
    formatVersion: ISSUE_FORMAT_VERSION,
    issuedAt: '2026-03-01T09:30:00.000Z',
    issuedBy: 'Ines Marlow',
    market: { name, unit, focalName, rivalName },
    revision: { number: 1, createdAt: null, fileName: null },
    series,
    report,
    scenario: null,
  };
}

export async function storeIssued(workspaceId: string) {
  const { marketId, fitId } = await storeDoneMarket(workspaceId);
  const content = makeIssued();
  const made = await createIssuedForecast({ workspaceId, marketId, fitId, issuedById: 'ada', content });
  return { marketId, fitId, issuedId: made!.issuedId };
}

export async function storeLink(workspaceId: string, expiresAt: Date | null = null) {
  const { issuedId } = await storeIssued(workspaceId);
  const tokenHash = createId();
  const link = { tokenHash, hint: 'abcd', expiresAt, createdById: null };
  const made = await createForecastLink({ workspaceId, issuedId, ...link });
  return { issuedId, tokenHash, linkId: made!.linkId };
}
