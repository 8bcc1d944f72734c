/**
 * The odds strip: four outcomes, their odds, the words for them and what they were before the data. Whole percents are shared out by
 * largest remainder, so they add to 100; a chance below 1 % is printed "<1 %" (and may stand for the missing or a surplus percent).
 */
import { OUTCOMES, type Outcome } from '../forecast/outcomes';
import type { Odds } from '../forecast/report';
import { labelOutcome, toneOfOutcome } from './outcomes';
import { wordProbability } from './probability-words';
import { listWords } from './text';
import type { OddsRow, OddsStrip } from './types';
import type { Words } from './words';

export function buildOddsStrip(words: Words): OddsStrip {
  const { odds, priorOdds } = words.facts.report.outlook;
  const percents = spellOdds(words, odds);
  const before = spellOdds(words, priorOdds);
  const total = sumOdds(odds);
  const rows: OddsRow[] = OUTCOMES.map((outcome) => ({
    outcome,
    tone: toneOfOutcome(outcome),
    label: labelOutcome(words, outcome),
    percent: percents[outcome],
    width: (100 * odds[outcome]) / total,
    words: wordProbability(odds[outcome]),
    before: before[outcome],
  }));
  const spoken = rows.map((row) => `${row.label} ${row.percent} (${row.words})`);
  return {
    rows,
    description: `Odds of the four outcomes: ${listWords(spoken)}.`,
    table: {
      title: 'Odds of the four outcomes',
      columns: ['Outcome', 'Odds', 'In words', 'Before the data'],
      rows: rows.map((row) => [row.label, row.percent, row.words, row.before]),
      raw: rows.map((row) => [row.label, odds[row.outcome], row.words, priorOdds[row.outcome]]),
    },
  };
}

/** Odds as "88 %", "<1 %", ">99 %"; the numbers agree with each other as a set. */
export function spellOdds(words: Words, odds: Odds): Record<Outcome, string> {
  const shares = sharePercents(odds);
  const spell = (outcome: Outcome): string => {
    const exact = odds[outcome];
    // the whole percents decide only between 1 and 99; outside, the bounds say all that draws can say
    return words.numbers.chance(exact < 0.01 || exact > 0.99 ? exact : clampPercent(shares[outcome]) / 100);
  };
  return Object.fromEntries(OUTCOMES.map((outcome) => [outcome, spell(outcome)])) as Record<Outcome, string>;
}

function clampPercent(percent: number): number {
  return Math.min(99, Math.max(1, percent));
}

/** Whole percents that add to exactly 100, by largest remainder. */
export function sharePercents(odds: Odds): Record<Outcome, number> {
  const total = sumOdds(odds);
  const exact = OUTCOMES.map((outcome) => ({ outcome, percent: (100 * odds[outcome]) / total }));
  const shares = Object.fromEntries(exact.map((e) => [e.outcome, Math.floor(e.percent)])) as Record<
    Outcome,
    number
  >;
  const missing = 100 - exact.reduce((sum, e) => sum + Math.floor(e.percent), 0);
  const byRemainder = [...exact].sort((a, b) => (b.percent % 1) - (a.percent % 1));
  for (const { outcome } of byRemainder.slice(0, missing)) shares[outcome]++;
  return shares;
}

function sumOdds(odds: Odds): number {
  const total = OUTCOMES.reduce((sum, outcome) => sum + odds[outcome], 0);
  if (!(total > 0)) throw new RangeError(`odds must sum to more than 0, got ${total}`);
  return total;
}
