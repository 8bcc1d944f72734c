import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { provenMark, readCountColumn, readCountText } from '@/lib/series/number';

describe('a count that can be read one way only', () => {
  test.each([
    ['0', 0],
    ['-0', 0],
    ['1234', 1234],
    ['0012', 12],
    ['+12', 12],
    [' 1234 ', 1234],
    ['1234.5', 1234.5],
    ['13,75', 13.75],
    ['0,123', 0.123],
    ['.5', 0.5],
    ['1234,567', 1234.567],
    ['1,234,567', 1234567],
    ['1.234.567', 1234567],
    ['12,34,567', 1234567],
    ['1,234.5', 1234.5],
    ['1.234,5', 1234.5],
    ['1,234,567.89', 1234567.89],
    ['1 234', 1234],
    ['1\u00a0234\u00a0567', 1234567],
    ['1\u202f234,5', 1234.5],
    ['1\u2009234', 1234],
    ["1'234", 1234],
    ['1’234’567.5', 1234567.5],
    ['12k', 12000],
    ['12.5k', 12500],
    ['12,5 K', 12500],
    ['1.2M', 1200000],
    ['1.2 million', 1200000],
    ['3 mn', 3000000],
    ['2,5 Mio.', 2500000],
    ['1.5bn', 1.5e9],
    ['1.005k', null],
    ['1.0055k', 1005.5],
    ['1.2E+05', 120000],
    ['1e3', 1000],
    ['-5', -5],
    ['−5', -5],
    ['(1234)', -1234],
  ])('%j', (text, value) => {
    const reading = readCountText(text);
    if (value === null) expect(reading.kind).toBe('ambiguous');
    else expect(reading).toEqual({ kind: 'count', value });
  });
});

test.each([
  ['1,234', 1234, 1.234],
  ['1.234', 1.234, 1234],
  ['12.500', 12.5, 12500],
  ['999,999', 999999, 999.999],
  ['1.234k', 1234, 1234000],
  ['(1,234)', -1234, -1.234],
])('%j keeps both readings', (text, point, comma) => {
  expect(readCountText(text)).toEqual({ kind: 'ambiguous', point, comma });
});

test.each([[''], ['  '], ['-'], ['–'], ['n/a'], ['N/A'], ['NaN'], ['null'], ['#N/A'], ['k. A.'], ['..']])(
  '%j is missing',
  (text) => {
    expect(readCountText(text)).toEqual({ kind: 'missing' });
  },
);

test.each([
  ['12%'],
  ['12 %'],
  ['abc'],
  ['12abc'],
  ['$12'],
  ['1,23,4'],
  ['1.23.4'],
  ['1 23'],
  ['1234 567'],
  ['1,2,3'],
  ['12²'],
  ['~1200'],
  ['<100'],
  ['5.'],
  ['1e400'],
  ['0x1F'],
  ['Infinity'],
  ['١٢٣'],
  ['=1+1'],
  ['12,345,67'],
])('%j is no count', (text) => {
  expect(readCountText(text)).toEqual({ kind: 'unreadable' });
});

describe('a column', () => {
  const values = (texts: string[], mark?: 'point' | 'comma') =>
    readCountColumn(texts, mark).map((reading) => (reading.kind === 'count' ? reading.value : reading.kind));

  test('one cell that proves the decimal mark settles the others', () => {
    expect(values(['1,234', '1,234.5'])).toEqual([1234, 1234.5]);
    expect(values(['1,234', '13,75'])).toEqual([1.234, 13.75]);
    expect(values(['1.234', '1.234.567'])).toEqual([1234, 1234567]);
    expect(values(['1.234k', '1.2k'])).toEqual([1234, 1200]);
  });

  test('plain digits prove nothing', () => {
    expect(values(['980', '1,020'])).toEqual([980, 'ambiguous']);
  });

  test('cells that contradict each other leave the open ones open', () => {
    expect(provenMark(['13,75', '13.75'])).toBeNull();
    expect(values(['13,75', '13.75', '1,234'])).toEqual([13.75, 13.75, 'ambiguous']);
  });

  test('a person’s answer settles the open ones and changes no other', () => {
    expect(values(['1,234', '1.5'], 'point')).toEqual([1234, 1.5]);
    expect(values(['1,234', '1.5'], 'comma')).toEqual([1.234, 1.5]);
  });
});

test('a number written by the language itself is read back exactly or is one of two readings', () => {
  fc.assert(
    fc.property(fc.double({ min: 0, max: 1e15, noNaN: true }), (value) => {
      const reading = readCountText(String(value));
      if (reading.kind === 'ambiguous') return reading.point === value;
      return reading.kind === 'count' && reading.value === value;
    }),
  );
});

test('thousands marks never change a whole number', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1_000_000, max: 1e12 }),
      fc.constantFrom(',', '.', ' ', "'"),
      (value, mark) => {
        const text = String(value).replace(/\B(?=(\d{3})+$)/g, mark);
        expect(readCountText(text)).toEqual({ kind: 'count', value });
      },
    ),
  );
});

test('no text is too strange to read', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary' }), (text) => typeof readCountText(text).kind === 'string'),
  );
});
