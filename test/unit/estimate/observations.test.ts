import { describe, expect, it } from 'vitest';
import { readObservations } from '@/lib/estimate/observations';
import { MIN_MONTHS_TO_FIT } from '@/lib/series/limits';

const growing = (months: number) => Array.from({ length: months }, (_, t) => 100 + 10 * t);
const read = (focal: (number | null)[], rival: (number | null)[]) =>
  readObservations({ firstMonth: 24000, focal, rival });

describe('observations', () => {
  it('hold ln counts at the months that have one', () => {
    const focal = growing(14) as (number | null)[];
    focal[5] = null;
    const reading = read(focal, growing(14));
    if (!reading.ok) throw new Error(reading.status);
    const [first] = reading.observations.firms;
    expect(Array.from(first.months)).toEqual([0, 1, 2, 3, 4, 6, 7, 8, 9, 10, 11, 12, 13]);
    expect(first.logCounts[5]).toBe(Math.log(160));
  });

  it('begin with the first positive count and let the other firm enter later', () => {
    const reading = read([0, null, ...growing(16)], [0, 0, 0, null, 0, ...growing(13)]);
    if (!reading.ok) throw new Error(reading.status);
    const { months, skippedMonths, firms } = reading.observations;
    expect([months, skippedMonths, firms[0].entry, firms[1].entry]).toEqual([16, 2, 0, 3]);
  });

  it('treat a zero or nonsense after the launch as not observed', () => {
    const focal = growing(17);
    focal[4] = 0;
    focal[6] = Number.NaN;
    focal[8] = Number.POSITIVE_INFINITY;
    focal[9] = -3;
    const reading = read(focal, growing(17));
    if (!reading.ok) throw new Error(reading.status);
    expect(reading.observations.firms[0].months.length).toBe(13);
  });

  it('take a run of zeros to the end for an exit while the other firm goes on, and nothing less', () => {
    const exitOf = (focal: (number | null)[], rival: (number | null)[]) => {
      const reading = read(focal, rival);
      if (!reading.ok) throw new Error(reading.status);
      return reading.observations.firms.map(({ exit }) => exit);
    };
    const ending = (zeros: (number | null)[]) => [...growing(14), ...zeros];
    expect(exitOf(ending([0, 0, 0]), growing(17))).toEqual([14, undefined]);
    // months of the grid: it begins with the first count of either firm
    expect(exitOf([0, 0, ...ending([0, 0, 0])], [0, 0, ...growing(17)])).toEqual([14, undefined]);
    expect(exitOf(ending([0, 0]), growing(16))).toEqual([undefined, undefined]);
    expect(exitOf(ending([0, null, 0]), growing(17))).toEqual([undefined, undefined]);
    // both silent: the counts ended, not the firms
    expect(exitOf(ending([0, 0, 0]), ending([0, 0, 0]))).toEqual([undefined, undefined]);
  });

  it('are too short when fewer than twelve months are known of both firms', () => {
    const month = MIN_MONTHS_TO_FIT - 1;
    expect(read(growing(month), growing(month))).toEqual({ ok: false, status: 'too-short' });
    expect(read(growing(MIN_MONTHS_TO_FIT), growing(MIN_MONTHS_TO_FIT)).ok).toBe(true);
  });

  it('are of no use when a firm never has a user, or nothing varies', () => {
    expect(read(growing(24), new Array(24).fill(0))).toEqual({ ok: false, status: 'no-usable-data' });
    expect(read([], [])).toEqual({ ok: false, status: 'no-usable-data' });
    expect(read(new Array(24).fill(5), new Array(24).fill(7))).toEqual({
      ok: false,
      status: 'no-usable-data',
    });
    expect(read(growing(24), new Array(24).fill(7)).ok).toBe(true);
  });

  it('refuse rows of different length', () => {
    expect(() => read(growing(12), growing(13))).toThrow('equal lengths, got 12 and 13');
  });
});
