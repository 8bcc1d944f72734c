import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { explainProblem } from '@/lib/series/explain';
import { MAX_ROW_PROBLEMS } from '@/lib/series/limits';
import { formatMonth, makeMonth } from '@/lib/series/month';
import { canFit, readSeries } from '@/lib/series/read-series';
import type { SeriesMapping, SeriesReading } from '@/lib/series/types';

const mapping: SeriesMapping = { month: 'Month', focal: 'Ferrow', rival: 'Tarn' };
const first = makeMonth(2023, 1);

/** 24 good months; `change` may rewrite single lines ("2023-01,100,50" is line 0, row 2). */
function fileWith(change: Record<number, string> = {}, count = 24): string {
  const lines = Array.from({ length: count }, (_, index) => {
    return change[index] ?? `${formatMonth(first + index)},${100 + 7 * index},${50 + 3 * (index % 5)}`;
  });
  return ['Month,Ferrow,Tarn', ...lines].join('\n');
}

const listed = ({ problems }: SeriesReading) =>
  problems.map(({ code, severity, row, column, value }) => [code, severity, row, column, value]);

test('a clean file gives its series and no problem', () => {
  const reading = readSeries(fileWith(), mapping);
  expect(reading.problems).toEqual([]);
  expect(reading.focalName).toBe('Ferrow');
  expect(reading.rivalName).toBe('Tarn');
  expect(reading.series!.firstMonth).toBe(first);
  expect(reading.series!.focal.slice(0, 3)).toEqual([100, 107, 114]);
  expect(reading.series!.rival.slice(0, 3)).toEqual([50, 53, 56]);
  expect(canFit(reading)).toBe(true);
});

test('rows may stand in any order', () => {
  const [header, ...lines] = fileWith().split('\n');
  expect(readSeries([header, ...lines.reverse()].join('\n'), mapping)).toEqual(
    readSeries(fileWith(), mapping),
  );
});

test('the focal firm is the one that was chosen', () => {
  const reading = readSeries(fileWith(), { month: 'Month', focal: 'Tarn', rival: 'Ferrow' });
  expect(reading.focalName).toBe('Tarn');
  expect(reading.series!.focal[0]).toBe(50);
});

test('column names may differ in capitals', () => {
  expect(readSeries(fileWith(), { month: 'month', focal: 'FERROW', rival: 'tarn' }).focalName).toBe('Ferrow');
});

