import { describe, expect, it } from 'vitest';
import { plainText } from '@/lib/brief/text';
import { freezeForecast } from '@/lib/issue/freeze';
import { listScenarios, openIssued } from '@/lib/issue/open';
import { readIssuedForecast } from '@/lib/issue/read';
import { finishRun } from '@/lib/scenario/answer-run';
import type { Answers } from '@/lib/scenario/answers';
import { compareScenario } from '@/lib/scenario/compare';
import { findBreakEven } from '@/lib/scenario/find-break-even';
import { findLastUsefulMonth } from '@/lib/scenario/find-last-month';
import { findSmallestPush } from '@/lib/scenario/find-smallest-push';
import { mapChances } from '@/lib/scenario/map-chances';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { scaleDraws, takeTrialDraws } from '@/lib/scenario/trial-draws';
import { pushOf } from '../scenario/draw-cases';
import { comparison, issuedOf, sample } from './issued-cases';

const OPTIONS = { horizonMonths: 36, seed: 1 };
const prepared = prepareScenario(sample.draws, OPTIONS);
const rivals = pushOf({ kind: 'recruits', size: 9000, lengthMonths: 12 });
const counter = { ...pushOf({ firm: 1, kind: 'recruits', size: 9000 }), spendPerMonth: 50_000 };
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
const answers: Answers = {
  smallestPush: finishRun(findSmallestPush(prepared, question)),
  lastUsefulMonth: finishRun(findLastUsefulMonth(prepared, question)),
  chanceMap: finishRun(mapChances(prepared, { ...question, sizes: [0, 9000], startMonths: [0, 12] })),
  breakEven: finishRun(findBreakEven(prepared, { push: counter, pushes: [rivals], money })),
};

const issued = freezeForecast({
  facts: structuredClone(sample.facts),
  scenario: null,
  scenarios: [
    { name: 'They push', comparison: prepared.compare([rivals], money) },
    { name: 'We answer', comparison: prepared.compare([rivals, counter], money), answers },
  ],
  trialDraws: sample.draws,
  issuedAt: '2026-01-08T23:30:00.000Z',
  issuedBy: 'Ada Berg',
});

function reread(value: unknown) {
  const reading = readIssuedForecast(JSON.parse(JSON.stringify(value)));
  if (!reading.ok) throw new Error(reading.code);
  return reading.value;
}

describe('a forecast issued with several scenarios', () => {
  it('comes back from storage as it was frozen', () => {
    expect(reread(issued)).toEqual(issued);
    expect(issued.scenarios!.map(({ name }) => name)).toEqual(['They push', 'We answer']);
  });

  it('opens with every scenario, its effect, money and answers, and side by side', () => {
    const { scenarios, scenario, sideBySide, brief } = openIssued(reread(issued));
    expect(scenario).toEqual(scenarios[0]);
    expect(sideBySide!.series).toEqual(['No push', 'They push', 'We answer']);
    const [they, we] = scenarios;
    expect(plainText(they!.push.sentences[0]!)).toContain('path, not the destination');
    expect(they!.answers).toEqual({ smallestPush: [], lastUsefulMonth: [], breakEven: [], chanceMap: null });
    expect(we!.pushes).toHaveLength(2);
    expect(we!.money.map(plainText).join(' ')).toContain('EUR');
    expect(we!.answers.smallestPush.length).toBeGreaterThan(0);
    expect(we!.answers.lastUsefulMonth.length).toBeGreaterThan(0);
    expect(we!.answers.breakEven.map(plainText).join(' ')).toContain('EUR a month');
    expect(we!.answers.chanceMap!.rows).toHaveLength(2);
    expect(brief.cautions.map(({ id }) => id)).toContain('competition-law');
  });

  it('refuses more than four scenarios', () => {
    const many = Array.from({ length: 5 }, (_, i) => ({ name: `S${i}`, comparison }));
    expect(() =>
      freezeForecast({
        facts: sample.facts,
        scenario: null,
        scenarios: many,
        issuedAt: issued.issuedAt,
        issuedBy: 'Ada',
      }),
    ).toThrow();
  });
});

describe('a forecast issued before there were several scenarios', () => {
  it('still reads, and opens with its one scenario, nothing to try and nothing side by side', () => {
    const old = JSON.parse(JSON.stringify(issuedOf(true)));
    for (const key of ['scenarios', 'trial']) expect(old).not.toHaveProperty(key);
    delete old.scenario.comparison.crossing;
    const value = reread(old);
    const opened = openIssued(value);
    expect(listScenarios(value)).toHaveLength(1);
    expect(opened.scenarios.map(({ name }) => name)).toEqual(['Their autumn campaign']);
    expect(opened).toMatchObject({ trial: null, sideBySide: null });
    expect(opened.scenarios[0]!.money).toEqual([]);
  });
});

describe('draws for readers of a link', () => {
  const trial = reread(issued).trial!;

  it('are thinned and hold what a scenario needs, no more', () => {
    expect(trial.draws.count).toBeLessThanOrEqual(400);
    expect(trial.draws.columns).not.toContain('n1Start');
    // kilobytes of JSON; a link must open on a phone
    expect(JSON.stringify(trial).length / 1000).toBeLessThan(120);
  });

  it('answer a push as the draws themselves do, to the digits that are kept', () => {
    const own = prepareScenario(trial.draws, trial).compare([rivals]);
    const full = compareScenario({ ...sample.draws, ...takeFirst() }, [rivals], trial);
    own.difference.share.q50.forEach((value, h) => {
      // six digits of the draws: a millionth; medians of the same draws
      expect(value).toBeCloseTo(full.difference.share.q50[h]!, 4);
    });
  });

  it('are absent when the issuer does not let readers move anything', () => {
    expect(reread(issuedOf(true)).trial).toBeUndefined();
  });

  it('can be scaled: users change with the factor, shares, odds and destinations do not', () => {
    const factor = 100 / 310_000;
    const plain = prepareScenario(trial.draws, trial).compare([rivals]);
    const scaled = prepareScenario(scaleDraws(trial.draws, factor), trial).compare([
      { ...rivals, size: rivals.size * factor },
    ]);
    expect(scaled.odds).toEqual(plain.odds);
    scaled.pushed.share.q50.forEach((value, h) => {
      expect(value).toBeCloseTo(plain.pushed.share.q50[h]!, 4);
    });
    const ratio = scaled.pushed.rival.q95[35]! / plain.pushed.rival.q95[35]!;
    expect(ratio / factor).toBeCloseTo(1, 4);
  });
});

/** The very draws that were thinned, at full precision. */
function takeFirst() {
  const thin = takeTrialDraws(sample.draws);
  const stride = sample.draws.count / thin.count;
  const width = sample.draws.columns.length;
  const values = Array.from({ length: thin.count }, (_, i) => {
    const from = Math.floor(i * stride) * width;
    return Array.from(sample.draws.values.slice(from, from + width));
  }).flat();
  return { count: thin.count, values };
}
