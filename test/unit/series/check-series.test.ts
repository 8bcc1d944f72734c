import { describe, expect, test } from 'vitest';
import { checkSeries, countMonthsKnown } from '@/lib/series/check-series';
import { MIN_MONTHS_TO_FIT } from '@/lib/series/limits';
import { makeMonth } from '@/lib/series/month';
import type { MonthlySeries } from '@/lib/series/types';

const firstMonth = makeMonth(2023, 1);

function check(focal: (number | null)[], rival: (number | null)[]) {
  const series: MonthlySeries = { firstMonth, focal, rival };
  const source = {
    month: 'Month',
    focal: 'Ferrow',
    rival: 'Tarn',
    rowOf: (month: number) => month - firstMonth + 2,
  };
  return checkSeries(series, source).map(({ code, severity, row, column, value }) => [
    code,
    severity,
    row,
    column,
    value,
  ]);
}

const rising = Array.from({ length: 12 }, (_, index) => 100 + 9 * index);
const falling = rising.map((count) => 300 - count);
const other = rising.map((count, index) => count / 2 + (index % 3));

test('an ordinary series passes', () => {
  expect(check(rising, other)).toEqual([]);
});

describe('jumps', () => {
  test('more than three times in a month, up or down', () => {
    expect(check([...rising.slice(0, 11), 700], other)).toEqual([['jump', 'warning', 13, 'Ferrow', '700']]);
    expect(check([...rising.slice(0, 11), 60], other)).toEqual([['jump', 'warning', 13, 'Ferrow', '60']]);
  });

  test('exactly three times is no jump', () => {
    expect(check([...rising.slice(0, 11), 3 * rising[10]], other)).toEqual([]);
  });

  test('over a gap the months in between count', () => {
    const grown = 8 * rising[9];
    expect(check([...rising.slice(0, 10), null, grown], other).map(([code]) => code)).toEqual([
      'too-short-to-fit',
    ]);
    expect(check([...rising.slice(0, 9), null, null, grown, grown, grown], [...other, 60, 61])).toEqual([]);
  });

  test('a launch from zero is no jump', () => {
    expect(check([0, 0, ...rising.slice(2)], other)).toEqual([]);
  });
});

describe('firms', () => {
  test('identical firms cannot be fitted', () => {
    expect(check(rising, rising)).toEqual([['identical-firms', 'error', null, 'Tarn', null]]);
  });

  test('a sum that stays the same looks like shares', () => {
    expect(check(rising, falling)).toEqual([['constant-sum', 'warning', null, null, '300']]);
  });

  test('two firms that stand still are no shares', () => {
    expect(
      check(
        rising.map(() => 100),
        rising.map(() => 50),
      ),
    ).toEqual([]);
  });

  test('one firm a thousand times smaller', () => {
    expect(
      check(
        rising,
        other.map((count) => count / 1000),
      ),
    ).toEqual([['unit-mismatch', 'warning', null, 'Tarn', '1961']]);
  });

  test('a firm that never has a user', () => {
    expect(
      check(
        rising,
        rising.map(() => 0),
      ),
    ).toEqual([['never-launched', 'error', null, 'Tarn', null]]);
  });
});

describe('length', () => {
  test('eleven months are too short, twelve are enough', () => {
    expect(MIN_MONTHS_TO_FIT).toBe(12);
    expect(check(rising.slice(1), other.slice(1))).toEqual([['too-short-to-fit', 'error', null, null, '11']]);
    expect(check(rising, other)).toEqual([]);
  });

  test('only months in which both firms are known count; a zero before the launch is known', () => {
    expect(countMonthsKnown({ firstMonth, focal: [1, null, 3, 4], rival: [0, 0, null, 2] })).toBe(2);
  });
});
