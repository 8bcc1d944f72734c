/** A push and its controls in words, and what a scenario does in sentences: destination or path, how far, when it is over, and why. */
import type { Push, PushKind } from '../dynamics/push';
import type { Interval } from '../forecast/report';
import type { ScenarioComparison } from '../scenario/comparison';
import { HALF_POINT } from '../scenario/effect';
import { wordProbability } from './probability-words';
import { possessive, run, sentence } from './text';
import type { Sentence } from './types';
import { type FirmRole, intervalAt, otherFirm, type Words } from './words';

export type PushField = 'startMonth' | 'lengthMonths' | 'size' | 'rampMonths' | 'carryOverHalfLifeMonths';

const KIND_NAMES: Record<PushKind, string> = {
  recruits: 'recruits',
  'growth-lift': 'growth lift',
  pull: 'pull on the other’s room',
  room: 'more room of its own',
};

export function nameKind(kind: PushKind): string {
  return KIND_NAMES[kind];
}

export function firmOfPush(push: Pick<Push, 'firm'>): FirmRole {
  return push.firm === 1 ? 'focal' : 'rival';
}

/** Label of a control. */
export function labelPushField(words: Words, field: PushField, push: Push): string {
  switch (field) {
    case 'startMonth':
      return `${possessive(words.name(firmOfPush(push)))} push starts`;
    case 'lengthMonths':
      return 'lasts';
    case 'size':
      return push.kind === 'recruits' ? 'recruits per month' : nameKind(push.kind);
    case 'rampMonths':
      return 'ramp-in';
    case 'carryOverHalfLifeMonths':
      return 'carry-over half-life';
  }
}

/** Value of a control: "Mar 2026", "6 months", "for good", "7,500", "+20 %". */
export function spellPushField(words: Words, field: PushField, push: Push): string {
  switch (field) {
    case 'startMonth':
      return words.months.short(words.lastMonth + Math.round(push.startMonth));
    case 'lengthMonths':
      return push.lengthMonths === null ? 'for good' : spellMonths(words, push.lengthMonths);
    case 'size':
      return spellSize(words, push);
    case 'rampMonths':
      return push.rampMonths === 0 ? 'at once' : spellMonths(words, push.rampMonths);
    case 'carryOverHalfLifeMonths':
      return push.carryOverHalfLifeMonths === 0 ? 'none' : spellMonths(words, push.carryOverHalfLifeMonths);
  }
}

/** "Marrowby: recruits, 7,500 a month from Mar 2026 for 6 months, then fading with a half-life of 3 months". */
export function describePush(words: Words, push: Push): string {
  const size = push.kind === 'recruits' ? `${spellSize(words, push)} a month` : spellSize(words, push);
  const start = words.months.short(words.lastMonth + Math.round(push.startMonth));
  const length = push.lengthMonths === null ? 'for good' : `for ${spellMonths(words, push.lengthMonths)}`;
  const fades = push.lengthMonths !== null && push.carryOverHalfLifeMonths > 0;
  const fading = fades
    ? `, then fading with a half-life of ${spellMonths(words, push.carryOverHalfLifeMonths)}`
    : '';
  return `${words.name(firmOfPush(push))}: ${nameKind(push.kind)}, ${size} from ${start} ${length}${fading}`;
}

function spellSize(words: Words, push: Push): string {
  return push.kind === 'recruits' ? words.numbers.number(push.size) : `+${words.numbers.percent(push.size)}`;
}

function spellMonths(words: Words, months: number): string {
  return `${words.numbers.number(months)} ${months === 1 ? 'month' : 'months'}`;
}

/** The answer in two or three sentences, the first one the verdict on destination or path. */
export function writeEffect(words: Words, comparison: ScenarioComparison): Sentence[] {
  const { effect } = comparison;
  if (effect.reason === 'no-push') return [sentence('Nothing is pushed: this is the forecast as it stands.')];
  const path = writePath(words, comparison);
  if (effect.destination !== 'stays') return [destinationSentence(words, comparison), path];
  if (effect.isLasting) return [lastingSentence(words, effect.settledShareDifference), path];
  if (isHardlyMoved(effect.worstShareDifference)) return [path, reasonSentence(words, comparison)];
  const verdict = sentence('It moves the ', run('path, not the destination', 'both', true), '.');
  return [verdict, path, reasonSentence(words, comparison)];
}

/** How far the share is moved on the way: at its worst or best, or for a lasting push at the end of the horizon. */
export function writePath(words: Words, comparison: ScenarioComparison): Sentence {
  return comparison.effect.isLasting ? horizonSentence(words, comparison) : worstSentence(words, comparison);
}

function isHardlyMoved({ q50 }: { q50: number }): boolean {
  return Math.abs(q50) <= HALF_POINT;
}

