import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { MAX_YEAR, MIN_YEAR } from '@/lib/series/limits';
import {
  addMonths,
  formatMonth,
  makeMonth,
  monthOfYear,
  parseMonth,
  readMonthText,
  yearOf,
} from '@/lib/series/month';

const march = makeMonth(2024, 3);

describe('a text that names one month', () => {
  test.each([
    ['2024-03'],
    ['2024-3'],
    ['2024/03'],
    ['2024.03'],
    ['2024 03'],
    ['202403'],
    ['2024M03'],
    ['2024-M03'],
    ['03/2024'],
    ['3/2024'],
    ['03-2024'],
    ['03.2024'],
    ['2024-03-01'],
    ['2024-03-31'],
    ['2024/03/31'],
    ['2024.03.31'],
    ['20240331'],
    ['31.03.2024'],
    ['31/03/2024'],
    ['03/31/2024'],
    ['3/31/2024'],
    ['03/03/2024'],
    ['2024-03-31T23:59:59Z'],
    ['2024-03-01T00:00:00+05:45'],
    ['2024-03-31T23:59:59.999-08:00'],
    ['2024-03-31 00:00'],
    ['3/31/2024 12:00 AM'],
    ['Mar 2024'],
    ['mar. 2024'],
    ['MARCH 2024'],
    ['March, 2024'],
    ['Mar-2024'],
    ['Mar2024'],
    ['2024 Mar'],
    ['2024-Mar'],
    ['31 Mar 2024'],
    ['31-Mar-2024'],
    ['March 31, 2024'],
    ['31st March 2024'],
    ['März 2024'],
    ['Maerz 2024'],
    ['mars 2024'],
    ['marzo de 2024'],
    ['março 2024'],
    ['maart 2024'],
    ['  2024-03  '],
    ['2024–03'],
    ['2024\u00a003'],
  ])('%j is March 2024', (text) => {
    expect(parseMonth(text)).toBe(march);
  });

  test.each([
    ['Mai 2024', 5],
    ['juin 2024', 6],
    ['Juli 2024', 7],
    ['août 2024', 8],
    ['Okt 2024', 10],
    ['Dez. 2024', 12],
    ['ene 2024', 1],
    ['settembre 2024', 9],
    ['févr. 2024', 2],
  ])('%j is month %d', (text, month) => {
    expect(parseMonth(text)).toBe(makeMonth(2024, month));
  });
});

test.each([
  [''],
  ['2024'],
  ['2024-13'],
  ['2024-00'],
  ['2024-03-32'],
  ['31/13/2024'],
  ['1824-03'],
  ['2224-03'],
  ['2024-Q5'],
  ['5Q24'],
  ['2024-W54'],
  ['1234'],
  ['Total'],
  ['March'],
  ['Mar Apr 2024'],
  ['jui 2024'],
  ['Mar 2024 2025'],
  ['2024-03; DROP'],
  ['1e3'],
  ['31.5'],
  ['12.24'],
  ['-5'],
  ['١٢/٢٠٢٤'],
])('%j names no month', (text) => {
  expect(parseMonth(text)).toBeNull();
  expect(readMonthText(text).candidates).toEqual([]);
});

test.each([
  ['03/04/2024', ['2024-04', '2024-03']],
  ['03.04.2024', ['2024-04', '2024-03']],
  ['01/02/03', ['2003-02', '2003-01', '2001-02']],
  ['03/05', ['2005-03', '2003-05']],
])('%j stays open between its readings', (text, months) => {
  expect(parseMonth(text)).toBeNull();
  expect(readMonthText(text).candidates.map(({ month }) => formatMonth(month))).toEqual(months);
});

test.each([['Mar-24'], ["Mar '24"], ['31-Mar-24'], ['03/24']])(
  '%j alone may be a day of a year not given',
  (text) => {
    expect(parseMonth(text)).toBeNull();
    expect(readMonthText(text).candidates.map(({ month }) => formatMonth(month))).toEqual(['2024-03']);
  },
);

const anyMonth = fc.integer({ min: makeMonth(MIN_YEAR, 1), max: makeMonth(MAX_YEAR, 12) });

test('every month comes back from its written form', () => {
  fc.assert(fc.property(anyMonth, (month) => parseMonth(formatMonth(month)) === month));
});

test('a month is its year and its place in the year', () => {
  fc.assert(fc.property(anyMonth, (month) => makeMonth(yearOf(month), monthOfYear(month)) === month));
});

test('months are counted without gaps over the turn of a year', () => {
  expect(formatMonth(addMonths(makeMonth(2023, 11), 3))).toBe('2024-02');
  expect(formatMonth(addMonths(makeMonth(2024, 1), -1))).toBe('2023-12');
});

test('a month of the year outside 1 to 12 is a caller’s bug', () => {
  expect(() => makeMonth(2024, 13)).toThrow('month of the year 13');
  expect(() => formatMonth(Number.NaN)).toThrow('NaN');
});

test('no text is too strange to read', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary' }), (text) => {
      const month = parseMonth(text);
      return month === null || Number.isInteger(month);
    }),
  );
});

test.each([
  ['2024-Q1', 'quarter', '2024-03', null],
  ['Q3 2024', 'quarter', '2024-09', null],
  ['4Q24', 'quarter', '2024-12', null],
  // ISO 8601: week 1 of 2025 begins on Monday, 30 December 2024, and its Thursday lies in January
  ['2025-W01', 'week', '2025-01', Date.UTC(2024, 11, 30) / 86_400_000],
  ['Week 5 2024', 'week', '2024-02', Date.UTC(2024, 0, 29) / 86_400_000],
  ['2024-03-31', 'day', '2024-03', Date.UTC(2024, 2, 31) / 86_400_000],
  ['Mar 2024', 'month', '2024-03', null],
])('%j is a %s of %s', (text, period, month, day) => {
  const [candidate] = readMonthText(text).candidates;
  expect(candidate).toMatchObject({ period, day });
  expect(formatMonth(candidate!.month)).toBe(month);
});

test('a number of five digits names a day of a spreadsheet, but no month by itself', () => {
  // ECMA-376: 45352 is 1 March 2024 in the 1900 system
  expect(readMonthText('45352').candidates).toMatchObject([{ day: Date.UTC(2024, 2, 1) / 86_400_000 }]);
  expect(parseMonth('45352')).toBeNull();
});
