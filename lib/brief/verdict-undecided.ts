/** The verdict when no outcome passes "likely": what leads, what is not settled, what can be said all the same. */

import { outcomeOf } from '../forecast/odds';
import type { Outcome } from '../forecast/outcomes';
import { spellOdds } from './odds-strip';
import {
  chancesOfBeingAlone,
  chancesOfTakingAll,
  labelOutcome,
  rankOutcomes,
  subjectOutcome,
} from './outcomes';
import { LIKELY_ABOVE, likelyVerb } from './probability-words';
import { spellRoomRange } from './room-words';
import { capitalise, joinSentences, listWords, possessive, run, sentence } from './text';
import type { Sentence, Verdict } from './types';
import { horizonShare, overtakingIfOpen } from './verdict-support';
import type { FirmRole, Words } from './words';

/** A coefficient whose chance of passing 1 lies between this and 1 minus this is open; below it in both, some outcome would pass 66 %. */
const OPEN_ABOVE = 0.17;
/** Odds this close, in points, read as level. */
const LEVEL_WITHIN = 0.05;
/** The best fit lies on a border when a coefficient is within this of 1 (relative). */
const BORDER_WITHIN = 0.02;
/** Odds that moved by less than this from the prior's have hardly moved. */
const HARDLY_MOVED = 0.1;

export function writeUndecided(words: Words): Verdict {
  const { odds } = words.facts.report.outlook;
  const [first] = rankOutcomes(odds);
  const isRough = words.facts.report.diagnostics.status !== 'converged';
  const rough = sentence('The sampler had not settled when it reached its limit, so these odds are rough.');
  return {
    decided: null,
    headline: joinSentences([sentence('The data do not decide yet.'), leadingSentence(words)]),
    support: [
      ...(isRough ? [rough] : []),
      ...aloneSentence(words),
      openSentence(words),
      ...borderSentence(words),
      ...hardlyMovedSentence(words),
      horizonShare(words),
      ...overtakingIfOpen(words),
    ],
    plain: `The data do not decide yet; ${labelOutcome(words, first!)} leads with ${spellOdds(words, odds)[first!]}`,
  };
}

/** What leads; outcomes within LEVEL_WITHIN of the best are named together. */
function leadingSentence(words: Words): Sentence {
  const { odds } = words.facts.report.outlook;
  const percents = spellOdds(words, odds);
  const ranked = rankOutcomes(odds) as [Outcome, Outcome, Outcome, Outcome];
  const level = ranked.filter((outcome) => odds[ranked[0]] - odds[outcome] < LEVEL_WITHIN);
  if (level.length === ranked.length) return sentence('All four outcomes are about level.');
  if (level.length > 1) {
    const named = level.map((outcome) => `${subjectOutcome(words, outcome)} (${percents[outcome]})`);
    return sentence(`${capitalise(listWords(named))} are about level.`);
  }
  const [first, second] = ranked;
  const [leader, next] = [subjectOutcome(words, first), subjectOutcome(words, second)];
  return sentence(
    `${capitalise(leader)} leads with ${percents[first]}, ahead of ${next} with ${percents[second]}.`,
  );
}

/** Which coefficient may lie on either side of 1, and how wide it is. */
function openSentence(words: Words): Sentence {
  const chances = chancesOfTakingAll(words.facts.report.outlook.odds);
  const isOpen = (chance: number) => Math.min(chance, 1 - chance) >= OPEN_ABOVE;
  const parts: string[] = [];
  if (isOpen(chances.alpha)) {
    parts.push(
      `how much of ${possessive(words.focal)} room a full ${words.rival} takes (${spellRoomRange(words, 'alpha')})`,
    );
  }
  if (isOpen(chances.beta)) {
    parts.push(
      `how much of ${possessive(words.rival)} room a full ${words.focal} takes (${spellRoomRange(words, 'beta')})`,
    );
  }
  return sentence(
    `What is not settled is ${listWords(parts)}: 100\u00a0% is the border between staying and being squeezed out.`,
  );
}

/** The outcomes may be undecided between two ways to the same end. */
function aloneSentence(words: Words): Sentence[] {
  const alone = chancesOfBeingAlone(words.facts.report.outlook);
  if (!alone) return [];
  const firm: FirmRole = alone.focal >= alone.rival ? 'focal' : 'rival';
  const chance = alone[firm];
  if (!(chance > LIKELY_ABOVE)) return [];
  return [
    sentence(
      `By its strength or by its head start, ${words.name(firm)} ${likelyVerb(chance)} end up `,
      run('alone', firm),
      ` all the same (${words.numbers.chance(chance)}).`,
    ),
  ];
}

function borderSentence(words: Words): Sentence[] {
  const { alpha, beta } = words.facts.report.point;
  const isOn = (value: number) => Math.abs(value - 1) <= BORDER_WITHIN;
  if (!isOn(alpha) && !isOn(beta)) return [];
  const below = outcomeOf(isOn(alpha) ? 0.5 : alpha, isOn(beta) ? 0.5 : beta);
  const above = outcomeOf(isOn(alpha) ? 2 : alpha, isOn(beta) ? 2 : beta);
  return [
    sentence(
      'The best single fit lies ',
      run('on the border', null, true),
      ` between ${subjectOutcome(words, below)} and ${subjectOutcome(words, above)}.`,
    ),
  ];
}

function hardlyMovedSentence(words: Words): Sentence[] {
  const { odds, priorOdds } = words.facts.report.outlook;
  const moved = rankOutcomes(odds).some(
    (outcome) => Math.abs(odds[outcome] - priorOdds[outcome]) >= HARDLY_MOVED,
  );
  return moved ? [] : [sentence('The data have hardly moved the odds from where they stood before.')];
}
