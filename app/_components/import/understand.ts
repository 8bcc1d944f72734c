/**
 * A file or a paste -> what a page shows of it: the table's first rows, the columns that were chosen or guessed, the counts and
 * every problem. Runs in the reading worker; small results only, so that a page never waits for a large table.
 */
import { decodeText } from '@/lib/series/decode-text';
import { readTable } from '@/lib/series/parse-table';
import { readSeriesFromTable } from '@/lib/series/read-series';
import type { Month, SeriesMapping, SeriesReading, TableReading } from '@/lib/series/types';

/** Rows of the table that a page shows. */
const SAMPLE_ROWS = 6;

export interface ReadingChoices {
  /** null: guessed. */
  mapping: SeriesMapping | null;
}

export const NO_CHOICES: ReadingChoices = { mapping: null };

export interface Understood {
  header: string[];
  /** First rows of the table, as they stood. */
  sample: { row: number; cells: string[] }[];
  rowCount: number;
  /** null: the table has too few columns. */
  mapping: SeriesMapping | null;
  reading: SeriesReading;
  /** How the file was read, for the record. */
  notes: string[];
}

export function openBytes(bytes: Uint8Array): TableReading {
  return readTable(decodeText(bytes));
}

export function openText(text: string): TableReading {
  return readTable(text);
}

export function understand(table: TableReading, choices: ReadingChoices, thisMonth: Month): Understood {
  const mapping = fitMapping(table, choices.mapping);
  return {
    header: table.header,
    sample: table.rows.slice(0, SAMPLE_ROWS),
    rowCount: table.rows.length,
    mapping,
    reading: mapping
      ? readSeriesFromTable(table, mapping, { thisMonth })
      : { series: null, focalName: '', rivalName: '', grain: 'month', notes: [], problems: table.problems },
    notes: [],
  };
}

/** The chosen columns while the table has them, else the guess, else the columns in their order. */
function fitMapping(table: TableReading, chosen: SeriesMapping | null): SeriesMapping | null {
  const { header, guess } = table;
  const hasChosen =
    chosen && [chosen.month, chosen.focal, chosen.rival].every((name) => header.includes(name));
  if (hasChosen) return chosen;
  const [first, second, third] = header;
  if (first === undefined || second === undefined || third === undefined) return null;
  const rest = header.filter((name) => name !== guess.month && name !== guess.focal);
  return {
    month: guess.month ?? first,
    focal: guess.focal ?? second,
    rival: guess.rival ?? rest[0] ?? third,
  };
}
