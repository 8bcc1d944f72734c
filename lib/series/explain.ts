/**
 * Each problem of a file in words for people: what happened (with its row, column and value), why it matters, what to try.
 */
import { CONSTANT_SUM_SPREAD, JUMP_FACTOR, MIN_MONTHS_TO_FIT } from './limits';
import type { SeriesProblem, SeriesProblemCode } from './types';

export interface Explanation {
  what: string;
  why: string;
  tryThis: string;
}

export function explainProblem(problem: SeriesProblem): Explanation {
  return EXPLANATIONS[problem.code](problem);
}

/** "Row 14, column “Ferrow”": the place of a problem, or an empty text when it concerns the whole file. */
export function describePlace({ row, column }: Pick<SeriesProblem, 'row' | 'column'>): string {
  const parts = [row === null ? '' : `row ${row}`, column === null ? '' : `column ${quote(column)}`];
  const place = parts.filter((part) => part !== '').join(', ');
  return place.charAt(0).toUpperCase() + place.slice(1);
}

const GAP = 'That month stays a gap; the months around it are used.';
const ROW_LEFT_OUT = 'That row is not used; the others are.';

const EXPLANATIONS: Record<SeriesProblemCode, (problem: SeriesProblem) => Explanation> = {
  'empty-file': () => ({
    what: 'The file is empty.',
    why: 'There is nothing to read.',
    tryThis: 'Choose a file with a header and one row a month: the month and the users of both firms.',
  }),
  'too-large': ({ value, other }) => ({
    what: `The data are too large: ${value}.`,
    why: `At most ${other?.value} are read.`,
    tryThis: value?.includes('months')
      ? 'Look for a mistyped year in the first or last month, or keep the most recent years only.'
      : 'Keep the month column and the two firms’ counts, one row a month.',
  }),
  'not-text': () => ({
    what: 'This is not a text file.',
    why: 'Counts are read from CSV, TSV or semicolon text; a workbook or a PDF is something else, whatever its name ends with.',
    tryThis: 'In the spreadsheet, save the sheet as “CSV UTF-8”, or copy its cells and paste them.',
  }),
  'workbook-locked': () => ({
    what: 'This workbook is locked with a password, or is of the old kind before .xlsx.',
    why: 'Its sheets cannot be read without the spreadsheet program.',
    tryThis: 'Open it there and save it as .xlsx without a password, or copy its cells and paste them.',
  }),
  'workbook-empty': ({ value }) => ({
    what: `This is a ${value}, not a workbook of sheets.`,
    why: 'It is packed like a workbook, but holds no sheets that can be read.',
    tryThis: 'Save the table as .xlsx or as CSV, or copy its cells and paste them.',
  }),
  'workbook-macros': () => ({
    what: 'This workbook carries macros.',
    why: 'Files with programs in them are not opened here.',
    tryThis: 'Save it as .xlsx, which leaves the macros out.',
  }),
  'workbook-swollen': ({ value, other }) => ({
    what: `Unpacked, this workbook would hold ${value}.`,
    why: `At most ${other?.value} are unpacked.`,
    tryThis: 'Keep the sheet with the counts only, or save that sheet as CSV.',
  }),
  'workbook-broken': () => ({
    what: 'This workbook could not be read.',
    why: 'It is damaged, or something else with the ending of a workbook.',
    tryThis: 'Open it in the spreadsheet program and save it anew, or copy its cells and paste them.',
  }),
  'firm-not-found': ({ value, readings }) => ({
    what: `No row names the firm ${quote(value)}.`,
    why: 'It was chosen as one of the two firms.',
    tryThis: `Choose one of ${listNames(readings ?? [])}.`,
  }),
  'no-header': ({ row, value }) => ({
    what: `Row ${row} already holds data: ${quote(value)}.`,
    why: 'Without a header the columns have no names, so they are called by their letters.',
    tryThis: 'Add a first row such as Month, our firm, the rival.',
  }),
  'too-few-columns': ({ value }) => ({
    what: `The file has ${value === '1' ? 'one column' : `${value} columns`}.`,
    why: 'Three are needed: the month and the users of two firms.',
    tryThis:
      'Check that commas, semicolons or tabs separate the columns, and that both firms are in one file.',
  }),
  'column-not-found': ({ value, readings }) => ({
    what: `There is no column ${quote(value)}.`,
    why: 'It was chosen as the month or as a firm’s count.',
    tryThis: `Choose one of ${listNames(readings ?? [])}.`,
  }),
  'same-column-twice': ({ column }) => ({
    what: `The column ${quote(column)} was chosen twice.`,
    why: 'The month, the focal firm and the rival are three different columns.',
    tryThis: 'Choose another column for one of them.',
  }),
  'row-misaligned': ({ row, value, other }) => ({
    what: `Row ${row} has more cells than the header’s ${other?.value}: ${quote(value)}.`,
    why: `A comma inside a number or a name may have been taken for a new cell, so nothing in it can be trusted. ${ROW_LEFT_OUT}`,
    tryThis: 'Put numbers and names that hold a comma into quotes, or save the file with semicolons or tabs.',
  }),
  'quote-open': ({ row }) => ({
    what: `A quote opened near row ${row} is never closed.`,
    why: 'Quotes were read as plain characters from the first row on.',
    tryThis: 'Close the quote or take it out.',
  }),
  'month-unreadable': (problem) => ({
    what: `${describePlace(problem)}: ${problem.value ? `${quote(problem.value)} is not a month` : 'the month is missing'}.`,
    why: ROW_LEFT_OUT,
    tryThis: adviseMonth(problem.value ?? ''),
  }),
  'month-ambiguous': (problem) => ({
    what: `${describePlace(problem)}: ${quote(problem.value)} could be ${listReadings(problem, 'a day of a year not given')}.`,
    why: `Nothing in the column says which, and it is not guessed. ${ROW_LEFT_OUT}`,
    tryThis:
      (problem.readings?.length ?? 0) > 1
        ? 'Say whether the day or the month comes first, or write months as 2024-03.'
        : 'Write the year with four digits, as in 2024-03.',
  }),
  'month-duplicate': (problem) => ({
    what: `${describePlace(problem)}: ${quote(problem.value)} is the month of row ${problem.other?.row} again.`,
    why: `A month has one count per firm: row ${problem.other?.row} is used, row ${problem.row} is not.`,
    tryThis: 'Use this row instead, or leave it out.',
  }),
  'month-missing': ({ row, value, other }) => ({
    what: other ? `The months ${value} to ${other.value} have no row.` : `The month ${value} has no row.`,
    why: `They are kept as gaps before row ${row}: the method allows gaps, but they make the answer less sure.`,
    tryThis: 'Add the months if the counts exist; otherwise nothing needs doing.',
  }),
  'month-in-future': (problem) => ({
    what: `${describePlace(problem)}: ${problem.value} lies after the current month, ${problem.other?.value}.`,
    why: 'A planned or forecast figure would be taken for an observed one.',
    tryThis: 'Keep observed months only.',
  }),
  'month-partial': ({ row, value }) => ({
    what: `The rows do not fill ${value} (last row ${row}).`,
    why: 'A month at the beginning or the end of which days are missing would count too little or too early. It is left out.',
    tryThis: 'Use it as it stands if its rows are complete for what you count.',
  }),
  'month-unfinished': (problem) => ({
    what: `${describePlace(problem)}: ${problem.value} is the current month.`,
    why: 'A month that has not ended often counts too few users. It is used as it stands.',
    tryThis: 'Leave the row out unless the count is final.',
  }),
  'count-unreadable': (problem) => ({
    what: `${describePlace(problem)}: ${quote(problem.value)} is not a count.`,
    why: GAP,
    tryThis: problem.value?.includes('%')
      ? 'Give users, not shares: shares alone cannot tell how large the market can grow.'
      : 'Write plain digits, such as 12500 or 12.5k, or leave the cell empty.',
  }),
  'count-ambiguous': (problem) => ({
    what: `${describePlace(problem)}: ${quote(problem.value)} could be ${listReadings(problem)}.`,
    why: `Nothing in the column says which mark starts the fraction, and it is not guessed. ${GAP}`,
    tryThis: 'Say which is the decimal mark, or write counts without a thousands mark.',
  }),
  'count-negative': (problem) => ({
    what: `${describePlace(problem)}: ${quote(problem.value)} is negative.`,
    why: `There are no fewer users than none. ${GAP}`,
    tryThis: 'Give the number of users at the month’s end, not the change since the month before.',
  }),
  'count-missing': (problem) => ({
    what: problem.other
      ? `${describePlace(problem)}: no count from here to row ${problem.other.row} (${problem.other.value}).`
      : `${describePlace(problem)}: no count${problem.value ? ` (${quote(problem.value)})` : ''}.`,
    why: 'It is kept as a gap: not known, which is not the same as zero.',
    tryThis: 'Write 0 where the firm had not launched yet; otherwise nothing needs doing.',
  }),
  'zero-inside': (problem) => ({
    what: `${describePlace(problem)}: zero users in ${problem.value}, after the firm had some.`,
    why: `A true zero would mean that the firm is gone; more often the count is missing. ${GAP}`,
    tryThis: 'Leave the cell empty if the count is missing.',
  }),
  jump: (problem) => ({
    what: `${describePlace(problem)}: ${problem.value} after ${problem.other?.value}${problem.other?.row ? ` in row ${problem.other.row}` : ''}.`,
    why: `A change of more than ${JUMP_FACTOR} times in a month is often a slip of the comma, a new way of counting, or a launch. The count is used as it stands.`,
    tryThis: 'Correct it if it is a slip; a new way of counting needs the older months brought to it.',
  }),
  'identical-firms': ({ column, other }) => ({
    what: `${quote(other?.value ?? null)} and ${quote(column)} have the same count in every month.`,
    why: 'The same column was probably copied twice; two equal series say nothing about competition.',
    tryThis: 'Give the rival’s own counts.',
  }),
  'constant-sum': ({ value }) => ({
    what: `Both firms together always make ${value} (to within ${CONSTANT_SUM_SPREAD * 100} %).`,
    why: 'These look like shares, not users. Shares alone cannot tell growth of the market from a shift between the firms.',
    tryThis: 'Multiply the shares by the number of users in the market, month by month.',
  }),
  'unit-mismatch': ({ column, value, other }) => ({
    what: `${quote(column)} is about ${value} times smaller than ${quote(other?.value ?? null)} at its highest.`,
    why: 'One of the two may be given in thousands.',
    tryThis: 'Bring both firms to the same unit; if the difference is real, nothing needs doing.',
  }),
  'too-short-to-fit': ({ value }) => ({
    what: `${value === '1' ? 'One month has' : `${value === '0' ? 'No' : value} months have`} a count for both firms.`,
    why: `At least ${MIN_MONTHS_TO_FIT} are needed: from fewer, growth cannot be told from competition at all.`,
    tryThis: 'Add earlier months, or come back when more have passed.',
  }),
  'never-launched': ({ column }) => ({
    what: `${quote(column)} has no count above zero.`,
    why: 'A firm without users leaves nothing to compare.',
    tryThis: 'Check the chosen column and the problems listed for it.',
  }),
  'more-problems': ({ value }) => ({
    what: `${value} more problems of single rows are not listed.`,
    why: 'They are likely of the same kinds.',
    tryThis: 'Mend the listed ones and read the file again.',
  }),
};

function adviseMonth(value: string): string {
  if (/^\d{5}$/.test(value))
    return 'This looks like a spreadsheet’s day number: format the column as a date before saving.';
  if (/^(sum|total|average|mean)/i.test(value)) return 'Nothing needs doing when the row is a sum or a note.';
  return 'Write months as 2024-03, 03/2024 or Mar 2024.';
}

function listReadings({ readings = [] }: SeriesProblem, otherwise?: string): string {
  return [...readings, ...(readings.length < 2 && otherwise ? [otherwise] : [])].join(' or ');
}

function listNames(names: readonly string[]): string {
  return names.map(quote).join(', ');
}

function quote(text: string | null): string {
  return `“${text ?? ''}”`;
}
