/**
 * The long layout, one row per month and firm (month, firm, users): recognised, and turned into one row a month with a column for
 * each of the two chosen firms.
 */
import { cleanName } from './clean-name';
import { makeError } from './problem';
import type { ColumnGuess, SeriesMapping, SeriesProblem, TableReading, TableRow } from './types';

/** A column of firms has at most this many different names. */
const MAX_FIRMS = 200;
/** Rows per firm from which a repeated word is a name and not an accident. */
const MIN_ROWS_PER_FIRM = 3;
/** Share of rows whose month and firm no other row has. */
const MIN_DISTINCT_SHARE = 0.9;

interface Column {
  name: string;
  cells: string[];
}

/**
 * @param columns those that are neither the month nor all numbers
 * @returns the column of firms and the two firms with the most rows; null: each firm has a column of its own
 */
export function guessLong(
  month: Column | undefined,
  columns: readonly Column[],
  counts: readonly Column[],
): Pick<ColumnGuess, 'focal' | 'rival' | 'long'> | null {
  const users = counts[0];
  if (!month || !users) return null;
  for (const column of columns) {
    if (!hasFewNames(column.cells)) continue;
    const firms = rankFirms(column.cells);
    const [focal, rival] = firms;
    if (!focal || !rival || rival.rows < MIN_ROWS_PER_FIRM) continue;
    const pairs = new Set(month.cells.map((cell, index) => `${cell}\n${column.cells[index]}`));
    const isEach = pairs.size >= MIN_DISTINCT_SHARE * month.cells.length;
    const areMonthsShared = new Set(month.cells).size < pairs.size;
    if (isEach && areMonthsShared)
      return { focal: focal.name, rival: rival.name, long: { firm: column.name, users: users.name } };
  }
  return null;
}

function hasFewNames(cells: readonly string[]): boolean {
  const names = new Set<string>();
  return cells.every((cell) => names.add(cell).size <= MAX_FIRMS);
}

/** Names of a column of firms, the one with the most rows first, then as they stand. */
export function rankFirms(cells: readonly string[]): { name: string; rows: number }[] {
  const rows = new Map<string, number>();
  for (const cell of cells) {
    const name = cleanName(cell);
    if (name !== '') rows.set(name, (rows.get(name) ?? 0) + 1);
  }
  return [...rows].map(([name, count]) => ({ name, rows: count })).sort((a, b) => b.rows - a.rows);
}

/** Row of the file and text of a cell that was moved. */
export interface WideTable {
  table: TableReading;
  problems: SeriesProblem[];
  /** Row of the file that gave a cell, by the row of the wide table and its column; the row itself when absent. */
  rowOfCell: (row: number, column: number) => number;
}

/** @param long the headers were found in the table */
export function toWide(
  table: TableReading,
  mapping: SeriesMapping,
  columns: { month: number; firm: number; users: number },
): WideTable {
  const names = [cleanName(mapping.focal), cleanName(mapping.rival)];
  const problems: SeriesProblem[] = [];
  const byMonth = new Map<string, { wide: TableRow; places: (number | null)[] }>();
  for (const { row, cells } of table.rows) {
    const firm = names.indexOf(cleanName(cells[columns.firm]));
    if (firm < 0) continue;
    const month = cells[columns.month];
    const entry = byMonth.get(month) ?? { wide: { row, cells: [month, '', ''] }, places: [null, null] };
    byMonth.set(month, entry);
    const taken = entry.places[firm];
    if (taken !== null) {
      const other = { row: taken, value: month };
      problems.push(makeError('month-duplicate', { row, column: names[firm], value: month, other }));
      continue;
    }
    entry.places[firm] = row;
    entry.wide.cells[firm + 1] = cells[columns.users];
  }
  const found = rankFirms(table.rows.map(({ cells }) => cells[columns.firm])).map(({ name }) => name);
  for (const name of names.filter((name) => !found.includes(name)))
    problems.push(makeError('firm-not-found', { value: name, readings: found.slice(0, MAX_FIRMS) }));
  const entries = [...byMonth.values()];
  const places = new Map(entries.map(({ wide, places }) => [wide.row, places]));
  return {
    table: {
      ...table,
      header: [table.header[columns.month], ...names],
      rows: entries.map(({ wide }) => wide),
    },
    problems,
    rowOfCell: (row, column) => places.get(row)?.[column - 1] ?? row,
  };
}
