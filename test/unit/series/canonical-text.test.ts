import { expect, test } from 'vitest';
import { toCanonicalText } from '@/lib/series/canonical-text';
import { makeMonth } from '@/lib/series/month';
import { readSeries } from '@/lib/series/read-series';

test('the form is fixed: stored hashes depend on it', () => {
  const series = { firstMonth: makeMonth(2023, 12), focal: [1, null, 2.5], rival: [0, 3e21, 7] };
  expect(toCanonicalText(series)).toBe('elbowroom-series 1\n2023-12,1,0\n2024-01,,3e+21\n2024-02,2.5,7\n');
});

test('the same counts give the same text whatever file they came from', () => {
  const comma = 'Month,A,B\n2024-01,1200,5\n2024-02,1300,6\n';
  const semicolon = 'B;Monat;A\n6;28.02.2024;1.3k\n5;31.01.2024;1,2k\n';
  const first = readSeries(comma, { month: 'Month', focal: 'A', rival: 'B' }).series!;
  const second = readSeries(semicolon, { month: 'Monat', focal: 'A', rival: 'B' }).series!;
  expect(toCanonicalText(second)).toBe(toCanonicalText(first));
});

test('one count more or less gives another text', () => {
  const series = { firstMonth: makeMonth(2024, 1), focal: [1, 2], rival: [3, 4] };
  expect(toCanonicalText({ ...series, focal: [1, null] })).not.toBe(toCanonicalText(series));
  expect(toCanonicalText({ ...series, firstMonth: series.firstMonth + 1 })).not.toBe(toCanonicalText(series));
});
