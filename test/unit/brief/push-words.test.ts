import { describe, expect, it } from 'vitest';
import { buildPushBrief } from '@/lib/brief/push-brief';
import { describePush, labelPushField, namePushes, spellPushField } from '@/lib/brief/push-words';
import { createWords } from '@/lib/brief/words';
import type { Push } from '@/lib/dynamics/push';
import type { ScenarioComparison, ScenarioEffect } from '@/lib/scenario/comparison';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { pushOf } from '../scenario/draw-cases';
import { factsOf, spaced } from './brief-cases';
import { makeSample } from './sample-report';

const facts = factsOf('coexistence');
const words = createWords(facts);

describe('a push in words', () => {
  const push = pushOf({
    kind: 'recruits',
    size: 7500,
    startMonth: 3,
    lengthMonths: 6,
    carryOverHalfLifeMonths: 3,
  });

  it('names firm, kind, size, months and fading', () => {
    expect(describePush(words, push)).toBe(
      'Marrowby: recruits, 7,500 a month from Mar 2026 for 6 months, then fading with a half-life of 3 months',
    );
    expect(spaced(describePush(words, pushOf({ firm: 1, size: 0.2, lengthMonths: null })))).toBe(
      'Quillfern: growth lift, +20 % from Feb 2026 for good',
    );
  });

  it('labels the controls and spells their values', () => {
    expect(labelPushField(words, 'startMonth', push)).toBe('Marrowby’s push starts');
    expect(labelPushField(words, 'size', push)).toBe('recruits per month');
    expect(spellPushField(words, 'size', push)).toBe('7,500');
    expect(spellPushField(words, 'lengthMonths', pushOf({ lengthMonths: 1 }))).toBe('1 month');
    expect(spellPushField(words, 'rampMonths', pushOf({ rampMonths: 0 }))).toBe('at once');
    expect(spellPushField(words, 'carryOverHalfLifeMonths', pushOf({ carryOverHalfLifeMonths: 0 }))).toBe(
      'none',
    );
  });

  it('names who pushes', () => {
    expect(namePushes(words, [])).toBe('No push');
    expect(namePushes(words, [push])).toBe('Marrowby’s push');
    expect(namePushes(words, [push, push])).toBe('2 pushes by Marrowby');
    expect(namePushes(words, [push, pushOf({ firm: 1 })])).toBe('2 pushes by Marrowby and Quillfern');
  });
});

const sample = makeSample('coexistence');
const scenario = prepareScenario(sample.draws, { horizonMonths: 24, seed: 1 });

/** A true comparison whose effect is overwritten, beside an outlook with the same odds where those are overwritten too. */
function say(effect: Partial<ScenarioEffect>, change: Partial<ScenarioComparison> = {}): string {
  const comparison = scenario.compare([pushOf()]);
  const outlook = { ...facts.report.outlook, odds: change.odds?.before ?? facts.report.outlook.odds };
  const told = { ...facts, report: { ...facts.report, outlook } };
  return spaced(
    buildPushBrief({ ...comparison, ...change, effect: { ...comparison.effect, ...effect } }, told).plain,
  );
}

