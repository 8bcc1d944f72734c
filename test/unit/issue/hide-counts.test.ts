import { describe, expect, it } from 'vitest';
import type { BriefFacts } from '@/lib/brief/facts';
import { plainText } from '@/lib/brief/text';
import { issuedForecastSchema } from '@/lib/issue/format';
import { freezeForecast } from '@/lib/issue/freeze';
import { hideCounts, INDEX_BASE } from '@/lib/issue/hide-counts';
import { openIssued } from '@/lib/issue/open';
import { finishRun } from '@/lib/scenario/answer-run';
import { findBreakEven } from '@/lib/scenario/find-break-even';
import { findLastUsefulMonth } from '@/lib/scenario/find-last-month';
import { findSmallestPush } from '@/lib/scenario/find-smallest-push';
import { mapChances } from '@/lib/scenario/map-chances';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { sampleBacktest } from '../brief/sample-backtest';
import { sampleIdentifiability } from '../brief/sample-identifiability';
import { makeSample } from '../brief/sample-report';
import { pushOf } from '../scenario/draw-cases';

const { facts, draws } = makeSample('coexistence');
const lastCount = facts.series.focal.at(-1)!;
const row = new Array<number>(24).fill(4e5);
const bands = { q05: row, q25: row, q50: row, q75: row, q95: row };
const whole: BriefFacts = {
  ...structuredClone(facts),
  leftOut: [{ month: facts.series.firstMonth + 3, focal: 210_000, rival: 64_000, reason: 'outage' }],
  backtest: sampleBacktest({
    combination: {
      weights: [],
      crps: 0.1,
      bestSingle: 'competition',
      bestSingleCrps: 0.2,
      isBetter: true,
      forecast: { focal: bands, rival: bands },
    },
  }),
  identifiability: sampleIdentifiability(),
};
whole.report.beliefs = {
  priors: {
    growth: { meanLog: Math.log(0.15), sdLog: 0.8 },
    saturation: { meanLog: 0.5, sdLog: 0.9 },
    alpha: { meanLog: 0, sdLog: 0.8 },
    beta: { meanLog: 0, sdLog: 0.8 },
    noCompetition: 0.2,
  },
  addressable: { focal: 900_000, rival: null, relativeError: 0.5 },
};

const prepared = prepareScenario(draws, { horizonMonths: 24, seed: 1 });
const rivals = { ...pushOf({ kind: 'recruits', size: 9000 }), spendPerMonth: 70_000 };
const counter = {
  ...pushOf({ firm: 1, kind: 'recruits', size: 9000 }),
  spendPerMonth: 50_000,
  response: { costPerRecruit: 4, mostPerMonth: 40_000 },
};
const money = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 2, rival: null },
  discountRatePerYear: 0.1,
  months: null,
};
const question = {
  target: { firm: 1 as const, share: 0.5, month: 24, chance: 0.8 },
  counter,
  pushes: [rivals],
};
const issued = freezeForecast({
  facts: whole,
  scenario: { name: 'They push', comparison: prepared.compare([rivals], money) },
  scenarios: [
    {
      name: 'We answer',
      comparison: prepared.compare([rivals, counter], money),
      answers: {
        smallestPush: finishRun(findSmallestPush(prepared, question)),
        lastUsefulMonth: finishRun(findLastUsefulMonth(prepared, question)),
        chanceMap: finishRun(mapChances(prepared, { ...question, sizes: [0, 9000], startMonths: [0, 12] })),
        breakEven: finishRun(findBreakEven(prepared, { push: counter, pushes: [rivals], money })),
      },
    },
  ],
  trialDraws: draws,
  issuedAt: '2026-01-08T23:30:00.000Z',
  issuedBy: 'Ada Berg',
});
const hidden = hideCounts(issued);

/** Every number with its path. */
function listNumbers(value: unknown, path = ''): [string, number][] {
  if (typeof value === 'number') return [[path, value]];
  if (value === null || typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, one]) => listNumbers(one, `${path}.${key}`));
}

/** Numbers that are months or counts of work, not users. */
const NOT_USERS =
  /[mM]onth|seed|evaluations|draws|drawsKept|\.ess$|iterations|count$|\.value$|conditionNumber/;

describe('a forecast whose counts are hidden', () => {
  it('still is an issued forecast of this format', () => {
    expect(issuedForecastSchema.parse(JSON.parse(JSON.stringify(hidden)))).toEqual(hidden);
  });

  it('holds no number of users as it was', () => {
    const big = (value: unknown) =>
      listNumbers(value).filter(([path, one]) => Math.abs(one) > 20 * INDEX_BASE && !NOT_USERS.test(path));
    // so the walk does find them where they are
    expect(big(issued).length).toBeGreaterThan(500);
    expect(big(hidden)).toEqual([]);
  });

  it('scales every number that it changes by one factor', () => {
    const before = new Map(listNumbers(issued));
    const factor = INDEX_BASE / lastCount;
    for (const [path, after] of listNumbers(hidden)) {
      const was = before.get(path)!;
      if (after === was) continue;
      // draws are rounded to six digits: 5e-6 of a number that starts with 1
      expect(Math.abs(after / (was * factor) - 1)).toBeLessThan(6e-6);
    }
  });

  it('puts the focal firm’s last count at the base and says so', () => {
    expect(hidden.series.focal.at(-1)).toBeCloseTo(INDEX_BASE, 9);
    expect(hidden.market.unit).toBe('index, Quillfern in December 2025 = 1000');
  });

  it('has neither money nor prices, which would give the counts away', () => {
    const text = JSON.stringify(hidden);
    for (const word of ['EUR', 'spendPerMonth', 'costPerRecruit', 'marginPerUserMonth', 'breakEven']) {
      expect(text).not.toContain(word);
    }
  });

  it('tells the same odds, shares and verdict', () => {
    const [open, closed] = [openIssued(issued), openIssued(hidden)];
    expect(closed.brief.where.odds.rows.map(({ percent }) => percent)).toEqual(
      open.brief.where.odds.rows.map(({ percent }) => percent),
    );
    expect(plainText(closed.brief.where.verdict.headline)).toBe(plainText(open.brief.where.verdict.headline));
    expect(closed.scenarios[0]!.push.sentences).toEqual(open.scenarios[0]!.push.sentences);
    expect(closed.brief.where.forecast.share.rows.map(({ points }) => points.share?.text)).toEqual(
      open.brief.where.forecast.share.rows.map(({ points }) => points.share?.text),
    );
  });

  it('lets readers push in index units and see the same shares', () => {
    const factor = INDEX_BASE / lastCount;
    const push = { ...pushOf({ kind: 'recruits', size: 9000 }) };
    const open = prepareScenario(issued.trial!.draws, issued.trial!).compare([push]);
    const closed = prepareScenario(hidden.trial!.draws, hidden.trial!).compare([
      { ...push, size: push.size * factor },
    ]);
    closed.difference.share.q50.forEach((value, h) => {
      expect(value).toBeCloseTo(open.difference.share.q50[h]!, 4);
    });
  });
});
