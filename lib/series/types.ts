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

/** A number-free reference to what is wrong with a row; `explain.ts` turns it into what happened, why, and what to try. */
export interface SeriesProblem {
  code: SeriesProblemCode;
  severity: 'error' | 'warning';
  /** 1-based row of the file as a spreadsheet shows it (the header is row 1); null: about the whole file. */
  row: number | null;
  /** Column header, or null. */
  column: string | null;
  /** The text of the cell as it stood, cut to 60 characters, or null. */
  value: string | null;
}

export type SeriesProblemCode =
  | 'empty-file'
  | 'too-large'
  | 'not-text'
  | 'no-header'
  | 'too-few-columns'
  | 'column-not-found'
  | 'same-column-twice'
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
  | 'never-launched';