describe('what a scenario does in sentences', () => {
  const worst = { monthsAhead: 10, q05: -0.06, q50: -0.04, q95: -0.02 };
  const temporary = {
    destination: 'stays',
    probabilityMoves: 0,
    reason: 'temporary-fades',
    isLasting: false,
    worstShareDifference: worst,
    backWithinHalfPointMonth: 42,
    returnHalfLifeMonths: { q05: 8, q50: 11, q95: 16 },
  } as const;

  it('a temporary push that fades: the verdict with its reason, then how far', () => {
    expect(say(temporary)).toBe(
      'It is virtually certain (>99 % of the draws) to move the path, not the destination: where no head start decides, ' +
        'a push that ends cannot change who is left, and what it wins fades with a half-life of 11 months (8 to 16). ' +
        'Quillfern’s share is 4 points lower at its worst (October 2026; 90 % interval \u22126 to \u22122 points) and back within half a point by June 2029.',
    );
  });

  it('says when the share does not come back in sight', () => {
    expect(say({ ...temporary, backWithinHalfPointMonth: null, followedMonths: 60 })).toContain(
      'and not back within half a point by December 2030',
    );
  });

  it('a gain of the focal firm is its best, not its worst', () => {
    const gain = { monthsAhead: 10, q05: 0.02, q50: 0.04, q95: 0.06 };
    expect(say({ ...temporary, worstShareDifference: gain })).toContain('4 points higher at its best');
  });

  it('a trifle', () => {
    const trifle = { monthsAhead: 10, q05: -0.006, q50: -0.004, q95: -0.002 };
    const text = say({ ...temporary, worstShareDifference: trifle });
    expect(text).toContain('to leave path and destination about as they are');
    expect(text).toContain('Quillfern’s share hardly moves: by less than half a point');
    expect(text).not.toContain('at its worst');
  });

  it('a head start that is not carried across', () => {
    const odds = { coexistence: 0.6, exclusionByFocal: 0.1, exclusionByRival: 0, headStartDecides: 0.3 };
    const text = say(
      { ...temporary, reason: 'temporary-same-side' },
      { odds: { before: odds, after: odds } },
    );
    expect(text).toContain(
      'to move the path, not the destination: the head start decides in 30 % of the draws',
    );
    expect(text).toContain('yet it carries the market across the tipping line in none of them');
  });

  it.each([
    [0.05, 'It is very unlikely (5 % of the draws) to move the destination'],
    [0.4, 'It is about as likely as not (40 % of the draws) to move the destination'],
    [0.8, 'It is likely (80 % of the draws) to move the destination'],
    [1, 'It is virtually certain (>99 % of the draws) to move the destination'],
  ])('a crossing in %d of the draws: who gains in the end comes last', (probabilityMoves, start) => {
    const destination = probabilityMoves > 0.66 ? 'moves' : 'may-move';
    const destinations = {
      before: { shared: 0, focalAlone: 0.95, rivalAlone: 0.05 },
      after: { shared: 0, focalAlone: 0.9, rivalAlone: 0.1 },
    };
    const text = say(
      { ...temporary, destination, probabilityMoves, reason: 'temporary-crosses' },
      { destinations },
    );
    expect(text.startsWith(`${start}: the head start decides in `)).toBe(true);
    expect(text).toMatch(
      /The chance that Marrowby is alone in the end, by exclusion or by head start, goes from 5 % to 10 %\.$/,
    );
    expect(text).not.toContain('not the destination');
    expect(text).not.toContain('back within');
  });

  it('names the end that gains, whichever it is', () => {
    const moves = {
      ...temporary,
      destination: 'moves',
      probabilityMoves: 0.9,
      reason: 'lasting-crosses',
    } as const;
    const before = { shared: 0.2, focalAlone: 0.4, rivalAlone: 0.4 };
    const gains = {
      'both firms stay goes': { shared: 0.8, focalAlone: 0.1, rivalAlone: 0.1 },
      'Quillfern is alone in the end': { shared: 0.1, focalAlone: 0.8, rivalAlone: 0.1 },
      'Marrowby is alone in the end': { shared: 0.1, focalAlone: 0.1, rivalAlone: 0.8 },
    };
    for (const [part, after] of Object.entries(gains)) {
      expect(say(moves, { destinations: { before, after } })).toContain(`The chance that ${part}`);
    }
  });

  it('a lasting push that moves where they settle', () => {
    const settled = { q05: -0.09, q50: -0.06, q95: -0.03 };
    const text = say({
      ...temporary,
      isLasting: true,
      reason: 'lasting-same-outcome',
      settledShareDifference: settled,
    });
    expect(text).toContain(
      'to move where they settle, not who is left: as long as it lasts, Quillfern’s share settles 6 points lower (90 % interval \u22129 to \u22123 points).',
    );
    expect(text).toContain('In December 2027 Quillfern’s share is');
    expect(text).not.toContain('fades');
  });

  it('no push', () => {
    expect(spaced(buildPushBrief(scenario.compare([]), facts).plain)).toBe(
      'Nothing is pushed: this is the forecast as it stands.',
    );
  });
});

describe('buildPushBrief', () => {
  const comparison = scenario.compare([pushOf()]);
  const brief = buildPushBrief(comparison, facts);

  it('has rows from the last observed month, where nothing differs yet, to the horizon', () => {
    for (const view of [brief.difference.users, brief.difference.share]) {
      expect(view.rows).toHaveLength(25);
      for (const point of Object.values(view.rows[0]!.points))
        expect(point).toMatchObject({ mid: 0, band90: [0, 0] });
      for (const row of view.rows) {
        for (const point of Object.values(row.points)) {
          expect(point.band90[0]).toBeGreaterThanOrEqual(view.domain[0]);
          expect(point.band90[1]).toBeLessThanOrEqual(view.domain[1]);
        }
      }
    }
    const last = facts.series.rival.at(-1)!;
    expect(brief.users[0]!.points.rival).toEqual({ baseline: last, pushed: last, band90: [last, last] });
    expect(brief.users[24]!.points.rival!.pushed).toBe(comparison.pushed.rival.q50[23]);
  });

  it('compares the odds with words that agree with the strip', () => {
    expect(brief.odds.map((row) => row.after)).toEqual(brief.odds.map((row) => row.before));
  });

  it('tells the difference at the checkpoints with its interval', () => {
    expect(brief.checkpoints.rows.map((row) => row[0])).toEqual([
      'Jun 2026 (6 months)',
      'Dec 2026 (12 months)',
      'Dec 2027 (24 months)',
    ]);
    expect(spaced(brief.checkpoints.rows[0]![3]!)).toMatch(
      /^\u2212[\d.]+ points \(\u2212[\d.]+ to \u2212[\d.]+ points\)$/,
    );
  });

  it('is plain JSON', () => {
    expect(JSON.parse(JSON.stringify(brief))).toEqual(brief);
  });

  it('never shows a number that is none, whatever the push', () => {
    const headStart = makeSample('headStartDecides');
    const prepared = prepareScenario(headStart.draws, { horizonMonths: 24, seed: 1 });
    const kinds: Push['kind'][] = ['recruits', 'growth-lift', 'pull', 'room'];
    for (const kind of kinds) {
      for (const lengthMonths of [6, null]) {
        for (const size of [0, 1e-6, 5]) {
          const all = JSON.stringify(
            buildPushBrief(prepared.compare([pushOf({ kind, size, lengthMonths })]), headStart.facts),
          );
          expect(all).not.toMatch(/NaN|Infinity|undefined|(?<!"tone":)null/);
          expect(all).not.toMatch(/"[\u2212-]0[^.,\d]/);
        }
      }
    }
  });
});
