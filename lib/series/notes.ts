/** How a file was read where it could be read otherwise, in sentences: kept with the revision. */
import { cleanName } from './clean-name';
import type { Aggregation, Grain, SeriesMapping } from './types';

interface NoteFacts {
  grain: Grain;
  mapping: SeriesMapping;
  names: { month: string; focal: string; rival: string };
  isSerial: boolean;
  /** Columns that were taken times a thousand. */
  thousands: ReadonlySet<string>;
}

const AGGREGATION_NAMES: Record<Aggregation, string> = {
  mean: 'the mean of its rows',
  last: 'its last row',
};

export function wordNotes({ grain, mapping, isSerial, thousands }: NoteFacts): string[] {
  const { long, dateOrder, decimalMark, aggregation = 'mean' } = mapping;
  const notes: string[] = [];
  if (long)
    notes.push(
      `One row per month and firm: firms from “${cleanName(long.firm)}”, counts from “${cleanName(long.users)}”.`,
    );
  if (grain === 'quarter')
    notes.push(
      'Rows are quarters: each stands for the last month of its quarter, the months between are gaps.',
    );
  if (grain === 'day' || grain === 'week')
    notes.push(
      `Rows are ${grain === 'day' ? 'days' : 'weeks'}: a month counts as ${AGGREGATION_NAMES[aggregation]}.`,
    );
  if (isSerial) notes.push('Months are a spreadsheet’s day numbers, counted from 1900.');
  if (dateOrder)
    notes.push(dateOrder === 'day-first' ? 'Dates have the day first.' : 'Dates have the month first.');
  if (decimalMark) notes.push(`Fractions start with a ${decimalMark}.`);
  for (const column of thousands) notes.push(`“${column}” was taken times 1,000.`);
  return notes;
}
