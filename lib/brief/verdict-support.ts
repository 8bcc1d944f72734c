/** Parts of the verdict that do not depend on which outcome it names: overtaking, where the share settles, the share at the horizon. */
import type { Outcome } from '../forecast/outcomes';
import type { Interval } from '../forecast/report';
import { overtakingSentence } from './milestones';
import { winnerOf } from './outcomes';
import { LIKELY_ABOVE, wordProbability } from './probability-words';
import { possessive, run, sentence } from './text';
import type { Sentence } from './types';
import { type FirmRole, horizonMonthOf, intervalAt, otherFirm, type Words } from './words';

/** ", and Marrowby will likely overtake Quillfern around March 2027": only when overtaking is itself likely. */
export function milestoneClause(words: Words): Sentence {
  const { chance, monthsAhead, overtaker } = words.facts.report.outlook.overtaking;
  if (!(chance > LIKELY_ABOVE) || !monthsAhead) return [];
  const word = wordProbability(chance);
  const verb = word === 'virtually certain' ? 'virtually certain to overtake' : `${word} to overtake`;
  return sentence(
    `, with ${words.name(overtaker)} ${verb} `,
    run(words.months.when(monthsAhead, words.lastMonth), overtaker),
  );
}

/** Where the share goes, as far as it can be told in one interval. */
export function settlingSentence(words: Words, decided: Outcome): Sentence[] {
  if (decided === 'coexistence') return [settledShare(words)];
  const winner = winnerOf(decided);
  if (!winner) return [horizonShare(words)];
  return [loserAtHorizon(words, otherFirm(winner)), ...overtakingIfOpen(words)];
}

function settledShare(words: Words): Sentence {
  const { destination, nearDestination } = words.facts.report.outlook;
  const share = spellShare(words, destination.share);
  const near =
    nearDestination.chance > LIKELY_ABOVE && nearDestination.monthsAhead
      ? `, most of the way there ${words.months.when(nearDestination.monthsAhead, words.lastMonth)}`
      : '';
  return sentence(`${possessive(words.focal)} share settles ${share}${near}.`);
}

/** "By December 2028 Quillfern’s share is near 48 % (90 % interval 40 to 61 %)." */
export function horizonShare(words: Words): Sentence {
  return sentence(
    `In ${words.months.long(horizonMonthOf(words))} ${possessive(words.focal)} share is ${spellShare(words, shareAtHorizon(words))}.`,
  );
}

/** A firm that keeps this part of its last count at the horizon is squeezed out slowly. */
const SLOWLY_ABOVE = 0.2;

function loserAtHorizon(words: Words, loser: FirmRole): Sentence {
  const bands = words.facts.report.outlook.observations[loser];
  const at = intervalAt(bands, bands.q50.length - 1);
  const { n1Last, n2Last } = words.facts.report.point;
  const isSlow = at.q50 > SLOWLY_ABOVE * (loser === 'focal' ? n1Last : n2Last);
  const when = `n ${words.months.long(horizonMonthOf(words))}`;
  const left =
    at.q95 < 1
      ? 'has practically no users left'
      : `is near ${words.numbers.users(at.q50, at)} (90\u00a0% interval ${words.numbers.usersInterval(at)})`;
  return sentence(`${isSlow ? 'That takes time: i' : 'I'}${when} ${words.name(loser)} ${left}.`);
}

/** Overtaking in its own sentence, when it is not next to excluded. */
export function overtakingIfOpen(words: Words): Sentence[] {
  const { chance, monthsAhead } = words.facts.report.outlook.overtaking;
  return chance >= 0.1 && monthsAhead ? [overtakingSentence(words)] : [];
}

/** "near 53 % (90 % interval 44 to 61 %)", "above 99 % (90 % interval 80 to >99 %)", "below 1 %". */
export function spellShare(words: Words, share: Interval): string {
  const { numbers } = words;
  const interval = numbers.chanceInterval(share);
  const value = numbers.chance(share.q50);
  const near =
    share.q50 > 0.99
      ? value.replace('>', 'above ')
      : share.q50 < 0.01
        ? value.replace('<', 'below ')
        : `near ${value}`;
  return interval === value ? near : `${near} (90\u00a0% interval ${interval})`;
}

function shareAtHorizon(words: Words): Interval {
  const { share } = words.facts.report.outlook.observations;
  return intervalAt(share, share.q50.length - 1);
}
