import { expect, test } from 'vitest';
import { keepExclusions, leaveOut } from '@/lib/series/exclusions';

const SERIES = { firstMonth: 24_300, focal: [1, 2, 3, 4], rival: [null, 6, 7, 8] };

test('an excluded month is a gap for both firms; the series stays as it was', () => {
  const before = structuredClone(SERIES);
  expect(leaveOut(SERIES, [{ month: 24_301, reason: 'strike' }])).toEqual({
    firstMonth: 24_300,
    focal: [1, null, 3, 4],
    rival: [null, null, 7, 8],
  });
  expect(SERIES).toEqual(before);
});

test('excluded months at the ends are cut off, with what lies outside them unknown', () => {
  const ends = [24_300, 24_303].map((month) => ({ month, reason: 'partial' }));
  expect(leaveOut(SERIES, ends)).toEqual({ firstMonth: 24_301, focal: [2, 3], rival: [6, 7] });
});

test('without exclusions the same counts; with all months excluded nothing', () => {
  expect(leaveOut(SERIES, [])).toEqual(SERIES);
  const all = [0, 1, 2, 3].map((index) => ({ month: 24_300 + index, reason: 'x' }));
  expect(leaveOut(SERIES, all)).toBeNull();
});

test('exclusions carry over to the months that newer counts still have', () => {
  const months = [24_299, 24_300, 24_303, 24_304].map((month) => ({ month, reason: 'x' }));
  expect(keepExclusions(months, SERIES).map(({ month }) => month)).toEqual([24_300, 24_303]);
});
