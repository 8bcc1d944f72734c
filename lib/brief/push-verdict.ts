/**
 * Destination or path in one sentence, with its probability and why. The destination is who is left in the end; the odds table counts
 * outcomes, which a lasting push may change without changing who is left, so the sentence names the end it speaks of.
 */
import type { Push } from '../dynamics/push';
import type { ScenarioComparison, ScenarioEffect } from '../scenario/comparison';
import { HALF_POINT, STAYS_BELOW } from '../scenario/effect';
import { wordProbability } from './probability-words';
import { alignOdds } from './push-odds';
import { possessive, run, sentence } from './text';
import type { Sentence } from './types';
import type { Words } from './words';

/** Subject and verbs for one push or several. */
interface Grammar {
  is: string;
  carries: string;
  wins: string;
  ends: string;
  changes: string;
  recruits: string;
  lasts: string;
}

const ONE: Grammar = {
  is: 'It is',
  carries: 'it carries',
  wins: 'what it wins',
  ends: 'a push that ends',
  changes: 'it changes',
  recruits: 'its recruits carry',
  lasts: 'as long as it lasts',
};
const MANY: Grammar = {
  is: 'Together they are',
  carries: 'they carry',
  wins: 'what they win',
  ends: 'pushes that end',
  changes: 'they change',
  recruits: 'their recruits carry',
  lasts: 'as long as they last',
};

export function writeDestinationOrPath(words: Words, comparison: ScenarioComparison): Sentence {
  const { effect, pushes } = comparison;
  if (effect.reason === 'no-push') return sentence('Nothing is pushed: this is the forecast as it stands.');
  const grammar = pushes.filter(isActive).length === 1 ? ONE : MANY;
  const why = explain(words, comparison, grammar);
  if (effect.destination === 'stays') {
    const stays = spellChance(words, 1 - effect.probabilityMoves);
    return sentence(`${grammar.is} ${stays} to `, run(nameStay(effect), 'both', true), `: ${why}.`);
  }
  return sentence(
    `${grammar.is} ${spellChance(words, effect.probabilityMoves)} to `,
    run('move the destination', 'headStart', true),
    `: ${why}.`,
  );
}

/** What is moved when the destination is not. */
function nameStay({ isLasting, settledShareDifference, worstShareDifference }: ScenarioEffect): string {
  if (isLasting) {
    return isHardlyMoved(settledShareDifference)
      ? 'leave the destination as it is'
      : 'move where they settle, not who is left';
  }
  return isHardlyMoved(worstShareDifference)
    ? 'leave path and destination about as they are'
    : 'move the path, not the destination';
}

function isHardlyMoved({ q50 }: { q50: number }): boolean {
  return Math.abs(q50) <= HALF_POINT;
}

function isActive(push: Push): boolean {
  return push.size > 0;
}

/** "very likely (95 % of the draws)". */
function spellChance(words: Words, probability: number): string {
  return `${wordProbability(probability)} (${words.numbers.chance(probability)} of the draws)`;
}

function explain(words: Words, comparison: ScenarioComparison, grammar: Grammar): string {
  const headStart = alignOdds(words.facts.report.outlook.odds, comparison.odds).before.headStartDecides;
  const decides = `the head start decides in ${words.numbers.chance(headStart)} of the draws`;
  switch (comparison.effect.reason) {
    case 'no-push':
      throw new RangeError('comparison must hold a push to be explained');
    case 'temporary-fades':
      return `where no head start decides, ${grammar.ends} cannot change who is left, and ${fading(words, comparison, grammar)}`;
    case 'temporary-same-side':
      return `${decides}, yet ${grammar.carries} the market across the tipping line in ${countCrossed(words, comparison)}, and ${fading(words, comparison, grammar)}`;
    case 'temporary-crosses':
      return `${decides}, and in ${countCrossed(words, comparison)} ${grammar.carries} the market across the tipping line; elsewhere ${fading(words, comparison, grammar)}`;
    case 'lasting-crosses':
      return explainLastingMove(comparison, grammar);
    case 'lasting-same-outcome':
      return explainLastingStay(words, comparison, grammar);
  }
}

/** "in none of them", "in 40 % of them": of the draws in which the head start decides. */
function countCrossed(words: Words, { crossing, effect }: ScenarioComparison): string {
  if (crossing && crossing.draws > 0) {
    return crossing.crossed === 0
      ? 'none of them'
      : `${words.numbers.chance(crossing.crossed / crossing.draws)} of them`;
  }
  return effect.probabilityMoves > 0
    ? `${words.numbers.chance(effect.probabilityMoves)} of all draws`
    : 'none of them';
}

/** "what it wins fades, half of it every 11 months (8 to 16)". */
function fading(words: Words, { effect }: ScenarioComparison, { wins }: Grammar): string {
  const halfLife = effect.returnHalfLifeMonths;
  if (!halfLife) return `${wins} fades`;
  const { numbers } = words;
  return `${wins} fades with a half-life of ${numbers.number(halfLife.q50, halfLife)} months (${numbers.numberInterval(halfLife)})`;
}

function explainLastingMove({ pushes }: ScenarioComparison, grammar: Grammar): string {
  const isRecruitsOnly = pushes.filter(isActive).every(({ kind }) => kind === 'recruits');
  const how = isRecruitsOnly
    ? `${grammar.recruits} the market across the tipping line`
    : `${grammar.changes} how much room the firms take from each other, which decides who is left`;
  return `${grammar.lasts}, ${how}`;
}

function explainLastingStay(words: Words, comparison: ScenarioComparison, { lasts }: Grammar): string {
  const { settledShareDifference: settled } = comparison.effect;
  if (isHardlyMoved(settled)) {
    return `${possessive(words.focal)} share settles within half a point of where it would anyway${namedChange(comparison)}`;
  }
  const size = words.numbers.pointsSize(settled.q50, settled);
  const side = settled.q50 < 0 ? 'lower' : 'higher';
  return (
    `${lasts}, ${possessive(words.focal)} share settles ${size} ${side} ` +
    `(90\u00a0% interval ${words.numbers.pointsInterval(settled)})${namedChange(comparison)}`
  );
}

/** Says why the odds table moves all the same. */
function namedChange({ odds: { before, after } }: ScenarioComparison): string {
  const isMoved = (Object.keys(before) as (keyof typeof before)[]).some(
    (outcome) => Math.abs(after[outcome] - before[outcome]) >= STAYS_BELOW,
  );
  return isMoved ? '; the odds change because other outcomes lead to the same end' : '';
}
