/**
 * Two public collections as file content, firm names and notes: csv-spectrum (github.com/max-mapper/csv-spectrum, BSD-2-Clause), tables
 * at the edges of CSV with what they hold as JSON; and the Big List of Naughty Strings (github.com/minimaxir/big-list-of-naughty-strings,
 * MIT).
 */
import { readdirSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { cleanName, FORMULA_START } from '@/lib/series/clean-name';
import { decodeText } from '@/lib/series/decode-text';
import { explainProblem } from '@/lib/series/explain';
import { toCsv } from '@/lib/series/export-series';
import { makeMonth } from '@/lib/series/month';
import { readTable } from '@/lib/series/parse-table';
import { canFit, readSeries } from '@/lib/series/read-series';

const SPECTRUM = dirname(createRequire(import.meta.url).resolve('csv-spectrum/package.json'));
const NAUGHTY = createRequire(import.meta.url)('big-list-of-naughty-strings/blns.json') as string[];

/** Cells as this project keeps them: trimmed, names cleaned. */
const trim = (value: unknown) => String(value).trim();

describe('csv-spectrum', () => {
  const names = readdirSync(join(SPECTRUM, 'csvs')).map((file) => file.replace(/\.csv$/, ''));

  test('has its twelve tables', () => {
    expect(names).toHaveLength(12);
  });

  /** Its JSON holds another telephone number than its table. */
  const DIFFERING_COLUMN: Record<string, number> = { location_coordinates: 0 };

  test.each(names)('%s holds what its JSON says', (name) => {
    const open = (path: string) => decodeText(readFileSync(join(SPECTRUM, path)));
    const table = readTable(open(`csvs/${name}.csv`));
    const expected = [JSON.parse(open(`json/${name}.json`))].flat() as Record<string, unknown>[];
    const isCompared = (_: unknown, column: number) => column !== DIFFERING_COLUMN[name];
    expect(table.header).toEqual(Object.keys(expected[0]!).map(cleanName));
    expect(table.rows.map(({ cells }) => cells.filter(isCompared))).toEqual(
      expected.map((row) => Object.values(row).map(trim).filter(isCompared)),
    );
  });
});

describe('the Big List of Naughty Strings', () => {
  test('is there', () => {
    expect(NAUGHTY.length).toBeGreaterThan(400);
  });

  test('as a whole file is refused with a sentence or read, never thrown at', () => {
    for (const text of [...NAUGHTY, NAUGHTY.join('\n'), NAUGHTY.join(',')]) {
      const reading = readSeries(text, { month: 'Month', focal: 'A', rival: 'B' });
      expect(canFit(reading)).toBe(false);
      for (const problem of reading.problems) expect(explainProblem(problem).what).toMatch(/\.$/);
    }
  });

  test('as months and counts becomes gaps with their rows', () => {
    const rows = NAUGHTY.map((text) => JSON.stringify(text).replaceAll('\\"', '""'));
    const good = Array.from(
      { length: 14 },
      (_, index) => `2023-${String(index + 1).padStart(2, '0')},${5 + index},7`,
    ).slice(0, 12);
    const text = ['Month,A,B', ...good, ...rows.map((cell) => `${cell},${cell},${cell}`)].join('\n');
    const { series, problems } = readSeries(text, { month: 'Month', focal: 'A', rival: 'B' });
    expect(series!.focal.slice(0, 12)).toEqual(good.map((_, index) => 5 + index));
    for (const problem of problems) expect(explainProblem(problem).why).not.toMatch(/undefined|NaN/);
  });

  test('as firm names comes back from an export as the clean name, and starts no formula', () => {
    const series = { firstMonth: makeMonth(2024, 1), focal: [1, 2], rival: [3, 4] };
    for (const text of NAUGHTY) {
      const name = cleanName(text);
      expect(name).not.toMatch(/[\p{Cc}\p{Cs}]/u);
      const focalName = name === '' || name === 'Month' ? 'Ours' : name;
      const rivalName = `${focalName.slice(0, 40)} rival`;
      const csv = toCsv({ series, focalName, rivalName });
      const [header] = readTable(csv).header.length === 3 ? [readTable(csv).header] : [[]];
      expect(header).toEqual(['Month', focalName, cleanName(rivalName)]);
      const firstCells = csv
        .split('\r\n')[0]!
        .split(',')
        .map((cell) => cell.replace(/^"/, ''));
      if (FORMULA_START.test(focalName)) expect(firstCells[1]!.startsWith("'")).toBe(true);
      expect(
        readSeries(csv, { month: 'Month', focal: focalName, rival: cleanName(rivalName) }).series,
      ).toEqual(series);
    }
  });
});
