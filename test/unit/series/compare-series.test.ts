import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { compareSeries, type SeriesContent } from '@/lib/series/compare-series';
import { mergeSeries } from '@/lib/series/merge-series';

const count = fc.option(fc.integer({ min: 1, max: 9 }), { nil: null });
/** Content with a count in its first and last month, as every stored series has. */
const content: fc.Arbitrary<SeriesContent> = fc
  .tuple(
    fc.integer({ min: 24_300, max: 24_304 }),
    fc.array(fc.tuple(count, count, fc.constantFrom(null, null, 'strike', 'panel')), {
      minLength: 2,
      maxLength: 6,
    }),
  )
  .map(([firstMonth, rows]) => {
    const last = rows.length - 1;
    return {
      series: {
        firstMonth,
        focal: rows.map(([focal], index) => (index === 0 || index === last ? (focal ?? 5) : focal)),
        rival: rows.map(([, rival]) => rival),
      },
      exclusions: rows.flatMap(([, , reason], index) =>
        reason === null ? [] : [{ month: firstMonth + index, reason }],
      ),
    };
  });
/** Exclusions of months in the series, in their order: what merging gives back. */
const plain = ({ series, exclusions }: SeriesContent) => ({ series, exclusions: [...exclusions] });

describe('compareSeries', () => {
  const before: SeriesContent = {
    series: { firstMonth: 24_300, focal: [1, 2, null, 4], rival: [5, 6, null, 8] },
    exclusions: [{ month: 24_301, reason: 'strike' }],
  };

  test('tells added, changed and removed months, and those left out or taken in', () => {
    const after: SeriesContent = {
      series: { firstMonth: 24_301, focal: [2, 3, 4.5, 5], rival: [6, null, 8, null] },
      exclusions: [],
    };
    expect(compareSeries(before, after)).toEqual([
      {
        month: 24_300,
        kind: 'removed',
        before: { focal: 1, rival: 5, exclusion: null },
        after: { focal: null, rival: null, exclusion: null },
      },
      {
        month: 24_301,
        kind: 'changed',
        before: { focal: 2, rival: 6, exclusion: 'strike' },
        after: { focal: 2, rival: 6, exclusion: null },
      },
      {
        month: 24_302,
        kind: 'added',
        before: { focal: null, rival: null, exclusion: null },
        after: { focal: 3, rival: null, exclusion: null },
      },
      {
        month: 24_303,
        kind: 'changed',
        before: { focal: 4, rival: 8, exclusion: null },
        after: { focal: 4.5, rival: 8, exclusion: null },
      },
      {
        month: 24_304,
        kind: 'added',
        before: { focal: null, rival: null, exclusion: null },
        after: { focal: 5, rival: null, exclusion: null },
      },
    ]);
  });

  test('of the same content is empty; the other way round, added and removed change places', () => {
    const swap = { added: 'removed', removed: 'added', changed: 'changed' };
    fc.assert(
      fc.property(content, content, (a, b) => {
        expect(compareSeries(a, a)).toEqual([]);
        const there = compareSeries(a, b).map(({ month, kind }) => [month, swap[kind]]);
        expect(compareSeries(b, a).map(({ month, kind }) => [month, kind])).toEqual(there);
      }),
    );
  });
});

describe('mergeSeries', () => {
  test('who changed nothing takes the other’s content as it is, without conflict', () => {
    fc.assert(
      fc.property(content, content, (base, other) => {
        expect(mergeSeries(base, base, other)).toEqual({ ...plain(other), conflicts: [] });
        expect(mergeSeries(base, other, base)).toEqual({ ...plain(other), conflicts: [] });
        expect(mergeSeries(base, other, other)).toEqual({ ...plain(other), conflicts: [] });
      }),
    );
  });

  test('keeps both people’s changes; where both changed one count, mine stands and the month is told', () => {
    const make = (focal: number[], rival: number[]): SeriesContent => ({
      series: { firstMonth: 24_300, focal, rival },
      exclusions: [],
    });
    const base = make([1, 2, 3], [4, 5, 6]);
    const merged = mergeSeries(base, make([10, 2, 30], [4, 5, 6]), make([1, 2, 33], [4, 50, 6]));
    expect(merged.series).toEqual({ firstMonth: 24_300, focal: [10, 2, 30], rival: [4, 50, 6] });
    expect(merged.conflicts).toEqual([24_302]);
  });
});
