/**
 * Table + chosen columns -> monthly series. Whatever can be read is kept; whatever cannot is reported and becomes a gap (null).
 *   - months without a row between the first and the last one are gaps;
 *   - a zero before the first count means not launched; a later zero becomes a gap, for the method works on logarithms;
 *   - of two rows for one month the first stands;
 *   - months at either end in which neither firm is known are cut off.
 * Today's month, needed to notice future ones, is an argument: nothing here reads a clock.
 */
import { checkSeries } from './check-series';
import { cleanName } from './clean-name';
import { MAX_SERIES_MONTHS } from './limits';
import { formatMonth } from './month';
import { readMonthColumn } from './month-column';
import { type CountReading, readCountColumn } from './number';
import { readTable } from './parse-table';
import { isBlocking, listProblems, makeError, makeWarning } from './problem';
import type {
  Month,
  MonthlySeries,
  SeriesMapping,
  SeriesProblem,
  SeriesReading,
  TableReading,
  TableRow,
} from './types';

export interface ReadingOptions {
  /** The current month of the reader; without it no month counts as future. */
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
  if (columns === null)
    return { series: null, focalName, rivalName, problems: listProblems([...table.problems, ...problems]) };

  const { month, focal, rival } = columns;
  const names = { month: table.header[month], focal: table.header[focal], rival: table.header[rival] };
  const dated = dateRows(table.rows, month, names.month, mapping, problems);
  const counts = {
    focal: readCounts(dated, focal, names.focal, mapping, problems),
    rival: readCounts(dated, rival, names.rival, mapping, problems),
  };
  const { series, rowOf } = assemble(dated, counts, names, problems);
  if (series !== null) problems.push(...checkSeries(series, { ...names, rowOf }, options.thisMonth));
  return {
    series,
    focalName: names.focal,
    rivalName: names.rival,
    problems: listProblems([...table.problems, ...problems]),
  };
}

/** True when the series may be fitted: something was read and no problem concerns the file as a whole. */
export function canFit(reading: SeriesReading): boolean {
  return reading.series !== null && !reading.problems.some(isBlocking);
}

interface Names {
  month: string;
  focal: string;
  rival: string;
}

interface ColumnIndexes {
  month: number;
  focal: number;
  rival: number;
}

/** A row whose month is known and not taken by an earlier row. */
interface DatedRow extends TableRow {
  month: Month;
}

function findColumns(
  table: TableReading,
  mapping: SeriesMapping,
): { columns: ColumnIndexes | null; problems: SeriesProblem[] } {
  if (table.header.length === 0) return { columns: null, problems: [] };
  const columns = {
    month: findColumn(table.header, mapping.month),
    focal: findColumn(table.header, mapping.focal),
    rival: findColumn(table.header, mapping.rival),
  };
  const problems = (['month', 'focal', 'rival'] as const)
    .filter((role) => columns[role] < 0)
    .map((role) => makeError('column-not-found', { value: mapping[role], readings: table.header.slice() }));
  const isDistinct = new Set(Object.values(columns)).size === 3;
  if (problems.length === 0 && !isDistinct) {
    const twice = columns.focal === columns.rival ? mapping.focal : mapping.month;
    problems.push(makeError('same-column-twice', { column: cleanName(twice) }));
  }
  return { columns: problems.length === 0 ? columns : null, problems };
}

/** The exact header, else the only one that differs in capitals alone; -1 when there is none. */
function findColumn(header: readonly string[], name: string): number {
  const wanted = cleanName(name);
  const exact = header.indexOf(wanted);
  if (exact >= 0) return exact;
  const alike = header.flatMap((column, index) =>
    column.toLowerCase() === wanted.toLowerCase() ? [index] : [],
  );
  return alike.length === 1 ? alike[0] : -1;
}

function dateRows(
  rows: readonly TableRow[],
  column: number,
  name: string,
  mapping: SeriesMapping,
  problems: SeriesProblem[],
): DatedRow[] {
  const readings = readMonthColumn(
    rows.map(({ cells }) => cells[column]),
    mapping.dateOrder,
  );
  const firstRows = new Map<Month, number>();
  const dated: DatedRow[] = [];
  for (const [index, reading] of readings.entries()) {
    const { row, cells } = rows[index];
    const place = { row, column: name, value: cells[column] };
    if (reading.kind === 'ambiguous') {
      problems.push(makeError('month-ambiguous', { ...place, readings: reading.months.map(formatMonth) }));
    } else if (reading.kind !== 'month') {
      problems.push(makeError('month-unreadable', place));
    } else if (firstRows.has(reading.month)) {
      const other = { row: firstRows.get(reading.month)!, value: formatMonth(reading.month) };
      problems.push(makeError('month-duplicate', { ...place, other }));
    } else {
      firstRows.set(reading.month, row);
      dated.push({ ...rows[index], month: reading.month });
    }
  }
  return dated;
}

