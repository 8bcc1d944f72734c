/** What a page knows of a source that was read, and what can be chosen about it. Free of the reading code, which lives in the worker. */
import type { SeriesMapping, SeriesProblem, SeriesReading } from '@/lib/series/types';

export interface ReadingChoices {
  /** Of a workbook; null: the first one that looks like counts. */
  sheet: number | null;
  /** null: guessed. */
  mapping: SeriesMapping | null;
}

export const NO_CHOICES: ReadingChoices = { sheet: null, mapping: null };

export interface Understood {
  /** Names of the sheets; empty: no workbook. */
  sheets: string[];
  sheet: number;
  header: string[];
  /** First rows of the table, as they stood. */
  sample: { row: number; cells: string[] }[];
  rowCount: number;
  /** Names in the column of firms, the most frequent first; empty: each firm has a column of its own. */
  firms: string[];
  /** null: the table has too few columns. */
  mapping: SeriesMapping | null;
  reading: SeriesReading;
  /** It may be stored. */
  canFit: boolean;
  /** How the file was read, for the record. */
  notes: string[];
}

/** There is something to choose about the source: its sheet or its columns. */
export function hasColumns({ mapping, sheets }: Understood): boolean {
  return mapping !== null || sheets.length > 1;
}

/** A cell that the file is asked about as a whole, and that is no problem of its own. */
export function isAsked({ code, readings = [] }: SeriesProblem): boolean {
  return (code === 'month-ambiguous' || code === 'count-ambiguous') && readings.length > 1;
}
