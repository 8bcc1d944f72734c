/**
 * Monthly series -> CSV that any spreadsheet opens and `readSeries` reads back to the same series. A name that a spreadsheet would
 * run as a formula is shielded by an apostrophe (OWASP, CSV injection).
 */
import Papa from 'papaparse';
import { FORMULA_START } from './clean-name';
import type { Exclusion } from './exclusions';
import { formatMonth } from './month';
import { readCountText } from './number';
import type { MonthlySeries } from './types';

export interface NamedSeries {
  series: MonthlySeries;
  focalName: string;
  rivalName: string;
  /** Months that the fit leaves out: with their reasons in a fourth column, where there are any. */
  exclusions?: readonly Exclusion[];
}

export const MONTH_HEADER = 'Month';
const REASON_HEADER = 'Left out because';

/** Header and one row a month, lines ended by CR LF (RFC 4180); a gap is an empty cell. */
export function toCsv({ series, focalName, rivalName, exclusions = [] }: NamedSeries): string {
  const reasons = new Map(exclusions.map(({ month, reason }) => [month, reason]));
  const addReason = (text: string) => (reasons.size > 0 ? [text] : []);
  const header = [MONTH_HEADER, focalName, rivalName, ...addReason(REASON_HEADER)];
  const rows = series.focal.map((count, index) => [
    formatMonth(series.firstMonth + index),
    writeCount(count),
    writeCount(series.rival[index]),
    ...addReason(reasons.get(series.firstMonth + index) ?? ''),
  ]);
  return `${writeCsv([header, ...rows])}\r\n`;
}

/** Shortest form that reads back to the same double; 12.345 gets a zero more, for it could also be twelve thousand. */
function writeCount(count: number | null): string {
  return count === null ? '' : spellCount(count);
}

/** A number that reads back as itself: 12.345 gets a zero more. */
export function spellCount(count: number): string {
  return readCountText(String(count)).kind === 'ambiguous' ? `${count}0` : String(count);
}

/** Rows of cells -> CSV with formulas shielded, for every table that leaves the application. */
export function writeCsv(rows: (string | number)[][]): string {
  return Papa.unparse(rows, { escapeFormulae: FORMULA_START, newline: '\r\n' });
}
