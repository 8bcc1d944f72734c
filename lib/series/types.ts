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
  /** What can be done about it, what is done without a choice first; absent: nothing to choose. */
  fixes?: ProblemFix[];
}

/** Use as it stands; keep the cell as a gap; leave the row out; take the firm's counts times a thousand. */
export type ProblemFix = 'use' | 'gap' | 'skip-row' | 'times-thousand';

export type SeriesProblemCode =
  | 'empty-file'
  | 'too-large'
  | 'not-text'
  | 'workbook-locked'
  | 'workbook-empty'
  | 'workbook-macros'
  | 'workbook-swollen'
  | 'workbook-broken'
  | 'firm-not-found'
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
  | 'month-partial'
  | 'month-unfinished'
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

/** How rows finer than months are brought to months: their mean, or the last one of each month. */
export type Aggregation = 'mean' | 'last';

/** Which columns to read, by header, and how to read a file that could be read two ways. */
export interface SeriesMapping {
  month: string;
  /** Header of the firm's counts; in the long layout the firm's name as it stands in the column of firms. */
  focal: string;
  rival: string;
  /** Long layout, one row per month and firm: headers of the column that names the firm and of the one that counts. */
  long?: { firm: string; users: string };
  decimalMark?: DecimalMark;
  dateOrder?: DateOrder;
  /** For daily and weekly rows; absent: the mean. */
  aggregation?: Aggregation;
  /** Choices among the fixes of problems, keyed by `problemKey`. */
  fixes?: Record<string, ProblemFix>;
}

/** How often the rows come. */
export type Grain = 'day' | 'week' | 'month' | 'quarter';

/** A row of the file below the header; `cells` are trimmed and as many as the header has. */
export interface TableRow {
  /** 1-based row of the file as a spreadsheet shows it. */
  row: number;
  cells: string[];
}

/** Headers that look like the month and the two counts; null where none does. */
export interface ColumnGuess {
  month: string | null;
  /** In the long layout the two firms with the most rows. */
  focal: string | null;
  rival: string | null;
  /** null: each firm has a column of its own. */
  long: { firm: string; users: string } | null;
}

/** A file as a table, before anything is taken for a month or a count. Unusable files have no header and no rows. */
export interface TableReading {
  /** What separates the cells: comma, semicolon, tab or bar; a sheet of a workbook has none. */
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
  grain: Grain;
  /** How the file was read where it could be read otherwise, a sentence each. */
  notes: string[];
  problems: SeriesProblem[];
}

/** A sheet of a workbook as texts, row by row. */
export interface WorkbookSheet {
  name: string;
  rows: string[][];
}

export type WorkbookReading = { ok: true; sheets: WorkbookSheet[] } | { ok: false; problem: SeriesProblem };