describe('each problem names its row, column and value, and only its own cell is lost', () => {
  const wide = '9'.repeat(70);
  test.each([
    ['text in a count', { 5: '2023-06,oops,65' }, ['count-unreadable', 'error', 7, 'Ferrow', 'oops']],
    [
      'a long text',
      { 5: `2023-06,${wide}x,65` },
      ['count-unreadable', 'error', 7, 'Ferrow', `${'9'.repeat(59)}…`],
    ],
    ['a share', { 5: '2023-06,12%,65' }, ['count-unreadable', 'error', 7, 'Ferrow', '12%']],
    ['a negative count', { 5: '2023-06,-4,65' }, ['count-negative', 'error', 7, 'Ferrow', '-4']],
    [
      'a count with two readings',
      { 5: '2023-06,"1,235",65' },
      ['count-ambiguous', 'error', 7, 'Ferrow', '1,235'],
    ],
    ['an empty count', { 5: '2023-06,,65' }, ['count-missing', 'warning', 7, 'Ferrow', '']],
    ['a count not available', { 5: '2023-06,n/a,65' }, ['count-missing', 'warning', 7, 'Ferrow', 'n/a']],
    ['a zero between counts', { 5: '2023-06,0,65' }, ['zero-inside', 'warning', 7, 'Ferrow', '2023-06']],
  ])('%s', (_, change, problem) => {
    const reading = readSeries(fileWith(change), mapping);
    expect(listed(reading)).toEqual([problem]);
    expect(reading.series!.focal[5]).toBeNull();
    expect(reading.series!.rival[5]).toBe(65);
    expect(reading.series!.focal.filter((count) => count === null)).toHaveLength(1);
    expect(canFit(reading)).toBe(true);
  });

  test.each([
    ['no month', { 5: 'soon,135,65' }, ['month-unreadable', 'error', 7, 'Month', 'soon']],
    ['an empty month', { 5: ',135,65' }, ['month-unreadable', 'error', 7, 'Month', '']],
    [
      'a day of two readings',
      { 5: '05/06/2023,135,65' },
      ['month-ambiguous', 'error', 7, 'Month', '05/06/2023'],
    ],
    ['cells too many', { 5: '2023-06,1,350,65' }, ['row-misaligned', 'error', 7, null, '2023-06,1,350,65']],
  ])('%s', (_, change, problem) => {
    const reading = readSeries(fileWith(change), mapping);
    expect(listed(reading)).toEqual([problem, ['month-missing', 'warning', 8, 'Month', '2023-06']]);
    expect(reading.series!.focal[5]).toBeNull();
    expect(reading.series!.rival[5]).toBeNull();
    expect(reading.series!.focal).toHaveLength(24);
  });

  test('a repeated month: the first row stands', () => {
    const reading = readSeries(fileWith({ 5: '2023-05,999,999' }), mapping);
    expect(listed(reading)[0]).toEqual(['month-duplicate', 'error', 7, 'Month', '2023-05']);
    expect(reading.problems[0].other).toEqual({ row: 6, value: '2023-05' });
    expect(reading.series!.focal[4]).toBe(128);
  });

  test('ambiguous cells carry both readings', () => {
    const count = readSeries(fileWith({ 5: '2023-06,"1,235",65' }), mapping).problems[0];
    expect(count.readings).toEqual(['1235', '1.235']);
    const month = readSeries(fileWith({ 5: '05/06/2023,135,65' }), mapping).problems[0];
    expect(month.readings).toEqual(['2023-06', '2023-05']);
  });

  test('a run of missing counts is one problem that names its end', () => {
    const reading = readSeries(fileWith({ 5: '2023-06,,65', 6: '2023-07,,66', 7: '2023-08,-,67' }), mapping);
    expect(listed(reading)).toEqual([['count-missing', 'warning', 7, 'Ferrow', '']]);
    expect(reading.problems[0].other).toEqual({ row: 9, value: '2023-08' });
  });

  test('months without a row are gaps, named once a run', () => {
    const text = fileWith()
      .split('\n')
      .filter((_, index) => ![4, 5, 10].includes(index))
      .join('\n');
    const reading = readSeries(text, mapping);
    expect(listed(reading)).toEqual([
      ['month-missing', 'warning', 5, 'Month', '2023-04'],
      ['month-missing', 'warning', 9, 'Month', '2023-10'],
    ]);
    expect(reading.problems[0].other?.value).toBe('2023-05');
    expect(reading.series!.focal.slice(2, 6)).toEqual([114, null, null, 135]);
  });
});

describe('answers of a person', () => {
  const swiss = [
    'Month,Ferrow,Tarn',
    ...Array.from({ length: 12 }, (_, i) => `${formatMonth(first + i)},"${2 + i},500",${40 + i}`),
  ];

  test('the decimal mark settles every open count', () => {
    const open = readSeries(swiss.join('\n'), mapping);
    expect(open.problems.filter(({ code }) => code === 'count-ambiguous')).toHaveLength(12);
    expect(canFit(open)).toBe(false);
    const settled = readSeries(swiss.join('\n'), { ...mapping, decimalMark: 'point' });
    expect(settled.problems).toEqual([]);
    expect(settled.series!.focal[0]).toBe(2500);
  });

  test('the order of day and month settles every open month', () => {
    const text = [
      'Month,Ferrow,Tarn',
      ...Array.from(
        { length: 12 },
        (_, i) => `01/${String(i + 1).padStart(2, '0')}/2023,${90 + i},${40 + 2 * i}`,
      ),
    ].join('\n');
    expect(canFit(readSeries(text, mapping))).toBe(false);
    const settled = readSeries(text, { ...mapping, dateOrder: 'day-first' });
    expect(settled.problems).toEqual([]);
    expect(settled.series!.focal).toHaveLength(12);
  });
});

