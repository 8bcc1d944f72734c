/** Parts of the verdict that do not depend on which outcome it names: overtaking, where the share settles, the share at the horizon. */
import type { Interval, Outcome } from '../forecast/report';
import { overtakingSentence } from './milestones';
import { winnerOf } from './outcomes';
import { LIKELY_ABOVE, wordProbability } from './probability-words';
import { possessive, run, sentence } from './text';
import type { Sentence } from './types';
import { horizonMonthOf, intervalAt, otherFirm, type Words } from './words';

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
  return sentence(`${possessive(words.focal)} share settles near ${share}${near}.`);
}

/** "By December 2028 Quillfern’s share is near 48 % (90 % interval 40 to 61 %)." */
export function horizonShare(words: Words): Sentence {
  return sentence(
    `In ${words.months.long(horizonMonthOf(words))} ${possessive(words.focal)} share is near ${spellShare(words, shareAtHorizon(words))}.`,
  );
}

function loserAtHorizon(words: Words, loser: 'focal' | 'rival'): Sentence {
  const bands = words.facts.report.outlook.observations[loser];
  const at = intervalAt(bands, bands.q50.length - 1);
  return sentence(
    `That takes time: in ${words.months.long(horizonMonthOf(words))} ${words.name(loser)} is near ` +
      `${words.numbers.users(at.q50, at)} (90\u00a0% interval ${words.numbers.usersInterval(at)}).`,
  );
}

/** Overtaking in its own sentence, when it is not next to excluded. */
export function overtakingIfOpen(words: Words): Sentence[] {
  const { chance, monthsAhead } = words.facts.report.outlook.overtaking;
  return chance >= 0.1 && monthsAhead ? [overtakingSentence(words)] : [];
}

/** "53 % (90 % interval 44 to 61 %)". */
function spellShare(words: Words, share: Interval): string {
  return `${words.numbers.chance(share.q50)} (90\u00a0% interval ${words.numbers.chanceInterval(share)})`;
}

function shareAtHorizon(words: Words): Interval {
  const { share } = words.facts.report.outlook.observations;
  return intervalAt(share, share.q50.length - 1);
}
