/** What the series was found to hold besides growth and competition, and what the model leaves out. */
import type { Structure } from '../forecast/report';
import { listWords, sentence } from './text';
import type { Sentence } from './types';
import type { Words } from './words';

/** Below this chance a change of strengths within the series is not worth a sentence. */
const WORTH_TELLING = 0.1;
/** More set-aside counts than this are counted, not listed. */
const LISTED_COUNTS = 4;

/** One or more sentences: what was found, then what is left out. */
export function writeLeftOut(words: Words): Sentence {
  const { structure } = words.facts.report;
  const found = structure
    ? [
        tellSeason(structure),
        tellMarked(words, structure),
        tellBreak(words, structure),
        tellFlagged(words, structure),
      ].filter(Boolean)
    : [];
  const last = words.months.long(words.lastMonth);
  const seasons = structure && structure.seasonHarmonics > 0 ? '' : ', seasons';
  return sentence(
    [...found, `Left out: a third firm, prices${seasons}, and every change of strengths after ${last}.`].join(
      ' ',
    ),
  );
}

function tellSeason({ seasonHarmonics }: Structure): string {
  return seasonHarmonics > 0 ? 'A yearly cycle was found; it is part of the forecast.' : '';
}

function tellBreak(words: Words, { breakChance, breakMonth }: Structure): string {
  if (!(breakChance >= WORTH_TELLING) || !breakMonth) return '';
  const [early, middle, late] = [breakMonth.q05, breakMonth.q50, breakMonth.q95].map((month) =>
    words.months.short(Math.round(month)),
  );
  const when = early === late ? middle : `${middle} (${early} to ${late})`;
  return `Strengths may have changed once, around ${when}: ${words.numbers.chance(breakChance)}. The forecast goes on from the later ones where they did.`;
}

/** Months that somebody marked, with what the counts say about them. */
function tellMarked(words: Words, { markedBreaks = [] }: Structure): string {
  if (markedBreaks.length === 0) return '';
  const told = markedBreaks.map(({ month, chance }) => {
    const event = words.facts.events?.find((one) => one.month === month && one.changesParameters);
    const what = event ? `${event.note} (${words.months.short(month)})` : words.months.short(month);
    return `${what} ${words.numbers.chance(chance)}`;
  });
  const before = markedBreaks.length === 1 ? 'even odds' : 'even odds for one of them';
  return `Chance that strengths changed with what was marked, ${before} before the counts: ${listWords(told)}. The forecast goes on from the later ones where they did.`;
}

function tellFlagged(words: Words, { flaggedCounts }: Structure): string {
  if (flaggedCounts.length === 0) return '';
  if (flaggedCounts.length > LISTED_COUNTS)
    return `${flaggedCounts.length} counts stand far out of line and were nearly ignored.`;
  const listed = flaggedCounts.map(
    ({ firm, month }) => `${words.name(firm === 1 ? 'focal' : 'rival')} in ${words.months.short(month)}`,
  );
  const [stands, were] =
    flaggedCounts.length === 1 ? ['One count stands', 'was'] : ['These counts stand', 'were'];
  return `${stands} far out of line and ${were} nearly ignored: ${listWords(listed)}.`;
}
