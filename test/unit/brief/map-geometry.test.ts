import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  clipPolyline,
  clipSegment,
  distanceToPolyline,
  isInside,
  lengthInside,
  sharedArea,
} from '@/lib/brief/map-geometry';
import type { MapPoint } from '@/lib/brief/types';

const box = { x0: 0, y0: 0, x1: 10, y1: 5 };
const coordinate = fc.integer({ min: -20_000, max: 20_000 }).map((thousandths) => thousandths / 1000);
const point = fc.tuple(coordinate, coordinate) as fc.Arbitrary<MapPoint>;

describe('clipSegment', () => {
  it('cuts at the border', () => {
    expect(clipSegment([-5, 2], [15, 2], box)).toEqual([
      [0, 2],
      [10, 2],
    ]);
    expect(clipSegment([1, 1], [2, 2], box)).toEqual([
      [1, 1],
      [2, 2],
    ]);
    expect(clipSegment([-1, -1], [-2, 3], box)).toBeNull();
    expect(clipSegment([3, 8], [4, 9], box)).toBeNull();
  });

  it('gives a part of the segment that lies inside, and all of it', () => {
    fc.assert(
      fc.property(point, point, (a, b) => {
        const part = clipSegment(a, b, box);
        const samples = Array.from(
          { length: 101 },
          (_, i): MapPoint => [a[0] + ((b[0] - a[0]) * i) / 100, a[1] + ((b[1] - a[1]) * i) / 100],
        );
        const inside = samples.filter((one) => isInside(one, box)).length / 101;
        const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
        const kept = part ? Math.hypot(part[1][0] - part[0][0], part[1][1] - part[0][1]) : 0;
        // a hundred samples tell the length to two steps of one hundredth
        expect(Math.abs(kept - inside * length)).toBeLessThanOrEqual(0.02 * length + 1e-9);
        expect(lengthInside(a, b, box)).toBeCloseTo(kept, 9);
      }),
    );
  });
});

describe('clipPolyline', () => {
  it('keeps the first unbroken part', () => {
    expect(
      clipPolyline(
        [
          [-2, 1],
          [2, 1],
          [2, 9],
          [4, 9],
          [4, 1],
        ],
        box,
      ),
    ).toEqual([
      [0, 1],
      [2, 1],
      [2, 5],
    ]);
    expect(
      clipPolyline(
        [
          [20, 20],
          [30, 30],
        ],
        box,
      ),
    ).toEqual([]);
  });
});

describe('distances and areas', () => {
  it('measures to the nearest part of a line', () => {
    expect(
      distanceToPolyline(
        [5, 3],
        [
          [0, 0],
          [10, 0],
        ],
      ),
    ).toBe(3);
    expect(
      distanceToPolyline(
        [13, 4],
        [
          [0, 0],
          [10, 0],
        ],
      ),
    ).toBe(5);
    expect(distanceToPolyline([1, 1], [])).toBe(Number.POSITIVE_INFINITY);
  });

  it('finds what two boxes share', () => {
    expect(sharedArea(box, { x0: 8, y0: 4, x1: 12, y1: 9 })).toBe(2);
    expect(sharedArea(box, { x0: 11, y0: 0, x1: 12, y1: 5 })).toBe(0);
  });
});
