import { expect, test } from 'vitest';
import { makeMonth } from '@/lib/series/month';
import { readTable } from '@/lib/series/parse-table';
import { canFit, readSeries } from '@/lib/series/read-series';
import { writeSample, writeTemplate } from '@/lib/series/template';

test('the template is a table of two years that ends with the month asked for', () => {
  const { header, rows, problems } = readTable(writeTemplate(makeMonth(2026, 2)));
  expect(header).toEqual(['Month', 'Our firm', 'The rival']);
  expect(rows.map(({ cells }) => cells[0])).toHaveLength(24);
  expect([rows[0]!.cells[0], rows.at(-1)!.cells[0]]).toEqual(['2024-03', '2026-02']);
  expect(problems).toEqual([]);
});

test('the sample can be fitted and has nothing to look at but its one unknown month', () => {
  const reading = readSeries(writeSample(), { month: 'Month', focal: 'Quillfern', rival: 'Marrowby' });
  expect(canFit(reading)).toBe(true);
  expect(reading.problems.map(({ code }) => code)).toEqual(['count-missing']);
});
