/** Why a text cannot stand in a cell of the grid, in words. */
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { MAX_SERIES_MONTHS } from '@/lib/series/limits';
import { MAX_REASON_LENGTH } from '@/lib/services/form-limits';
import type { Explanation } from '../controls/problem-note';
import type { CellProblem, DraftRow } from './grid-draft';

const months = createMonthFormat(LOCALE);
const QUOTED_LENGTH = 40;

export function explainCell(
  problem: CellProblem,
  rows: readonly DraftRow[],
  names: { focal: string; rival: string },
): Explanation {
  const { code, column, row, text, readings } = problem;
  const month = (rows[0]?.month ?? 0) + row;
  const whose = column === 'exclusion' ? 'the reason' : names[column];
  const place = `${whose}, ${months.long(month)}`;
  const quoted = `“${text.length > QUOTED_LENGTH ? `${text.slice(0, QUOTED_LENGTH)}…` : text}”`;
  switch (code) {
    case 'unreadable':
      return {
        what: `${quoted} is not a count (${place}).`,
        tryThis: 'Write plain digits, such as 12500 or 12.5k, or leave the cell empty for an unknown month.',
      };
    case 'ambiguous':
      return {
        what: `${quoted} could be ${readings?.[0]} or ${readings?.[1]} (${place}).`,
        tryThis: 'Write it without a mark for the thousands.',
      };
    case 'negative':
      return { what: `${quoted} is below zero (${place}).`, tryThis: 'Users are zero or more.' };
    case 'zero-inside':
      return {
        what: `Zero users after the launch cannot be used (${place}).`,
        tryThis: 'Leave the cell empty for an unknown month, or leave the month out with a reason.',
      };
    case 'too-long':
      return {
        what: `This reason is too long (${place}).`,
        tryThis: `Use at most ${MAX_REASON_LENGTH} characters.`,
      };
    case 'too-many-months':
      return { what: `A series has at most ${MAX_SERIES_MONTHS} months.`, tryThis: 'Paste fewer lines.' };
  }
}
