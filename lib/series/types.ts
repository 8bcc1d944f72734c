/**
 * A calendar month as one integer: year * 12 + (month - 1). No clock, no time zone.
 * `month.ts` turns it into and out of "2024-03".
 */
export type Month = number;

/** Monthly user counts of two firms over consecutive months. null: not observed. 0 before the first count: not launched. */
export interface MonthlySeries {
  firstMonth: Month;
  /** Users, one entry a month; both arrays have the same length. */
  focal: (number | null)[];
  rival: (number | null)[];
}

/**
 * What is wrong, as facts without a sentence; `explain.ts` turns it into what happened, why, and what to try.
 * error with a row: that cell or row is not used, the others are. error without a row: the whole file cannot be fitted.
 * warning: used as it stands, or kept as a gap, but somebody should look.
 */
export interface SeriesProblem {
  code: SeriesProblemCode;
  severity: 'error' | 'warning';
  /** 1-based row of the file as a spreadsheet shows it (the header is row 1); null: about the whole file. */
  row: number | null;
  /** Column header, or null. */
  column: string | null;
  /** The text of the cell as it stood, cut to 60 characters, or null. */
  value: string | null;
  /** Every reading of an ambiguous cell, written without ambiguity. */
  readings?: string[];
  /** The place this one clashes or compares with: the earlier duplicate, the count before a jump, the end of a gap. */
  other?: { row: number | null; value: string };
}

export type SeriesProblemCode =
  | 'empty-file'
  | 'too-large'
  | 'not-text'
  | 'no-header'
  | 'too-few-columns'
  | 'column-not-found'
  | 'same-column-twice'
  | 'row-misaligned'
  | 'quote-open'
  | 'month-unreadable'
  | 'month-ambiguous'
  | 'month-duplicate'
  | 'month-missing'
  | 'month-in-future'
  | 'count-unreadable'
  | 'count-ambiguous'
  | 'count-negative'
  | 'count-missing'
  | 'zero-inside'
  | 'jump'
  | 'identical-firms'
  | 'constant-sum'
  | 'unit-mismatch'
  | 'too-short-to-fit'
  | 'never-launched'
  | 'more-problems';

/** The mark between whole and fraction: 1.5 or 1,5. */
export type DecimalMark = 'point' | 'comma';

/** Which number comes first in 03/04/2024. */
export type DateOrder = 'day-first' | 'month-first';

/** Which columns to read, by header; the last two settle a file that could be read two ways. */
export interface SeriesMapping {
  month: string;
  focal: string;
  rival: string;
  decimalMark?: DecimalMark;
  dateOrder?: DateOrder;
}

/** A row of the file below the header; `cells` are trimmed and as many as the header has. */
export interface TableRow {
  /** 1-based row of the file as a spreadsheet shows it. */
  row: number;
  cells: string[];
}

/** Headers that look like the month and the two counts; null where none does. */
export interface ColumnGuess {
  month: string | null;
  focal: string | null;
  rival: string | null;
}

/** A file as a table, before anything is taken for a month or a count. Unusable files have no header and no rows. */
export interface TableReading {
  /** What separates the cells: comma, semicolon, tab or bar. */
  delimiter: string;
  /** Column names: cleaned, never empty, no two alike. */
  header: string[];
  rows: TableRow[];
  guess: ColumnGuess;
  problems: SeriesProblem[];
}

/** What was understood. `series` is null only when nothing could be read; otherwise it holds all that was readable. */
export interface SeriesReading {
  series: MonthlySeries | null;
  focalName: string;
  rivalName: string;
  problems: SeriesProblem[];
}
