/** Reads the published CSV series of `test/reference/data` (sources in its README). */
import { readFileSync } from 'node:fs';
import type { PlainSeries } from '@/lib/estimate/plain-problem';

export type Table = Record<string, string>[];

export function readCsv(name: string): Table {
  const text = readFileSync(new URL(`../data/${name}`, import.meta.url), 'utf8');
  const [header, ...rows] = text
    .trim()
    .split(/\r?\n/)
    .map((line) => line.split(','));
  return rows.map((row) => Object.fromEntries(header.map((column, i) => [column, row[i] ?? ''])));
}

interface SeriesColumns {
  time: string;
  first: string;
  second: string;
  /** Counts are divided by this. */
  unit?: number;
}

/** Two columns as a series; times are counted from the first row, months in months. */
export function toSeries(table: Table, { time, first, second, unit = 1 }: SeriesColumns): PlainSeries {
  const clock = table.map((row) => readTime(row[time]));
  const readCounts = (column: string) =>
    table.map((row) => (row[column] === '' ? null : Number(row[column]) / unit));
  return { times: clock.map((t) => t - clock[0]), first: readCounts(first), second: readCounts(second) };
}

/** A number, or "2016-06" as months. */
function readTime(text: string): number {
  const [year, month] = text.split('-').map(Number);
  return month === undefined ? year : 12 * year + month;
}