/** Users per dated row; null where there is no usable count. */
function readCounts(
  dated: readonly DatedRow[],
  column: number,
  name: string,
  mapping: SeriesMapping,
  problems: SeriesProblem[],
): (number | null)[] {
  const readings = readCountColumn(
    dated.map(({ cells }) => cells[column]),
    mapping.decimalMark,
  );
  problems.push(...findMissing(dated, readings, column, name));
  return readings.map((reading, index) => {
    const place = { row: dated[index].row, column: name, value: dated[index].cells[column] };
    if (reading.kind === 'unreadable') problems.push(makeError('count-unreadable', place));
    if (reading.kind === 'ambiguous') {
      problems.push(
        makeError('count-ambiguous', { ...place, readings: [String(reading.point), String(reading.comma)] }),
      );
    }
    if (reading.kind !== 'count') return null;
    if (reading.value < 0) problems.push(makeError('count-negative', place));
    return reading.value < 0 ? null : reading.value;
  });
}

/** One problem for each run of rows without a count. */
function findMissing(
  dated: readonly DatedRow[],
  readings: CountReading[],
  column: number,
  name: string,
): SeriesProblem[] {
  const problems: SeriesProblem[] = [];
  for (let start = 0; start < readings.length; start++) {
    if (readings[start].kind !== 'missing') continue;
    let end = start;
    while (readings[end + 1]?.kind === 'missing') end++;
    const { row, cells } = dated[start];
    const other = end > start ? { row: dated[end].row, value: formatMonth(dated[end].month) } : undefined;
    problems.push(makeWarning('count-missing', { row, column: name, value: cells[column], other }));
    start = end;
  }
  return problems;
}

interface Counts {
  focal: (number | null)[];
  rival: (number | null)[];
}

/** Rows in any order -> consecutive months. */
function assemble(dated: DatedRow[], counts: Counts, names: Names, problems: SeriesProblem[]) {
  const byMonth = new Map(dated.map((row, index) => [row.month, index]));
  const rowOf = (month: Month) => (byMonth.has(month) ? dated[byMonth.get(month)!].row : null);
  const known = dated.filter((_, index) => counts.focal[index] !== null || counts.rival[index] !== null);
  if (known.length === 0) {
    problems.push(makeError('too-short-to-fit', { value: '0' }));
    return { series: null, rowOf };
  }

  const months = known.map(({ month }) => month);
  const firstMonth = months.reduce((a, b) => Math.min(a, b));
  const lastMonth = months.reduce((a, b) => Math.max(a, b));
  const length = lastMonth - firstMonth + 1;
  if (length > MAX_SERIES_MONTHS) {
    const span = `${formatMonth(firstMonth)} to ${formatMonth(lastMonth)}`;
    const other = { row: null, value: `${MAX_SERIES_MONTHS} months` };
    problems.push(
      makeError('too-large', { column: names.month, value: `${length} months (${span})`, other }),
    );
    return { series: null, rowOf };
  }
  const pick = (values: (number | null)[]) =>
    Array.from({ length }, (_, index) => values[byMonth.get(firstMonth + index) ?? -1] ?? null);
  const series: MonthlySeries = { firstMonth, focal: pick(counts.focal), rival: pick(counts.rival) };
  problems.push(...clearInnerZeros(series.focal, firstMonth, names.focal, rowOf));
  problems.push(...clearInnerZeros(series.rival, firstMonth, names.rival, rowOf));
  return { series, rowOf };
}

/** Zeros after the first positive count become gaps, in place. */
function clearInnerZeros(
  counts: (number | null)[],
  firstMonth: Month,
  column: string,
  rowOf: (month: Month) => number | null,
): SeriesProblem[] {
  const launch = counts.findIndex((count) => count !== null && count > 0);
  const problems: SeriesProblem[] = [];
  for (let index = launch < 0 ? counts.length : launch; index < counts.length; index++) {
    if (counts[index] !== 0) continue;
    counts[index] = null;
    const month = firstMonth + index;
    problems.push(makeWarning('zero-inside', { row: rowOf(month), column, value: formatMonth(month) }));
  }
  return problems;
}