describe('launch', () => {
  test('zeros before the first count mean not launched and are no problem', () => {
    const reading = readSeries(fileWith({ 0: '2023-01,100,0', 1: '2023-02,107,0' }), mapping);
    expect(reading.problems).toEqual([]);
    expect(reading.series!.rival.slice(0, 3)).toEqual([0, 0, 56]);
  });

  test('months in which neither firm is known are cut off at both ends', () => {
    const reading = readSeries(fileWith({ 0: '2023-01,,', 23: '2024-12,,' }), mapping);
    expect(reading.series!.firstMonth).toBe(first + 1);
    expect(reading.series!.focal).toHaveLength(22);
  });
});

describe('columns', () => {
  test('a column that is not there is named beside those that are', () => {
    const reading = readSeries(fileWith(), { ...mapping, rival: 'Holm' });
    expect(listed(reading)).toEqual([['column-not-found', 'error', null, null, 'Holm']]);
    expect(reading.problems[0].readings).toEqual(['Month', 'Ferrow', 'Tarn']);
    expect(reading.series).toBeNull();
  });

  test.each([
    ['both firms', { month: 'Month', focal: 'Tarn', rival: 'Tarn' }, 'Tarn'],
    ['month and firm', { month: 'Month', focal: 'Month', rival: 'Tarn' }, 'Month'],
  ])('the same column twice: %s', (_, twice, column) => {
    expect(listed(readSeries(fileWith(), twice))).toEqual([
      ['same-column-twice', 'error', null, column, null],
    ]);
  });
});

test('a mistyped year is named instead of a series of a century', () => {
  const reading = readSeries(fileWith({ 0: '1903-01,100,50' }), mapping);
  expect(listed(reading)).toEqual([
    ['too-large', 'error', null, 'Month', '1464 months (1903-01 to 2024-12)'],
  ]);
  expect(reading.series).toBeNull();
});

test('what comes after the month of the reader is noticed, and only when that month is given', () => {
  const reading = readSeries(fileWith(), mapping, { thisMonth: makeMonth(2024, 10) });
  expect(listed(reading)).toEqual([['month-in-future', 'warning', 25, 'Month', '2024-12']]);
  expect(readSeries(fileWith(), mapping, { thisMonth: makeMonth(2025, 1) }).problems).toEqual([]);
  expect(listed(readSeries(fileWith(), mapping, { thisMonth: makeMonth(2024, 12) }))).toEqual([
    ['month-unfinished', 'warning', 25, 'Month', '2024-12'],
  ]);
});

test('a flood of bad rows is counted, not listed', () => {
  const bad = Array.from({ length: 300 }, (_, index) => `nonsense ${index},1,2`);
  const { problems, series } = readSeries(`${fileWith()}\n${bad.join('\n')}`, mapping);
  expect(problems.filter(({ code }) => code === 'month-unreadable')).toHaveLength(MAX_ROW_PROBLEMS);
  expect(problems.at(-1)).toMatchObject({ code: 'more-problems', value: '100' });
  expect(series!.focal).toHaveLength(24);
});

test('nothing readable still ends in a sentence', () => {
  const reading = readSeries('Month,Ferrow,Tarn\n', mapping);
  expect(reading.series).toBeNull();
  expect(reading.problems.map(({ code }) => code)).toEqual(['too-short-to-fit']);
});

test('no file is too strange to read or to explain', () => {
  const cell = fc.oneof(
    fc.constantFrom(
      '2024-01',
      '2024-02',
      '01/02/2024',
      'Mar-24',
      '1,234',
      '-5',
      '0',
      '',
      'n/a',
      '12k',
      '=1',
      '"',
      '9e99',
      '\u202e',
    ),
    fc.string({ maxLength: 6 }),
  );
  const row = fc.array(cell, { minLength: 1, maxLength: 5 }).map((cells) => cells.join(','));
  fc.assert(
    fc.property(fc.array(row, { maxLength: 20 }), (rows) => {
      const { series, problems } = readSeries(['Month,Ferrow,Tarn', ...rows].join('\n'), mapping);
      const isSound =
        series === null || (series.focal.length === series.rival.length && series.focal.every(isCountOrGap));
      return isSound && problems.every((problem) => explainProblem(problem).what.length > 0);
    }),
    { numRuns: 500 },
  );
});

function isCountOrGap(count: number | null): boolean {
  return count === null || (Number.isFinite(count) && count >= 0);
}
