/**
 * Which columns of the file to read: those that were named, else those that look right.
 */
import type { SeriesMapping, TableReading } from '../series/types';
import type { FitRequest } from './fit-request';

export type ColumnChoice = { ok: true; mapping: SeriesMapping } | { ok: false; message: string };

export function chooseColumns(table: TableReading, request: FitRequest): ColumnChoice {
  const { columns, decimalMark, dateOrder, aggregation } = request;
  const answers = { decimalMark, dateOrder, aggregation };
  const { guess } = table;
  if (request.firms || (guess.long && !columns)) return chooseFirms(table, request, answers);
  const month = columns?.[0] ?? guess.month;
  const focal = columns?.[1] ?? guess.focal;
  const rival = columns?.[2] ?? guess.rival;
  if (month === null || focal === null || rival === null) {
    const lacking = month === null ? 'no column of months' : 'fewer than two columns of counts';
    const advice =
      'Write months as 2024-03 and counts as digits, or name the columns: --columns month,focal,rival.';
    return {
      ok: false,
      message: `There is ${lacking} among ${table.header.join(', ')}. ${advice}`,
    };
  }
  return { ok: true, mapping: { month, focal, rival, ...answers } };
}

/** One row per month and firm: --columns then names the month, the column of firms and the one that counts. */
function chooseFirms(
  { header, guess }: TableReading,
  { columns, firms }: FitRequest,
  answers: Partial<SeriesMapping>,
): ColumnChoice {
  const month = columns?.[0] ?? guess.month;
  const long = columns ? { firm: columns[1], users: columns[2] } : guess.long;
  const [focal, rival] = firms ?? [guess.focal, guess.rival];
  if (month === null || long === null || focal === null || rival === null) {
    return {
      ok: false,
      message: `No column among ${header.join(', ')} names firms. Name the columns: --columns month,firm,users.`,
    };
  }
  return { ok: true, mapping: { month, focal, rival, long, ...answers } };
}
