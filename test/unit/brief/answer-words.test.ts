import { describe, expect, it } from 'vitest';
import { writeBreakEven, writeLastUsefulMonth, writeSmallestPush } from '@/lib/brief/answer-words';
import { buildChanceMapView } from '@/lib/brief/chance-map-view';
import { spellMoney, tabulateMoney, writeMoney } from '@/lib/brief/money-words';
import { buildSideBySide } from '@/lib/brief/side-by-side';
import { plainText } from '@/lib/brief/text';
import type { Sentence } from '@/lib/brief/types';
import { createWords } from '@/lib/brief/words';
import type { Reach, Target } from '@/lib/scenario/answers';
import type { FirmMoney, MoneyResult } from '@/lib/scenario/money';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { pushOf } from '../scenario/draw-cases';
import { factsOf, spaced } from './brief-cases';
import { makeSample } from './sample-report';

const facts = factsOf('coexistence');
const words = createWords(facts);
const say = (sentences: Sentence[]) => spaced(sentences.map(plainText).join(' '));

const target: Target = { firm: 1, share: 0.475, month: 24, chance: 0.8 };
const reach: Reach = { chance: 0.62, shareKept: 0.41 };
const push = pushOf({ firm: 1, kind: 'recruits', size: 3070 });

describe('the smallest counter-push in words', () => {
  it('names the push and what it keeps', () => {
    expect(say(writeSmallestPush(words, { code: 'found', target, push, reach }))).toBe(
      'Quillfern: recruits, 3,070 a month from Feb 2026 for 6 months, then fading with a half-life of 3 months. ' +
        'This is the smallest that keeps Quillfern’s share at 47.5 % or more in December 2027 with a chance of 80 %; with 2 % less the chance is below that.',
    );
  });

  it('names its price where it has one', () => {
    const bought = { ...push, spendPerMonth: 40_000 };
    expect(say(writeSmallestPush(words, { code: 'found', target, push: bought, reach }, 'EUR'))).toContain(
      'half-life of 3 months, 40,000 EUR a month. ',
    );
  });

  it('says that no size does, with the best that can be had', () => {
    expect(say(writeSmallestPush(words, { code: 'no-size-does', target, push, reach }))).toBe(
      'No size does it: even the largest looked at (Quillfern: recruits, 3,070 a month from Feb 2026 for 6 months, then fading with a half-life of 3 months) ' +
        'keeps Quillfern’s share at 47.5 % or more in December 2027 with a chance of only 62 %. ' +
        'The best that can be had with a chance of 80 % is a share of 41 % against Marrowby.',
    );
  });

  it('says that none is needed', () => {
    const text = say(
      writeSmallestPush(words, { code: 'not-needed', target, reach: { ...reach, chance: 0.9 } }),
    );
    expect(text).toContain('No counter-push is needed: without one the chance of keeping Quillfern’s share');
    expect(text).toContain('is 90 %, and 80 % was asked for.');
  });

  it('speaks of the rival’s target as the rival’s', () => {
    const text = say(
      writeSmallestPush(words, { code: 'no-size-does', target: { ...target, firm: 2 }, push, reach }),
    );
    expect(text).toContain('keeps Marrowby’s share at');
    expect(text).toContain('against Quillfern');
  });
});

describe('the last useful month in words', () => {
  it('names it', () => {
    const answer = { code: 'found', target, push, startMonth: 9, reach: { ...reach, chance: 0.83 } } as const;
    expect(say(writeLastUsefulMonth(words, answer))).toBe(
      'The last useful month to start is September 2026: Quillfern’s push then keeps Quillfern’s share at 47.5 % or more in December 2027 ' +
        'with a chance of 83 %; in any later month the chance is below 80 %.',
    );
  });

  it('names the best month when none does', () => {
    const text = say(
      writeLastUsefulMonth(words, { code: 'no-month-does', target, push, startMonth: 9, reach }),
    );
    expect(text).toContain(
      'No start month does it: Quillfern’s push does best when it starts in September 2026',
    );
    expect(text).toContain('a share of 41 %');
  });

  it('says that the push is not needed', () => {
    expect(say(writeLastUsefulMonth(words, { code: 'not-needed', target, push, reach }))).toContain(
      'The push is not needed',
    );
  });
});

