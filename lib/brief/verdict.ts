/**
 * The verdict: where the market is heading, in one or two sentences that claim no more than the odds allow. An outcome is named only
 * when its odds pass "likely"; else the data do not decide yet, and the verdict says what leads and what is not settled.
 */

import { decideOutcome } from '../forecast/odds';
import type { Outcome } from '../forecast/outcomes';
import { spellOdds } from './odds-strip';
import { labelOutcome, winnerOf } from './outcomes';
import { LIKELY_ABOVE, likelyVerb, wordProbability } from './probability-words';
import { capitalise, possessive, run, sentence } from './text';
import type { Sentence, Verdict } from './types';
import { writeExit } from './verdict-exit';
import { milestoneClause, settlingSentence } from './verdict-support';
import { writeUndecided } from './verdict-undecided';
import { type FirmRole, otherFirm, type Words } from './words';

/** Largest part of the other's room (upper end of the 90 % interval) that still reads as "not noticeable". */
const INDEPENDENT_BELOW = 0.2;

export function writeVerdict(words: Words): Verdict {
  const { structure } = words.facts.report;
  if (structure?.exit) return writeExit(words, structure.exit);
  const { odds } = words.facts.report.outlook;
  const decided = decideOutcome(odds);
  if (!decided) return writeUndecided(words);
  const percent = spellOdds(words, odds)[decided];
  const support = [
    oddsSentence(words, decided, percent),
    reasonSentence(words, decided),
    ...settlingSentence(words, decided),
  ];
  return {
    decided,
    headline: writeHeadline(words, decided, odds[decided]),
    support:
      words.facts.report.diagnostics.status === 'converged' ? support : [notConvergedSentence(), ...support],
    plain: `${capitalise(labelOutcome(words, decided))}: ${wordProbability(odds[decided])} (${percent})`,
  };
}

export function notConvergedSentence(): Sentence {
  return sentence('The sampler had not settled when it reached its limit, so these odds are rough.');
}

function writeHeadline(words: Words, decided: Outcome, probability: number): Sentence {
  const winner = winnerOf(decided);
  if (winner) return exclusionHeadline(words, winner, probability);
  return decided === 'coexistence'
    ? sharingHeadline(words, probability)
    : headStartHeadline(words, probability);
}

function sharingHeadline(words: Words, probability: number): Sentence {
  return sentence(
    `${words.focal} and ${words.rival} ${likelyVerb(probability, 'two')} end up `,
    run('sharing this market', 'both'),
    ...milestoneClause(words),
    '.',
  );
}

function exclusionHeadline(words: Words, winner: FirmRole, probability: number): Sentence {
  return sentence(
    `${words.name(winner)} ${likelyVerb(probability)} `,
    run(`squeeze ${words.name(otherFirm(winner))} out`, winner),
    ' of this market in the end.',
  );
}

function headStartHeadline(words: Words, probability: number): Sentence {
  return sentence(
    run('The head start', 'headStart'),
    ` ${likelyVerb(probability)} decide this market: one firm squeezes the other out, `,
    ...aheadClause(words),
    '.',
  );
}

/** Who is on the winning side now, given that the head start decides. */
function aheadClause(words: Words): Sentence {
  const focalAhead = words.facts.report.outlook.headStartFocalAhead;
  if (focalAhead === null) return [run('and which one cannot be told yet')];
  const leader: FirmRole = focalAhead >= 0.5 ? 'focal' : 'rival';
  const chance = leader === 'focal' ? focalAhead : 1 - focalAhead;
  if (!(chance > LIKELY_ABOVE)) return [run('and the data do not tell yet which')];
  return sentence(
    'and as things stand ',
    run(words.name(leader), leader),
    ` is ${adverb(chance)} on the winning side (${words.numbers.chance(chance)})`,
  );
}

/** "likely", "very likely", "almost certainly": before "on the winning side". */
function adverb(chance: number): string {
  const word = wordProbability(chance);
  return word === 'virtually certain' ? 'virtually certainly' : word;
}

function oddsSentence(words: Words, decided: Outcome, percent: string): Sentence {
  const { odds, priorOdds } = words.facts.report.outlook;
  const before = spellOdds(words, priorOdds)[decided];
  return sentence(
    `The odds are ${percent} (`,
    run(wordProbability(odds[decided]), null, true),
    `); before the data they stood at ${before}.`,
  );
}

/** What the outcome means for the two firms' room. */
function reasonSentence(words: Words, decided: Outcome): Sentence {
  const winner = winnerOf(decided);
  if (winner) {
    const [strongFirm, weakFirm] = [words.name(winner), words.name(otherFirm(winner))];
    return sentence(
      `In that case a full ${strongFirm} takes all of ${possessive(weakFirm)} room, and a full ${weakFirm} only part of ${possessive(strongFirm)}.`,
    );
  }
  if (decided === 'headStartDecides') {
    return sentence(
      'In that case either firm, once full, leaves the other no room, so the one ahead stays ahead.',
    );
  }
  return isNearlyIndependent(words)
    ? sentence('Neither takes a noticeable part of the other’s room: each grows much as it would alone.')
    : sentence('In that case each firm keeps some room that the other cannot take.');
}

/** Both firms very likely leave the other at least four fifths of its room. */
function isNearlyIndependent(words: Words): boolean {
  const upper = (id: string) =>
    words.facts.report.parameters.find((row) => row.id === id)?.posterior.q95 ?? Number.POSITIVE_INFINITY;
  return upper('alpha') < INDEPENDENT_BELOW && upper('beta') < INDEPENDENT_BELOW;
}
