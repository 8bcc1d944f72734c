/**
 * Which columns of the file to read: those that were named, else those that look right.
 */
import type { SeriesMapping, TableReading } from '../series/types';
import type { FitRequest } from './fit-request';

export type ColumnChoice = { ok: true; mapping: SeriesMapping } | { ok: false; message: string };

export function chooseColumns(table: TableReading, request: FitRequest): ColumnChoice {
  const { columns, decimalMark, dateOrder } = request;
  const { guess } = table;
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
  return { ok: true, mapping: { month, focal, rival, decimalMark, dateOrder } };
}