/** "It is very unlikely (5 % of the draws) to move the destination by carrying the market across the tipping line. ..." */
function destinationSentence(words: Words, comparison: ScenarioComparison): Sentence {
  const { probabilityMoves, reason } = comparison.effect;
  const how = reason === 'temporary-crosses' ? ', by carrying the market across the tipping line' : '';
  return sentence(
    `It is ${wordProbability(probabilityMoves)} (${words.numbers.chance(probabilityMoves)} of the draws) to `,
    run('move the destination', 'headStart', true),
    `${how}: ${biggestGain(words, comparison)}`,
  );
}

/** Who gains most at the destination. */
function biggestGain(words: Words, { destinations: { before, after } }: ScenarioComparison): string {
  const names = {
    shared: 'both firms staying',
    focalAlone: `${words.focal} alone`,
    rivalAlone: `${words.rival} alone`,
  };
  const keys = ['shared', 'focalAlone', 'rivalAlone'] as const;
  const key = keys.reduce((best, one) =>
    after[one] - before[one] > after[best] - before[best] ? one : best,
  );
  return `${names[key]} goes from ${words.numbers.chance(before[key])} to ${words.numbers.chance(after[key])}.`;
}

function lastingSentence(words: Words, settled: Interval): Sentence {
  if (isHardlyMoved(settled)) {
    return sentence(
      'It changes neither who stays nor, by more than half a point, ',
      run('where they settle', 'both', true),
      '.',
    );
  }
  return sentence(
    'It moves ',
    run('where they settle, not who stays', 'both', true),
    `: as long as it lasts, ${possessive(words.focal)} share settles ${spellChange(words, settled)} ` +
      `(90\u00a0% interval ${words.numbers.pointsInterval(settled)}).`,
  );
}

/** "Quillfern’s share is 4 points lower at its worst (October 2026) and back within half a point by June 2029." */
function worstSentence(words: Words, comparison: ScenarioComparison): Sentence {
  const { worstShareDifference: worst, backWithinHalfPointMonth, destination } = comparison.effect;
  if (isHardlyMoved(worst)) return hardlyMovedSentence(words);
  const month = words.months.long(words.lastMonth + worst.monthsAhead);
  const peak = worst.q50 < 0 ? 'at its worst' : 'at its best';
  const interval = `90\u00a0% interval ${words.numbers.pointsInterval(worst)}`;
  const back = destination === 'stays' ? backClause(words, comparison, backWithinHalfPointMonth) : '';
  return sentence(
    `${possessive(words.focal)} share is ${spellChange(words, worst)} ${peak} (${month}; ${interval})${back}.`,
  );
}

/** Where a lasting push has brought the share by the end of the horizon. */
function horizonSentence(words: Words, { difference, horizonMonths }: ScenarioComparison): Sentence {
  const at = intervalAt(difference.share, horizonMonths - 1);
  if (isHardlyMoved(at)) return hardlyMovedSentence(words);
  const month = words.months.long(words.lastMonth + horizonMonths);
  return sentence(
    `In ${month} ${possessive(words.focal)} share is ${spellChange(words, at)} ` +
      `(90\u00a0% interval ${words.numbers.pointsInterval(at)}).`,
  );
}

function hardlyMovedSentence(words: Words): Sentence {
  return sentence(
    `${possessive(words.focal)} share hardly moves: by less than half a point in the middle of the draws.`,
  );
}

/** "4 points lower". */
function spellChange(words: Words, change: Interval): string {
  return `${words.numbers.pointsSize(change.q50, change)} ${change.q50 < 0 ? 'lower' : 'higher'}`;
}

function backClause(words: Words, { effect }: ScenarioComparison, month: number | null): string {
  if (month !== null) return ` and back within half a point by ${words.months.long(words.lastMonth + month)}`;
  return ` and not back within half a point by ${words.months.long(words.lastMonth + effect.followedMonths)}`;
}

function reasonSentence(words: Words, { effect, odds }: ScenarioComparison): Sentence {
  if (effect.reason === 'temporary-same-side') {
    const crossing =
      effect.probabilityMoves > 0 ? 'in fewer than 1\u00a0% of the draws' : 'in none of the draws';
    return sentence(
      `The head start decides in ${words.numbers.chance(odds.before.headStartDecides)} of the draws, ` +
        `but this push carries the market across the tipping line ${crossing}.`,
    );
  }
  const halfLife = effect.returnHalfLifeMonths;
  const fade = halfLife
    ? `: near the destination half of a gain is gone after ${words.numbers.number(halfLife.q50, halfLife)} months (${words.numbers.numberInterval(halfLife)})`
    : '';
  return sentence(`The push ends, and what it wins fades${fade}.`);
}

/** Who pushes, for headings: "Marrowby’s push", "2 pushes by Quillfern and Marrowby". */
export function namePushes(words: Words, pushes: readonly Push[]): string {
  if (pushes.length === 0) return 'No push';
  const firms = [...new Set(pushes.map(firmOfPush))];
  if (pushes.length === 1) return `${possessive(words.name(firms[0]!))} push`;
  const names =
    firms.length === 1
      ? words.name(firms[0]!)
      : `${words.name(firms[0]!)} and ${words.name(otherFirm(firms[0]!))}`;
  return `${pushes.length} pushes by ${names}`;
}
