/**
 * Which column is the month, and which two are the firms' counts. A guess for the preview and the command line; people can choose
 * others. The first column of counts is taken for the focal firm.
 */
import { guessLong } from './long-layout';
import { readMonthColumn } from './month-column';
import { readCountText } from './number';
import type { ColumnGuess, TableRow } from './types';

/** Rows looked at. */
const ROWS_TO_GUESS_FROM = 200;

/** Share of the filled cells that must be months, or counts. */
const MIN_SHARE = 0.6;

const MONTH_HEADER = /month|date|period|time|monat|datum|mois|mes\b|fecha|mese|data\b|maand/i;

/** Columns that are seldom a firm: a running number, the sum, a share. Taken only when nothing else is there. */
const SUPPORT_HEADER =
  /^(id|no\.?|nr\.?|#|index|row|day|week|year|total|sum|all|market|share|growth|change)\b|%/i;

export function guessColumns(header: readonly string[], rows: readonly TableRow[]): ColumnGuess {
  const sample = rows.slice(0, ROWS_TO_GUESS_FROM);
  const columns = header.map((name, index) => ({
    name,
    index,
    cells: sample.map(({ cells }) => cells[index]),
  }));
  const month = guessMonth(columns);
  const counts = columns.filter((column) => column !== month && shareOfCounts(column.cells) >= MIN_SHARE);
  const firms = counts.filter(({ name, cells }) => !SUPPORT_HEADER.test(name) && !isRunningNumber(cells));
  const [focal, rival] = firms.length >= 2 ? firms : counts;
  const others = columns.filter((column) => column !== month && !counts.includes(column));
  // All rows: one firm may fill the first thousands.
  const widen = ({ name, index }: Column) => ({ name, cells: rows.map(({ cells }) => cells[index]) });
  const users = firms.length > 0 ? firms : counts;
  const long = guessLong(month && widen(month), others.map(widen), users);
  if (long) return { month: month!.name, ...long };
  return { month: month?.name ?? null, focal: focal?.name ?? null, rival: rival?.name ?? null, long: null };
}

interface Column {
  name: string;
  index: number;
  cells: string[];
}

function guessMonth(columns: Column[]): Column | undefined {
  const scored = columns
    .map((column) => ({ column, isNamed: MONTH_HEADER.test(column.name) }))
    .map(({ column, isNamed }) => ({ column, isNamed, share: shareOfMonths(column.cells, isNamed) }))
    .filter(({ share }) => share >= MIN_SHARE);
  scored.sort((a, b) => Number(b.isNamed) - Number(a.isNamed) || b.share - a.share);
  return scored[0]?.column;
}

/** Open cells with one reading, such as 03/24, are months only in a column that says so. */
function shareOfMonths(cells: string[], isNamed: boolean): number {
  return shareOf(readMonthColumn(cells, undefined, isNamed), (reading) => {
    return (
      reading.kind === 'month' || (reading.kind === 'ambiguous' && (isNamed || reading.months.length > 1))
    );
  });
}

function shareOfCounts(cells: string[]): number {
  return shareOf(cells.map(readCountText), ({ kind }) => kind === 'count' || kind === 'ambiguous');
}

/** Share of the filled cells; 0 when all are empty. */
function shareOf<T extends { kind: string }>(readings: T[], isMeant: (reading: T) => boolean): number {
  const filled = readings.filter(({ kind }) => kind !== 'empty' && kind !== 'missing');
  return filled.length === 0 ? 0 : filled.filter(isMeant).length / filled.length;
}

/** 1, 2, 3, ... down the rows. */
function isRunningNumber(cells: string[]): boolean {
  const first = Number(cells[0]);
  return (
    cells.length > 2 &&
    cells.every((cell, index) => cell !== '' && Number(cell) === first + index) &&
    first <= 1
  );
}