const firm: FirmMoney = {
  spend: 120_000,
  gain: { q05: 100_000, q50: 180_000, q95: 260_000 },
  value: { q05: -20_000, q50: 60_000, q95: 140_000 },
  expectedValue: 61_234,
  chancePositive: 0.88,
  paybackMonths: { q05: 6, q50: 9, q95: 15 },
};
const money: MoneyResult = {
  assumed: {
    currency: 'EUR',
    marginPerUserMonth: { focal: 2, rival: null },
    discountRatePerYear: 0.1,
    months: 24,
  },
  months: 24,
  focal: firm,
  rival: null,
  focalAnswer: null,
};

describe('money in words', () => {
  it('shows no more digits than the interval supports', () => {
    expect(say(writeMoney(words, money))).toBe(
      'To Quillfern this is worth 60,000 EUR on average (90 % interval \u221220,000 to 140,000), after 120,000 EUR of spending; ' +
        'the chance that this is positive is 88 %. ' +
        'The money is back after 9 months (6 to 15), in the 88 % of the draws in which it comes back. ' +
        'Counted over 24 months, discounted at 10 % a year; what comes after is not counted.',
    );
  });

  it('tells our own pushes first where both firms push, and the rival’s side where its margin is known', () => {
    const text = say(writeMoney(words, { ...money, focalAnswer: firm, rival: firm }));
    expect(text).toMatch(/^With Marrowby’s pushes as they are, Quillfern’s own are worth 60,000 EUR/);
    expect(text).toContain('Against no push by either firm, all together are to Quillfern worth');
    expect(text).toContain('To Marrowby it is worth');
  });

  it('says when money does not come back, and nothing of it where none is spent', () => {
    const lost = { ...money, focal: { ...firm, paybackMonths: null } };
    expect(say(writeMoney(words, lost))).toContain('The money does not come back within the months counted.');
    const free = { ...money, focal: { ...firm, spend: 0, paybackMonths: null } };
    expect(say(writeMoney(words, free))).not.toMatch(/comes? back|spending/);
  });

  it('says a month as one', () => {
    const fast = { ...money, focal: { ...firm, paybackMonths: { q05: 1, q50: 1, q95: 1 } } };
    expect(say(writeMoney(words, fast))).toContain('back after 1 month, in');
  });

  it('keeps the currency as it was written', () => {
    expect(spaced(spellMoney(words, 1200, 'points of budget'))).toBe('1,200 points of budget');
  });
});

describe('break-even spend in words', () => {
  const asked = { push, money: money.assumed };

  it('names the spend, or that there is none', () => {
    const found = {
      ...asked,
      code: 'found',
      spendPerMonth: 41_000,
      interval: { q05: 30_000, q50: 41_000, q95: 55_000 },
    } as const;
    expect(say(writeBreakEven(words, found))).toBe(
      'On average Quillfern’s push brings back what it costs up to 41,000 EUR a month (90 % interval 30,000 to 55,000).',
    );
    expect(say(writeBreakEven(words, { ...asked, code: 'never-pays' }))).toMatch(/^It never pays/);
    expect(say(writeBreakEven(words, { ...asked, code: 'always-pays', spendPerMonth: 1e6 }))).toContain(
      'up to 1,000,000 EUR a month',
    );
  });
});

