import fc from 'fast-check';
import { expect, test } from 'vitest';
import { cleanName } from '@/lib/series/clean-name';
import { MONTH_HEADER, type NamedSeries, toCsv, writeCsv } from '@/lib/series/export-series';
import { makeMonth } from '@/lib/series/month';
import { readSeries } from '@/lib/series/read-series';

const count = fc.oneof(
  fc.constantFrom(null, 12.345, 1.5, 999.999, 1e15, 0.001),
  fc.integer({ min: 1, max: 1e9 }),
  fc.double({ min: 1e-3, max: 1e12, noNaN: true }),
);
const name = fc.oneof(
  fc.constantFrom('=A1', '@x', '-1', '+2', "'", 'a,b', 'say "so"', 'Ünal & Söhne', '\u202eevil'),
  fc.string(),
);

const namedSeries = fc
  .record({
    firstMonth: fc.integer({ min: makeMonth(1950, 1), max: makeMonth(2100, 1) }),
    pairs: fc.array(fc.tuple(count, count), { minLength: 2, maxLength: 30 }),
    focalName: name.map(cleanName),
    rivalName: name.map(cleanName),
  })
  .filter(
    ({ focalName, rivalName }) =>
      focalName !== rivalName && ![focalName, rivalName].some((text) => text === '' || text === MONTH_HEADER),
  )
  .filter(({ pairs }) => pairs[0].some((one) => one !== null) && pairs.at(-1)!.some((one) => one !== null))
  .map(({ firstMonth, pairs, focalName, rivalName }): NamedSeries => {
    const series = {
      firstMonth,
      focal: pairs.map(([focal]) => focal),
      rival: pairs.map(([, rival]) => rival),
    };
    return { series, focalName, rivalName };
  });

test('what is exported is imported as the same series under the same names', () => {
  fc.assert(
    fc.property(namedSeries, (named) => {
      const mapping = { month: MONTH_HEADER, focal: named.focalName, rival: named.rivalName };
      const { series, focalName, rivalName } = readSeries(toCsv(named), mapping);
      expect({ series, focalName, rivalName }).toEqual(named);
    }),
    { numRuns: 300 },
  );
});

test.each([['=1+1'], ['+1'], ['-1'], ['@SUM(A1)'], ['\t=1'], ['＝1']])(
  'the text %j is not left to run as a formula',
  (text) => {
    const [cell] = writeCsv([[text, 'x']])
      .replaceAll('"', '')
      .split(',');
    expect(cell.startsWith("'")).toBe(true);
  },
);

test('numbers are written as they are, negative ones too', () => {
  expect(writeCsv([['change', -12.5]])).toBe('change,-12.5');
});

test('a gap is an empty cell and a zero a zero', () => {
  const series = { firstMonth: makeMonth(2024, 1), focal: [1, null], rival: [0, 2] };
  expect(toCsv({ series, focalName: 'A', rivalName: 'B' })).toBe(
    'Month,A,B\r\n2024-01,1,0\r\n2024-02,,2\r\n',
  );
});

test('months left out stand with their reasons in a fourth column, which is read back as no count', () => {
  const series = { firstMonth: makeMonth(2024, 1), focal: [1, 2], rival: [3, 4] };
  const exclusions = [{ month: makeMonth(2024, 2), reason: '=strike' }];
  const text = toCsv({ series, focalName: 'A', rivalName: 'B', exclusions });
  expect(text).toBe('Month,A,B,Left out because\r\n2024-01,1,3,\r\n2024-02,2,4,"\'=strike"\r\n');
  expect(readSeries(text, { month: 'Month', focal: 'A', rival: 'B' }).series).toEqual(series);
});
