/** What a scenario does in two or three sentences: the verdict on destination or path, how far the share is moved on the way, who gains. */
import type { Interval } from '../forecast/report';
import type { ScenarioComparison } from '../scenario/comparison';
import { HALF_POINT } from '../scenario/effect';
import { writeDestinationOrPath } from './push-verdict';
import { possessive, sentence } from './text';
import type { Sentence } from './types';
import { intervalAt, type Words } from './words';

export function writeEffect(words: Words, comparison: ScenarioComparison): Sentence[] {
  const { effect } = comparison;
  const verdict = writeDestinationOrPath(words, comparison);
  if (effect.reason === 'no-push') return [verdict];
  const path = effect.isLasting ? horizonSentence(words, comparison) : worstSentence(words, comparison);
  if (effect.destination === 'stays') return [verdict, path];
  return [verdict, path, gainSentence(words, comparison.destinations)];
}

/** Who gains most in the end, by whichever outcome it comes about: the odds count outcomes, this counts ends. */
function gainSentence(words: Words, { before, after }: ScenarioComparison['destinations']): Sentence {
  const names = {
    shared: 'both firms stay',
    focalAlone: `${words.focal} is alone in the end, by exclusion or by head start,`,
    rivalAlone: `${words.rival} is alone in the end, by exclusion or by head start,`,
  };
  const keys = ['shared', 'focalAlone', 'rivalAlone'] as const;
  const key = keys.reduce((best, one) =>
    after[one] - before[one] > after[best] - before[best] ? one : best,
  );
  return sentence(
    `The chance that ${names[key]} goes from ${words.numbers.chance(before[key])} to ${words.numbers.chance(after[key])}.`,
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

function isHardlyMoved({ q50 }: { q50: number }): boolean {
  return Math.abs(q50) <= HALF_POINT;
}