describe('the map of chances', () => {
  const map = {
    target,
    push,
    sizes: [0, 5000, 10_000],
    startMonths: [0, 6],
    chances: [
      [0.1, 0.1],
      [0.79, 0.796],
      [0.95, 1],
    ],
  };
  const view = buildChanceMapView(words, map);

  it('has the largest size on top and one cell per size and start', () => {
    expect(view.rows.map(({ label }) => label)).toEqual(['10,000', '5,000', '0']);
    expect(view.columns.map(({ label }) => label)).toEqual(['Dec 2025', 'Jun 2026']);
    expect(view.rows[0]!.cells.map(({ text }) => spaced(text))).toEqual(['95 %', '>99 %']);
    expect(spaced(view.rows[0]!.cells[1]!.label)).toBe('10,000 from Jun 2026: >99 %');
  });

  it('marks what meets the target, and lets nothing below read like it', () => {
    expect(view.rows.map(({ cells }) => cells.map((cell) => cell.meetsTarget))).toEqual([
      [true, true],
      [false, false],
      [false, false],
    ]);
    expect(spaced(view.rows[1]!.cells[1]!.text)).toBe('<80 %');
    expect(view.canBeMet).toBe(true);
  });

  it('says so when no cell does', () => {
    const none = buildChanceMapView(words, { ...map, chances: map.chances.map((row) => row.map(() => 0.2)) });
    expect(none.canBeMet).toBe(false);
    expect(plainText(none.caption)).toContain('No cell reaches');
  });

  it('has a table with raw numbers', () => {
    expect(view.table.raw[1]).toEqual([5000, 0.79, 0.796]);
    expect(view.table.rows[0]).toHaveLength(view.table.columns.length);
  });
});

describe('scenarios side by side', () => {
  const scenario = prepareScenario(makeSample('coexistence').draws, { horizonMonths: 24, seed: 1 });
  const assumed = money.assumed;
  const rivals = pushOf({ kind: 'recruits', size: 9000 });
  const named = [
    { name: 'They push', comparison: scenario.compare([rivals], assumed) },
    { name: 'We answer', comparison: scenario.compare([rivals, push], assumed) },
  ];
  const view = buildSideBySide(named, facts);

  it('has no push and each scenario as one line, on every month of the horizon', () => {
    expect(view.series).toEqual(['No push', 'They push', 'We answer']);
    for (const rows of Object.values(view.figures)) {
      expect(rows).toHaveLength(24);
      for (const { points } of rows) expect(points).toHaveLength(3);
    }
    expect(view.figures.share[11]!.points[1]!.mid).toBe(named[0]!.comparison.pushed.share.q50[11]);
    expect(view.figures.share[11]!.points[0]!.mid).toBe(named[0]!.comparison.baseline.share.q50[11]);
  });

  it('tells share, users, odds, destination and money in one table', () => {
    const labels = view.table.rows.map(([label]) => label!);
    expect(labels).toContain('Quillfern’s share, Dec 2026');
    expect(labels).toContain('Marrowby, Jun 2026');
    expect(labels).toContain('Chance that it moves the destination');
    expect(labels).toContain('Worth to Quillfern, on average');
    expect(labels.filter((label) => label.startsWith('Odds: '))).toHaveLength(4);
    for (const row of view.table.rows) expect(row).toHaveLength(view.table.columns.length);
    for (const row of view.table.rows) expect(row.join(' ')).not.toMatch(/NaN|undefined/);
  });

  it('leaves money out where none was assumed', () => {
    const free = buildSideBySide([{ name: 'A', comparison: scenario.compare([rivals]) }], facts);
    expect(free.table.rows.map(([label]) => label).join()).not.toContain('Worth');
    expect(tabulateMoney(words, [{ name: 'A', comparison: scenario.compare([rivals]) }]).rows).toEqual([]);
    expect(tabulateMoney(words, named).rows.map(([name]) => name)).toEqual([
      'They push',
      'We answer (own pushes)',
    ]);
  });

  it('refuses none, more than four, and scenarios of other draws', () => {
    const [one] = named;
    expect(() => buildSideBySide([], facts)).toThrow(/scenarios/);
    expect(() => buildSideBySide([one!, one!, one!, one!, one!], facts)).toThrow(/scenarios/);
    const other = { name: 'B', comparison: { ...one!.comparison, draws: 7 } };
    expect(() => buildSideBySide([one!, other], facts)).toThrow(/same draws/);
  });
});
