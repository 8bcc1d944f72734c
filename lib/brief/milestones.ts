/**
 * Milestones: when something comes, with its 90 % interval given that it comes, and the chance that it never does.
 * "Never" means: not within the window that was searched.
 */
import type { Interval, Milestone } from '../forecast/report';
import { LIKELY_ABOVE, UNLIKELY_BELOW, wordProbability } from './probability-words';
import { possessive, run, sentence } from './text';
import type { MilestoneRow, Sentence } from './types';
import { otherFirm, type Words } from './words';

export function writeMilestones(words: Words): MilestoneRow[] {
  // nobody overtakes alone
  const hasContest = !words.facts.report.structure?.exit;
  const rows = [...(hasContest ? [describeOvertaking(words)] : []), describeNearDestination(words)];
  const halfLife = describeHalfLife(words);
  return halfLife ? [...rows, halfLife] : rows;
}

function describeOvertaking(words: Words): MilestoneRow {
  const { overtaking } = words.facts.report.outlook;
  const ahead = words.name(otherFirm(overtaking.overtaker));
  const behind = words.name(overtaking.overtaker);
  return {
    id: 'overtaking',
    label: `${behind} overtakes ${ahead}`,
    value: spellTime(words, overtaking),
    chance: spellChance(words, overtaking),
    sentence: overtakingSentence(words),
  };
}

/** "Marrowby will likely overtake Quillfern around 2027 (Aug 2026 to Jun 2029; 82 % within 10 years)." */
export function overtakingSentence(words: Words): Sentence {
  const { overtaking } = words.facts.report.outlook;
  const behind = run(words.name(overtaking.overtaker), overtaking.overtaker);
  const ahead = run(words.name(otherFirm(overtaking.overtaker)), otherFirm(overtaking.overtaker));
  const chance = spellChance(words, overtaking);
  const { monthsAhead } = overtaking;
  if (overtaking.chance < UNLIKELY_BELOW || !monthsAhead) {
    return sentence(behind, ` is ${wordProbability(overtaking.chance)} to overtake `, ahead, ` (${chance}).`);
  }
  const when = words.months.when(monthsAhead, words.lastMonth);
  const interval = words.months.interval(monthsAhead, words.lastMonth);
  if (overtaking.chance <= LIKELY_ABOVE) {
    return sentence(
      behind,
      ' may or may not overtake ',
      ahead,
      ` (${chance}); if it does, ${when} (${interval}).`,
    );
  }
  const word = wordProbability(overtaking.chance);
  return sentence(
    'It is ',
    word,
    ' that ',
    behind,
    ' overtakes ',
    ahead,
    `, ${when} (${interval}; ${chance}).`,
  );
}

function describeNearDestination(words: Words): MilestoneRow {
  const { nearDestination } = words.facts.report.outlook;
  const value = spellTime(words, nearDestination);
  const chance = spellChance(words, nearDestination);
  return {
    id: 'nearDestination',
    label: 'Within 5\u00a0% of the destination',
    value,
    chance,
    sentence: nearSentence(words, value, chance),
  };
}

function nearSentence(words: Words, value: string, chance: string): Sentence {
  const { chance: probability, monthsAhead } = words.facts.report.outlook.nearDestination;
  const where = 'within 5\u00a0% of where it is heading';
  if (probability > LIKELY_ABOVE && monthsAhead)
    return sentence(`The market comes ${where} ${value}; ${chance}.`);
  if (!monthsAhead) return sentence(`The market shows no sign of coming ${where}; ${chance}.`);
  return sentence(
    `The market may never come ${where}; if it does, ${spellWhen(words, monthsAhead)}; ${chance}.`,
  );
}

function describeHalfLife(words: Words): MilestoneRow | null {
  const halfLife = words.facts.report.outlook.returnHalfLifeMonths;
  if (!halfLife) return null;
  const value = `${words.numbers.number(halfLife.q50, halfLife)} months (${words.numbers.numberInterval(halfLife)})`;
  const share = possessive(words.focal);
  return {
    id: 'returnHalfLife',
    label: 'Half of a disturbance is gone after',
    value,
    chance: '',
    sentence: sentence(`Half of what a disturbance does to ${share} share is gone after ${value}.`),
  };
}

/** When it comes, with "may never come" as far as the chance says so. */
function spellTime(words: Words, { monthsAhead, chance }: Milestone): string {
  if (!monthsAhead) return chance < 0.01 ? 'no sign of it' : 'may never come';
  const when = spellWhen(words, monthsAhead);
  return chance > LIKELY_ABOVE ? when : `may never come; if it does, ${when}`;
}

/** "around March 2027 (Aug 2026 to Jun 2029)". */
function spellWhen(words: Words, monthsAhead: Interval): string {
  const { months, lastMonth } = words;
  return `${months.when(monthsAhead, lastMonth)} (${months.interval(monthsAhead, lastMonth)})`;
}

/** "82 % within 10 years". */
function spellChance(words: Words, milestone: Milestone): string {
  const years = milestone.windowMonths / 12;
  const window = Number.isInteger(years)
    ? `${years} ${years === 1 ? 'year' : 'years'}`
    : `${words.numbers.number(milestone.windowMonths)} months`;
  return `${words.numbers.chance(milestone.chance)} within ${window}`;
}
