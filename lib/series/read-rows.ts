/**
 * Rows of a table -> one row a month with both firms' counts, each cell that cannot be used reported. Rows finer than months are
 * brought to months (`grain.ts`).
 */
import { type Corrections, cellKey } from './fixes';
import { type FineRow, toMonths } from './grain';
import { formatMonth } from './month';
import type { MonthReading } from './month-column';
import { type CountReading, readCountColumn } from './number';
import { makeError, makeWarning } from './problem';
import type { Month, SeriesMapping, SeriesProblem, TableRow } from './types';

type Role = 'month' | 'focal' | 'rival';

export interface RowsToRead {
  rows: readonly TableRow[];
  /** One per row. */
  readings: readonly MonthReading[];
  columns: Record<Role, number>;
  names: Record<Role, string>;
  /** Row of the file that gave a cell. */
  rowOfCell: (row: number, column: number) => number;
  mapping: SeriesMapping;
  corrections: Corrections;
}

/** A month's counts and the row of the file that gave them; null where there is no usable count. */
export interface MonthCounts {
  row: number;
  month: Month;
  focal: number | null;
  rival: number | null;
}

export function readMonthRows(table: RowsToRead, problems: SeriesProblem[]): MonthCounts[] {
  const dated = dateRows(table, ({ month }) => month, problems);
  const focal = readCounts(table, dated, 'focal', problems);
  const rival = readCounts(table, dated, 'rival', problems);
  return dated.map(({ row, month }, index) => ({ row, month, focal: focal[index], rival: rival[index] }));
}

export function readFineRows(
  table: RowsToRead,
  grain: 'day' | 'week',
  problems: SeriesProblem[],
): MonthCounts[] {
  const { mapping, corrections, names } = table;
  const dated = dateRows(table, ({ day, month }) => day ?? -month, problems);
  const focal = readCounts(table, dated, 'focal', problems);
  const rival = readCounts(table, dated, 'rival', problems);
  const fine: FineRow[] = dated.flatMap(({ row, month, day }, index) =>
    day === null ? [] : [{ row, month, day, focal: focal[index], rival: rival[index] }],
  );
  const gapIn = (row: number, role: Role) => corrections.gaps.has(cellKey(row, names[role]));
  return toMonths(fine, grain, mapping.aggregation ?? 'mean').flatMap(({ isPartial, ...counts }) => {
    const { row, month } = counts;
    if (isPartial) {
      problems.push(makeWarning('month-partial', { row, column: names.month, value: formatMonth(month) }));
      if (!corrections.keepsPartialMonths) return [];
    }
    if (gapIn(row, 'focal')) counts.focal = null;
    if (gapIn(row, 'rival')) counts.rival = null;
    return [counts];
  });
}

interface DatedRow extends TableRow {
  month: Month;
  day: number | null;
}

/** Rows whose period is known and not taken by an earlier row. */
function dateRows(
  { rows, readings, columns, names }: RowsToRead,
  periodOf: (reading: Extract<MonthReading, { kind: 'month' }>) => number,
  problems: SeriesProblem[],
): DatedRow[] {
  const firstRows = new Map<number, number>();
  const dated: DatedRow[] = [];
  for (const [index, reading] of readings.entries()) {
    const { row, cells } = rows[index];
    const place = { row, column: names.month, value: cells[columns.month] };
    if (reading.kind === 'ambiguous') {
      problems.push(makeError('month-ambiguous', { ...place, readings: reading.months.map(formatMonth) }));
    } else if (reading.kind !== 'month') {
      problems.push(makeError('month-unreadable', place));
    } else if (firstRows.has(periodOf(reading))) {
      const other = { row: firstRows.get(periodOf(reading))!, value: formatMonth(reading.month) };
      problems.push(makeError('month-duplicate', { ...place, other }));
    } else {
      firstRows.set(periodOf(reading), row);
      dated.push({ ...rows[index], month: reading.month, day: reading.day });
    }
  }
  return dated;
}

/** Users per dated row; null where there is no usable count. */
function readCounts(
  { columns, names, rowOfCell, mapping, corrections }: RowsToRead,
  dated: readonly DatedRow[],
  role: 'focal' | 'rival',
  problems: SeriesProblem[],
): (number | null)[] {
  const column = columns[role];
  const name = names[role];
  const isGap = ({ row }: DatedRow) =>
    corrections.gaps.has(cellKey(row, name)) || corrections.gaps.has(cellKey(rowOfCell(row, column), name));
  const readings = readCountColumn(
    dated.map((row) => (isGap(row) ? '' : row.cells[column])),
    mapping.decimalMark,
  );
  const unit = corrections.thousands.has(name) ? 1000 : 1;
  problems.push(...findMissing(dated, readings, column, name));
  return readings.map((reading, index) => {
    const { row, cells } = dated[index];
    const place = { row: rowOfCell(row, column), column: name, value: cells[column] };
    if (reading.kind === 'unreadable') problems.push(makeError('count-unreadable', place));
    if (reading.kind === 'ambiguous') {
      problems.push(
        makeError('count-ambiguous', { ...place, readings: [String(reading.point), String(reading.comma)] }),
      );
    }
    if (reading.kind !== 'count') return null;
    if (reading.value < 0) problems.push(makeError('count-negative', place));
    return reading.value < 0 ? null : reading.value * unit;
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
