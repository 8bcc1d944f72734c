/**
 * Limits of what a file may hold and thresholds of the checks. Sizes in characters, rows, columns, months; the rest has no unit.
 */

/** A fit needs this many months in which both firms are known (0 before a launch counts as known). */
export const MIN_MONTHS_TO_FIT = 12;

/** Longest text read at all; larger files are refused, not cut. */
export const MAX_TEXT_LENGTH = 20_000_000;
export const MAX_ROWS = 200_000;
export const MAX_COLUMNS = 500;

/** A workbook: sheets offered at most, and bytes of its parts once unpacked. */
export const MAX_SHEETS = 50;
export const MAX_UNPACKED_BYTES = 150_000_000;

/** Longest span from the first to the last month: fifty years. Beyond it a mistyped year is the likely cause. */
export const MAX_SERIES_MONTHS = 600;

/** Years a month may have. */
export const MIN_YEAR = 1900;
export const MAX_YEAR = 2199;

/** Largest count: every integer up to here is exact in a double. */
export const MAX_COUNT = 1e15;

/** Header names and firm names are cut to this length. */
export const MAX_NAME_LENGTH = 80;

/** Cell texts quoted in problems are cut to this length. */
export const MAX_QUOTED_LENGTH = 60;

/** Problems about single rows listed at most; the rest is counted in one last entry. */
export const MAX_ROW_PROBLEMS = 200;

/** Growth or fall per month above which a count is worth a second look (common practice). */
export const JUMP_FACTOR = 3;

/** Ratio of the firms' median counts from which one of them is probably given in thousands (common practice). */
export const UNIT_MISMATCH_RATIO = 300;

/** Largest relative spread of the sum of both firms that still counts as constant: shares rounded to whole percent reach it. */
export const CONSTANT_SUM_SPREAD = 0.01;

/** Months with both firms known from which identical firms or a constant sum are no accident. */
export const MIN_MONTHS_TO_COMPARE = 6;
