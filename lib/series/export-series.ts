/**
 * Monthly series -> CSV that any spreadsheet opens and `readSeries` reads back to the same series. A name that a spreadsheet would
 * run as a formula is shielded by an apostrophe (OWASP, CSV injection).
 */
import Papa from 'papaparse';
import { FORMULA_START } from './clean-name';
import { formatMonth } from './month';
import { readCountText } from './number';
import type { MonthlySeries } from './types';

export interface NamedSeries {
  series: MonthlySeries;
  focalName: string;
  rivalName: string;
}

export const MONTH_HEADER = 'Month';

/** Header and one row a month, lines ended by CR LF (RFC 4180); a gap is an empty cell. */
export function toCsv({ series, focalName, rivalName }: NamedSeries): string {
  const header = [MONTH_HEADER, focalName, rivalName];
  const rows = series.focal.map((count, index) => [
    formatMonth(series.firstMonth + index),
    writeCount(count),
    writeCount(series.rival[index]),
  ]);
  return `${writeCsv([header, ...rows])}\r\n`;
}

/** Shortest form that reads back to the same double; 12.345 gets a zero more, for it could also be twelve thousand. */
function writeCount(count: number | null): string {
  if (count === null) return '';
  return readCountText(String(count)).kind === 'ambiguous' ? `${count}0` : String(count);
}

/** Rows of cells -> CSV with formulas shielded, for every table that leaves the application. */
export function writeCsv(rows: (string | number)[][]): string {
  return Papa.unparse(rows, { escapeFormulae: FORMULA_START, newline: '\r\n' });
}
