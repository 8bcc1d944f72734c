/** The open series that the browser tests upload, against the published table it was made from. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { parseMonth } from '@/lib/series/month';
import { readTable } from '@/lib/series/parse-table';
import { canFit, readSeriesFromTable } from '@/lib/series/read-series';

const table = readTable(readFileSync('test/browser/data/gause-paramecium.csv', 'utf8'));
const source = readTable(readFileSync('test/reference/data/gause1934_app_t3_paramecium.csv', 'utf8'));

test('the columns are guessed', () => {
  expect(table.guess).toEqual({ month: 'Month', focal: 'P. aurelia', rival: 'P. caudatum', long: null });
});

test('every counted day is a month, the day not counted is a gap, and nothing stops a fit', () => {
  const { month, focal, rival } = table.guess;
  const reading = readSeriesFromTable(table, { month: month!, focal: focal!, rival: rival! });
  const column = (name: string) =>
    source.rows.map(({ cells }) => {
      const cell = cells[source.header.indexOf(name)];
      return cell === '' ? null : Number(cell);
    });
  expect(reading.series).toEqual({
    firstMonth: parseMonth('2020-01'),
    focal: column('aurelia_mix'),
    rival: column('caudatum_mix'),
  });
  expect(reading.problems.map(({ code, row }) => [code, row])).toEqual([
    ['count-missing', 3],
    ['count-missing', 3],
  ]);
  expect(canFit(reading)).toBe(true);
});
