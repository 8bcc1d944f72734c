/**
 * Table + chosen columns -> monthly series. Whatever can be read is kept; whatever cannot is reported and becomes a gap (null).
 *   - months without a row between the first and the last one are gaps;
 *   - a zero before the first count means not launched; a later zero becomes a gap, for the method works on logarithms;
 *   - of two rows for one month the first stands;
 *   - daily and weekly rows are brought to months, a quarter stands in its last month;
 *   - months at either end in which neither firm is known are cut off.
 * Choices among the fixes of problems are applied in a second reading, so that what was chosen about can be listed and changed.
 * Today's month, needed to notice future ones, is an argument: nothing here reads a clock.
 */
import { assembleSeries } from './assemble-series';
import { checkSeries } from './check-series';
import { cleanName } from './clean-name';
import { type ColumnIndexes, findColumns } from './find-columns';
import { type Corrections, NO_CORRECTIONS, problemKey, readCorrections } from './fixes';
import { detectGrain } from './grain';
import { toWide } from './long-layout';
import { readMonthColumn } from './month-column';
import { wordNotes } from './notes';
import { readTable } from './parse-table';
import { isBlocking, listProblems } from './problem';
import { type RowsToRead, readFineRows, readMonthRows } from './read-rows';
import type {
  Grain,
  Month,
  MonthlySeries,
  SeriesMapping,
  SeriesProblem,
  SeriesReading,
  TableReading,
} from './types';

export interface ReadingOptions {
  /** The current month of the reader; without it no month counts as future or unfinished. */
  thisMonth?: Month;
}

/** Text of a file or paste -> what was understood. Never throws on any text. */
export function readSeries(
  text: string,
  mapping: SeriesMapping,
  options: ReadingOptions = {},
): SeriesReading {
  return readSeriesFromTable(readTable(text), mapping, options);
}

/** The same from a table already read, so that a preview can try one mapping after another. */
export function readSeriesFromTable(
  table: TableReading,
  mapping: SeriesMapping,
  options: ReadingOptions = {},
): SeriesReading {
  const focalName = cleanName(mapping.focal);
  const rivalName = cleanName(mapping.rival);
  const { columns, problems } = findColumns(table, mapping);
  if (columns === null) {
    const found = listProblems([...table.problems, ...problems]);
    return { series: null, focalName, rivalName, grain: 'month', notes: [], problems: found };
  }
  const plain = readOnce(table, mapping, columns, options, NO_CORRECTIONS);
  const corrections = readCorrections(plain.problems, mapping.fixes);
  const isCorrected = Object.values(mapping.fixes ?? {}).length > 0;
  const reading = isCorrected ? readOnce(table, mapping, columns, options, corrections) : plain;
  const { series, grain, names } = reading;
  return {
    series,
    focalName: names.focal,
    rivalName: names.rival,
    grain,
    notes: wordNotes({ grain, mapping, names, isSerial: reading.isSerial, thousands: corrections.thousands }),
    problems: listProblems([...table.problems, ...mergeProblems(plain.problems, reading.problems)]),
  };
}

/** True when the series may be fitted: something was read and no problem concerns the file as a whole. */
export function canFit(reading: SeriesReading): boolean {
  return reading.series !== null && !reading.problems.some(isBlocking);
}

interface OneReading {
  series: MonthlySeries | null;
  grain: Grain;
  /** The months were a spreadsheet's day numbers. */
  isSerial: boolean;
  names: RowsToRead['names'];
  problems: SeriesProblem[];
}

function readOnce(
  table: TableReading,
  mapping: SeriesMapping,
  columns: ColumnIndexes,
  { thisMonth }: ReadingOptions,
  corrections: Corrections,
): OneReading {
  const kept = table.rows.filter(({ row }) => !corrections.skippedRows.has(row));
  const long =
    columns.long && toWide({ ...table, rows: kept }, mapping, { month: columns.month, ...columns.long });
  const { month, focal, rival } = long ? { month: 0, focal: 1, rival: 2 } : columns;
  const { header, rows } = long ? long.table : { header: table.header, rows: kept };
  const problems = long ? [...long.problems] : [];
  const readings = readMonthColumn(
    rows.map(({ cells }) => cells[month]),
    mapping.dateOrder,
  );
  const grain = detectGrain(readings);
  const names = { month: header[month], focal: header[focal], rival: header[rival] };
  const toRead: RowsToRead = {
    rows,
    readings,
    columns: { month, focal, rival },
    names,
    rowOfCell: long?.rowOfCell ?? ((row) => row),
    mapping,
    corrections,
  };
  const monthRows =
    grain === 'day' || grain === 'week'
      ? readFineRows(toRead, grain, problems)
      : readMonthRows(toRead, problems);
  const inTime = monthRows.filter(
    (row) => !(corrections.skipsFuture && thisMonth !== undefined && row.month > thisMonth),
  );
  const { series, rowOf } = assembleSeries(inTime, names, problems);
  if (series !== null) {
    const found = checkSeries(series, { ...names, rowOf }, thisMonth);
    problems.push(...found.filter(({ code }) => !(grain === 'quarter' && code === 'month-missing')));
  }
  const isSerial = rows.length > 0 && /^\d{5}([.,]\d+)?$/.test(rows[0].cells[month]);
  return { series, grain, isSerial, names, problems };
}

/** What there is to choose stays listed once chosen; the rest is as the corrected reading found it. */
function mergeProblems(
  plain: readonly SeriesProblem[],
  corrected: readonly SeriesProblem[],
): SeriesProblem[] {
  if (plain === corrected) return [...plain];
  const chosenAbout = plain.filter(({ fixes }) => fixes !== undefined);
  const keys = new Set(chosenAbout.map(problemKey));
  return [...chosenAbout, ...corrected.filter((problem) => !keys.has(problemKey(problem)))];
}
