import { describe, expect, it } from 'vitest';
import { buildPhaseMap } from '@/lib/brief/phase-map';
import { describeKind, describeStartingPoint } from '@/lib/brief/push-kind-words';
import { buildPushPath } from '@/lib/brief/push-path';
import { writeDestinationOrPath } from '@/lib/brief/push-verdict';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import type { Push } from '@/lib/dynamics/push';
import type { ScenarioComparison } from '@/lib/scenario/comparison';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import { PUSH_KINDS } from '@/lib/scenario/push-bounds';
import { STARTING_POINTS } from '@/lib/scenario/starting-points';
import { drawSetOf, HEAD_START, pushOf } from '../scenario/draw-cases';
import { factsOf, factsWith, oddsOf, spaced } from './brief-cases';
import { makeSample, type SampleName } from './sample-report';

const scenarioOf = (name: SampleName) =>
  prepareScenario(makeSample(name).draws, { horizonMonths: 24, seed: 1 });
const coexistence = scenarioOf('coexistence');
const undecided = scenarioOf('undecided');

function say(name: SampleName, comparison: ScenarioComparison): string {
  return spaced(plainText(writeDestinationOrPath(createWords(factsOf(name)), comparison)));
}

describe('destination or path in one sentence', () => {
  it('says nothing is pushed when nothing is', () => {
    expect(say('coexistence', coexistence.compare([pushOf({ size: 0 })]))).toBe(
      'Nothing is pushed: this is the forecast as it stands.',
    );
  });

  it('a temporary push with no head start fades, with this half-life', () => {
    const comparison = coexistence.compare([pushOf()]);
    const text = say('coexistence', {
      ...comparison,
      effect: { ...comparison.effect, returnHalfLifeMonths: { q05: 8, q50: 11, q95: 16 } },
    });
    expect(text).toBe(
      'It is virtually certain (>99 % of the draws) to move the path, not the destination: where no head start decides, ' +
        'a push that ends cannot change who is left, and what it wins fades with a half-life of 11 months (8 to 16).',
    );
  });

  it('a temporary push that crosses says in how many of the draws that the head start decides', () => {
    const comparison = undecided.compare([pushOf({ kind: 'recruits', size: 20_000, lengthMonths: 12 })]);
    expect(comparison.effect.reason).toBe('temporary-crosses');
    const text = say('undecided', { ...comparison, crossing: { draws: 100, crossed: 38 } });
    expect(text).toContain('to move the destination: the head start decides in ');
    expect(text).toContain('and in 38 % of them it carries the market across the tipping line; elsewhere');
    expect(text).toContain('half-life');
  });

  it('says how many draws cross by the count of all draws where crossings were not counted', () => {
    const { crossing: _, ...comparison } = undecided.compare([
      pushOf({ kind: 'recruits', size: 20_000, lengthMonths: 12 }),
    ]);
    expect(say('undecided', comparison)).toContain('of all draws it carries');
  });

  it('a temporary push that stays on its side says so', () => {
    const comparison = undecided.compare([pushOf({ kind: 'recruits', size: 1 })]);
    const text = say('undecided', comparison);
    expect(text).toContain('to leave path and destination about as they are: the head start decides in');
    expect(text).toContain('carries the market across the tipping line in none of them');
  });

  it('a lasting push that moves who is left says that room decides it', () => {
    const comparison = coexistence.compare([pushOf({ size: 0.5, lengthMonths: null })]);
    const { before, after } = comparison.destinations;
    const text = say('coexistence', comparison);
    expect(after.rivalAlone).toBeGreaterThan(before.rivalAlone);
    expect(text).toContain(
      'move the destination: as long as it lasts, it changes how much room the firms take from each other',
    );
  });

  it('a lasting push that moves only the levels says where the share settles', () => {
    const comparison = coexistence.compare([pushOf({ kind: 'recruits', size: 3000, lengthMonths: null })]);
    expect(comparison.effect.reason).toBe('lasting-same-outcome');
    expect(say('coexistence', comparison)).toMatch(
      /to move where they settle, not who is left: as long as it lasts, Quillfern’s share settles \d+ points lower \(90 % interval/,
    );
  });

  it('a lasting push that hardly moves anything says so', () => {
    const text = say('coexistence', coexistence.compare([pushOf({ size: 0.001, lengthMonths: null })]));
    expect(text).toContain(
      'to leave the destination as it is: Quillfern’s share settles within half a point',
    );
  });

  it('never leaves moved odds without a word when who is left stays', () => {
    const comparison = coexistence.compare([pushOf({ kind: 'recruits', size: 3000, lengthMonths: null })]);
    const odds = { before: oddsOf(0.2, 0.7, 0.05, 0.05), after: oddsOf(0.2, 0.5, 0.05, 0.25) };
    const facts = factsWith('coexistence', { odds: odds.before });
    const text = plainText(writeDestinationOrPath(createWords(facts), { ...comparison, odds }));
    expect(text).toContain('the odds change because other outcomes lead to the same end');
    expect(say('coexistence', comparison)).not.toContain('the odds change');
  });

  it('speaks of several pushes as several', () => {
    const lasting = [pushOf({ size: 0.5, lengthMonths: null }), pushOf({ firm: 1, lengthMonths: null })];
    expect(say('coexistence', coexistence.compare(lasting))).toMatch(
      /^Together they are .* as long as they last/,
    );
    const idle = [pushOf(), pushOf({ firm: 1, size: 0 })];
    expect(say('coexistence', coexistence.compare(idle))).toMatch(/^It is /);
  });

  it('never shows a number that is none, and always has a probability and a reason', () => {
    for (const name of ['coexistence', 'undecided'] as const) {
      const scenario = name === 'coexistence' ? coexistence : undecided;
      for (const kind of PUSH_KINDS) {
        for (const lengthMonths of [0, 6, null]) {
          for (const firm of [1, 2] as const) {
            const size = kind === 'recruits' ? 9000 : 0.4;
            const text = say(name, scenario.compare([pushOf({ firm, kind, lengthMonths, size })]));
            expect(text).not.toMatch(/NaN|undefined|Infinity|null/);
            expect(text).toMatch(/^It is [a-z ]+ \([<>]?\d+ % of the draws\) to .*: .*\.$/);
          }
        }
      }
    }
  });
});

describe('kinds of push in words', () => {
  const words = createWords(factsOf('coexistence'));

  it.each(PUSH_KINDS)('%s: names both firms by their part, and what stays fixed', (kind) => {
    const one = describeKind(words, pushOf({ firm: 1, kind, size: kind === 'recruits' ? 7500 : 0.2 }));
    const two = describeKind(words, pushOf({ firm: 2, kind, size: kind === 'recruits' ? 7500 : 0.2 }));
    const swap = (text: string) =>
      text.replace(/Quillfern|Marrowby/g, (name) => (name === 'Quillfern' ? 'Marrowby' : 'Quillfern'));
    expect({ name: swap(two.name), does: swap(two.does), fixed: swap(two.fixed) }).toEqual(one);
    expect(spaced(one.does)).toContain(kind === 'recruits' ? '7,500' : '20 %');
    expect(one.fixed).toMatch(/^(Fixed:|No coefficient changes)/);
  });

  it('says of each starting point what its values rest on', () => {
    const told = STARTING_POINTS.map((id) => describeStartingPoint({ id, basis: 'starting-value' }));
    expect(new Set(told.map(({ name }) => name)).size).toBe(STARTING_POINTS.length);
    for (const { note } of told) expect(note).toContain('places to start from');
    expect(describeStartingPoint({ id: 'advertising-burst', basis: 'common-practice' }).note).toContain(
      'common practice',
    );
  });
});

describe('the pushed path on the phase map', () => {
  const words = createWords(factsOf('coexistence'));
  const map = buildPhaseMap(words);

  it('starts where the path without a push starts, and leaves it', () => {
    const push = pushOf({ kind: 'recruits', size: 3000, startMonth: 0 });
    const pushed = buildPushPath(words, map, [push]);
    const without = buildPushPath(words, map, []);
    expect(pushed.points[0]).toEqual(without.points[0]);
    expect(pushed.points[6]!.point[1]).toBeGreaterThan(without.points[6]!.point[1]);
    expect(pushed.points[1]!.month).toBe(words.lastMonth + 1);
  });

  it('stays inside the map', () => {
    const { points } = buildPushPath(words, map, [pushOf({ kind: 'recruits', size: 1e6 })]);
    for (const { point } of points) {
      expect(point[0]).toBeLessThanOrEqual(map.domain.x[1]);
      expect(point[1]).toBeLessThanOrEqual(map.domain.y[1]);
    }
  });

  it('has no line to cross where the head start does not decide', () => {
    expect(buildPushPath(words, map, [pushOf()])).toMatchObject({ hasCrossed: null });
  });

  it('crosses the tipping line where a pulse carries it over', () => {
    const facts = factsOf('coexistence');
    const { n1, n2, ...system } = HEAD_START;
    facts.report.point = { ...facts.report.point, ...system, n1Last: n1, n2Last: n2 };
    facts.report.outlook = { ...facts.report.outlook, odds: oddsOf(0, 0, 0, 1) };
    const tipping = createWords(facts);
    const pulse = (size: number): Push =>
      pushOf({ kind: 'recruits', size, startMonth: 0, rampMonths: 0, carryOverHalfLifeMonths: 0 });
    const frame = { domain: { x: [0, 2000] as [number, number], y: [0, 2000] as [number, number] } };
    expect(buildPushPath(tipping, frame, [pulse(1)]).hasCrossed).toBe(false);
    expect(buildPushPath(tipping, frame, [pulse(60)]).hasCrossed).toBe(true);
    const { crossing } = prepareScenario(drawSetOf([HEAD_START]), { horizonMonths: 24, seed: 1 }).compare([
      pulse(60),
    ]);
    expect(crossing).toEqual({ draws: 1, crossed: 1 });
  });
});
