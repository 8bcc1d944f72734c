import { describe, expect, test } from 'vitest';
import { formatMonth, makeMonth, monthOfYear, yearOf } from '@/lib/series/month';
import { type MonthReading, readMonthColumn } from '@/lib/series/month-column';

/** `count` months from March 2023, each written by `write`. */
function writeMonths(count: number, write: (year: string, month: string) => string): string[] {
  return Array.from({ length: count }, (_, index) => {
    const month = makeMonth(2023, 3) + index;
    return write(String(yearOf(month)), String(monthOfYear(month)).padStart(2, '0'));
  });
}

function show(reading: MonthReading): string {
  if (reading.kind === 'month') return formatMonth(reading.month);
  return reading.kind === 'ambiguous' ? reading.months.map(formatMonth).join('|') : reading.kind;
}

const expected = (count: number) => writeMonths(count, (year, month) => `${year}-${month}`);

describe('day and month', () => {
  test('a day above 12 settles the order for the whole column', () => {
    expect(readMonthColumn(['01/02/2024', '25/03/2024']).map(show)).toEqual(['2024-02', '2024-03']);
    expect(readMonthColumn(['01/02/2024', '03/25/2024']).map(show)).toEqual(['2024-01', '2024-03']);
  });

  test.each([
    ['first day of the month, day first', (year: string, month: string) => `01/${month}/${year}`],
    ['first day of the month, month first', (year: string, month: string) => `${month}/01/${year}`],
    ['dots', (year: string, month: string) => `01.${month}.${year}`],
    ['fifth day, no leading zeros', (year: string, month: string) => `${Number(month)}/5/${year}`],
    ['two-digit years', (year: string, month: string) => `01/${month}/${year.slice(2)}`],
  ])('13 rows of which only one order gives one row a month are settled: %s', (_, write) => {
    expect(readMonthColumn(writeMonths(13, write)).map(show)).toEqual(expected(13));
  });

  test('12 rows could be 12 days, so they stay open', () => {
    const readings = readMonthColumn(writeMonths(12, (year, month) => `01/${month}/${year}`));
    expect(show(readings[0])).toBe('2023-03|2023-01');
  });

  test('a person’s answer settles what the column leaves open', () => {
    expect(readMonthColumn(['01/02/2024'], 'day-first').map(show)).toEqual(['2024-02']);
    expect(readMonthColumn(['01/02/2024'], 'month-first').map(show)).toEqual(['2024-01']);
  });

  test('cells that contradict each other settle nothing for the open ones', () => {
    const readings = readMonthColumn(['01/02/2024', '25/03/2024', '03/25/2024']);
    expect(readings.map(show)).toEqual(['2024-02|2024-01', '2024-03', '2024-03']);
  });
});

describe('two-digit years', () => {
  test.each([
    [
      'Mar-24',
      (year: string, month: string) =>
        `${['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'][Number(month) - 1]}-${year.slice(2)}`,
    ],
    ['03/24', (year: string, month: string) => `${month}/${year.slice(2)}`],
    ['24-03', (year: string, month: string) => `${year.slice(2)}-${month}`],
    ['30-03-24', (year: string, month: string) => `${month === '02' ? 28 : 30}-${month}-${year.slice(2)}`],
  ])('one row a month over the turn of a year proves the form %s', (_, write) => {
    expect(readMonthColumn(writeMonths(12, write)).map(show)).toEqual(expected(12));
  });

  test('one row a month under two layouts stays open', () => {
    const readings = readMonthColumn(writeMonths(12, (year, month) => `28-${month}-${year.slice(2)}`));
    expect(show(readings[0])).toBe('2023-03|2028-03');
  });

  test('days of a year not given are not taken for years', () => {
    expect(readMonthColumn(['Jan 31', 'Feb 28', 'Mar 31', 'Apr 30']).map(({ kind }) => kind)).toEqual(
      Array(4).fill('ambiguous'),
    );
    expect(readMonthColumn(['31/01', '28/02', '31/03', '30/04']).map(({ kind }) => kind)).toEqual(
      Array(4).fill('ambiguous'),
    );
  });
});

test('empty cells and text are told apart', () => {
  expect(readMonthColumn(['', '  ', 'Total', '2024-03']).map(show)).toEqual([
    'empty',
    'empty',
    'unreadable',
    '2024-03',
  ]);
});

test('mixed ways of writing are read cell by cell', () => {
  expect(readMonthColumn(['2024-01', 'Feb 2024', '03/2024', '30.04.2024']).map(show)).toEqual([
    '2024-01',
    '2024-02',
    '2024-03',
    '2024-04',
  ]);
});
