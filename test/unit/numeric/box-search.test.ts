import { expect, it } from 'vitest';
import { minimiseInBox } from '@/lib/numeric/box-search';

it('finds the inner minimum of a bowl', () => {
  const end = minimiseInBox((x) => (x[0] - 0.3) ** 2 + 4 * (x[1] + 0.2) ** 2, [-1, -1], [1, 1], 5);
  // Steps end at 1e-6 of a side.
  expect(end.point[0]).toBeCloseTo(0.3, 4);
  expect(end.point[1]).toBeCloseTo(-0.2, 4);
});

it('stays in the box when the minimum is outside, and on values that are no numbers', () => {
  const end = minimiseInBox((x) => (x[0] > 0.5 ? Number.NaN : -x[0]), [0], [1], 3);
  expect(end.point[0]).toBeCloseTo(0.5, 4);
  expect(minimiseInBox((x) => x[0], [2], [3], 3).point[0]).toBe(2);
});

it('takes the best valley of two when the grid sees it', () => {
  const value = (x: Float64Array) => Math.min((x[0] - 0.1) ** 2 + 0.01, (x[0] - 0.9) ** 2);
  expect(minimiseInBox(value, [0], [1], 5).point[0]).toBeCloseTo(0.9, 4);
});
