import { expect, test } from 'vitest';
import { describeDifference } from '@/lib/brief/difference-words';
import { createMonthFormat } from '@/lib/brief/month-words';
import { compareSeries, type SeriesContent } from '@/lib/series/compare-series';

const MARCH = 2024 * 12 + 2;
const months = createMonthFormat('en-US');
const describe = (before: SeriesContent, after: SeriesContent) =>
  describeDifference(compareSeries(before, after), months, 'en-US');
const before: SeriesContent = {
  series: { firstMonth: MARCH, focal: [1000, 2, null], rival: [4, 5, 6] },
  exclusions: [{ month: MARCH + 1, reason: 'strike' }],
};

test('new, changed and gone months, and those left out or taken in, are counted and named', () => {
  const after: SeriesContent = {
    series: { firstMonth: MARCH + 1, focal: [2, 3.25, 7], rival: [5, 6, null] },
    exclusions: [{ month: MARCH + 2, reason: 'storm' }],
  };
  const { summary, rows } = describe(before, after);
  expect(summary).toBe('1 month added, 1 changed, 1 removed, 1 left out of the fit, 1 taken in again.');
  expect(rows.map(({ label, kind, reason }) => [label, kind, reason])).toEqual([
    ['Mar 2024', 'gone', ''],
    ['Apr 2024', 'taken in again', ''],
    ['May 2024', 'changed, left out', 'storm'],
    ['Jun 2024', 'new', ''],
  ]);
  expect(rows[0]!.focal).toEqual({ before: '1,000', after: null, isChanged: true });
  expect(rows[2]!.rival).toEqual({ before: '6', after: '6', isChanged: false });
  expect(rows[2]!.focal).toEqual({ before: null, after: '3.25', isChanged: true });
});

test('the same content has no row', () => {
  expect(describe(before, before)).toEqual({ summary: 'No month differs.', rows: [] });
});

test('another reason alone is a row, but no changed count', () => {
  const reworded = { ...before, exclusions: [{ month: MARCH + 1, reason: 'storm' }] };
  expect(describe(before, reworded).rows).toMatchObject([{ kind: 'other reason', reason: 'storm' }]);
});
