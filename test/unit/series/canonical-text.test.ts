import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readCanonicalText, toCanonicalText } from '@/lib/series/canonical-text';
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

describe('read back', () => {
  const count = fc.option(
    fc.oneof(fc.double({ min: 1e-9, max: 1e15, noNaN: true }), fc.integer({ min: 1, max: 1e9 })),
    {
      nil: null,
    },
  );

  test('gives the same series, to the last bit', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 23_000, max: 25_000 }),
        fc.array(fc.tuple(count, count), { minLength: 1, maxLength: 40 }),
        (firstMonth, rows) => {
          const focal = rows.map(([users]) => users);
          const rival = rows.map(([, users]) => users);
          focal[0] ??= 1;
          rival[rows.length - 1] ??= 2;
          const series = { firstMonth, focal, rival };
          expect(readCanonicalText(toCanonicalText(series))).toEqual(series);
        },
      ),
    );
  });

  test.each([
    ['', 'nothing'],
    ['elbowroom-series 2\n2024-01,1,2\n', 'another format'],
    ['elbowroom-series 1\n', 'no month'],
    ['elbowroom-series 1\n2024-01,1,2', 'no end'],
    ['elbowroom-series 1\n2024-01,1,2\n2024-03,1,2\n', 'a month left out'],
    ['elbowroom-series 1\n2024-13,1,2\n', 'no such month'],
    ['elbowroom-series 1\n2024-01,1.0,2\n', 'another spelling'],
    ['elbowroom-series 1\n2024-01,-1,2\n', 'below zero'],
    ['elbowroom-series 1\n2024-01,1e999,2\n', 'not finite'],
    ['elbowroom-series 1\n2024-01,2e15,2\n', 'too large'],
    ['elbowroom-series 1\n2024-01,,\n2024-02,1,2\n', 'an unknown first month'],
    ['elbowroom-series 1\n2024-01,1,2\n2024-02,0,2\n', 'a zero after the launch'],
    ['elbowroom-series 1\n2024-01,1,2,3\n', 'a cell too many'],
    ['elbowroom-series 1\n1899-12,1,2\n', 'a year out of range'],
    [`elbowroom-series 1\n${'2024-01,1,2\n'.repeat(10_000)}`, 'too long'],
  ])('refuses %j: %s', (text) => {
    expect(readCanonicalText(text)).toBeNull();
  });
});
