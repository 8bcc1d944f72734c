/**
 * One text per series, for hashing and for sending: the same counts give the same text whatever file they came from.
 * Numbers are written in the shortest form that reads back to the same double (ECMAScript Number::toString).
 */
import { MAX_COUNT, MAX_SERIES_MONTHS, MAX_YEAR, MIN_YEAR } from './limits';
import { formatMonth, makeMonth, parseMonth } from './month';
import type { MonthlySeries } from './types';

const FORMAT = 'elbowroom-series 1';

/** A line, "2024-03,1200.5,": ECMAScript writes numbers with digits, a point and an exponent. */
const LINE = /^(\d{4}-\d{2}),([\d.e+-]*),([\d.e+-]*)$/;

/** Longest text of a series within its limits: no number needs more than 24 characters. */
export const MAX_CANONICAL_LENGTH = (MAX_SERIES_MONTHS + 1) * 64;

/** "elbowroom-series 1", then a line "2024-03,focal,rival" a month; a gap is empty. */
export function toCanonicalText({ firstMonth, focal, rival }: MonthlySeries): string {
  const lines = focal.map(
    (count, index) => `${formatMonth(firstMonth + index)},${count ?? ''},${rival[index] ?? ''}`,
  );
  return [FORMAT, ...lines, ''].join('\n');
}

/**
 * The series of a text that `toCanonicalText` wrote, and null for every other text: months in a row, counts within the limits
 * in their one spelling, at least one of them in the first and in the last month, no zero after a firm's first users.
 */
export function readCanonicalText(text: string): MonthlySeries | null {
  if (text.length > MAX_CANONICAL_LENGTH) return null;
  const rows = text.split('\n').slice(1, -1).map(readLine);
  if (rows.length === 0 || rows.length > MAX_SERIES_MONTHS || rows.some((row) => row === null)) return null;
  const known = rows as Row[];
  const series = {
    firstMonth: known[0]!.month,
    focal: known.map(({ focal }) => focal),
    rival: known.map(({ rival }) => rival),
  };
  const isEnclosed = [known[0]!, known.at(-1)!].every(({ focal, rival }) => focal !== null || rival !== null);
  const isSound =
    isEnclosed && isWithinYears(series) && !hasInnerZero(series.focal) && !hasInnerZero(series.rival);
  return isSound && toCanonicalText(series) === text ? series : null;
}

/** A zero after the launch: it would be minus infinity on the log scale of the method. */
export function hasInnerZero(counts: readonly (number | null)[]): boolean {
  const launch = counts.findIndex((count) => count !== null && count > 0);
  return launch >= 0 && counts.indexOf(0, launch) >= 0;
}

interface Row {
  month: number;
  focal: number | null;
  rival: number | null;
}

function readLine(line: string): Row | null {
  const [, monthText, focalText, rivalText] = LINE.exec(line) ?? [];
  const month = monthText === undefined ? null : parseMonth(monthText);
  if (month === null) return null;
  const [focal, rival] = [readCount(focalText!), readCount(rivalText!)];
  return focal === undefined || rival === undefined ? null : { month, focal, rival };
}

/** null: a gap; undefined: no count. */
function readCount(text: string): number | null | undefined {
  if (text === '') return null;
  const count = Number(text);
  return count >= 0 && count <= MAX_COUNT ? count : undefined;
}

function isWithinYears({ firstMonth, focal }: MonthlySeries): boolean {
  return firstMonth >= makeMonth(MIN_YEAR, 1) && firstMonth + focal.length - 1 <= makeMonth(MAX_YEAR, 12);
}
