/** Workbooks: sheets as texts; locked, macro, swollen and broken ones refused with a sentence. */
import { strToU8, zipSync } from 'fflate';
import { describe, expect, test } from 'vitest';
import writeXlsxFile from 'write-excel-file/node';
import { explainProblem } from '@/lib/series/explain';
import { MAX_UNPACKED_BYTES } from '@/lib/series/limits';
import { formatMonth, makeMonth } from '@/lib/series/month';
import { readGrid } from '@/lib/series/parse-table';
import { readSeriesFromTable } from '@/lib/series/read-series';
import { isWorkbook, readWorkbook } from '@/lib/series/read-workbook';

const MONTHS = 14;
const dates = Array.from({ length: MONTHS }, (_, index) => new Date(Date.UTC(2023, index, 1)));

async function build(sheets: { sheet: string; data: unknown[][] }[]): Promise<Uint8Array> {
  const cells = sheets.map(({ sheet, data }) => ({
    sheet,
    data: data.map((row) =>
      row.map((value) => (value instanceof Date ? { value, type: Date, format: 'dd.mm.yyyy' } : { value })),
    ),
  }));
  return new Uint8Array(
    await writeXlsxFile(cells as Parameters<typeof writeXlsxFile>[0] as never).toBuffer(),
  );
}

async function refusalOf(bytes: Uint8Array) {
  const reading = await readWorkbook(bytes);
  if (reading.ok) throw new Error('was read');
  return reading.problem;
}

describe('a workbook', () => {
  test('gives its sheets by name, dates as days and fractions without doubt', async () => {
    const bytes = await build([
      { sheet: 'Notes', data: [['for the board']] },
      {
        sheet: 'Users',
        data: [['Month', 'Ours', 'Theirs'], ...dates.map((date, index) => [date, 1.25 + index, 2.345])],
      },
    ]);
    expect(isWorkbook(bytes)).toBe(true);
    const reading = await readWorkbook(bytes);
    if (!reading.ok) throw new Error(reading.problem.code);
    expect(reading.sheets.map(({ name }) => name)).toEqual(['Notes', 'Users']);
    const table = readGrid(reading.sheets[1]!.rows);
    const { month, focal, rival } = table.guess;
    const { series, problems } = readSeriesFromTable(table, { month: month!, focal: focal!, rival: rival! });
    expect(problems).toEqual([]);
    expect(formatMonth(series!.firstMonth)).toBe('2023-01');
    expect(series!.firstMonth).toBe(makeMonth(2023, 1));
    expect(series!.focal).toEqual(dates.map((_, index) => 1.25 + index));
    expect(series!.rival.every((count) => count === 2.345)).toBe(true);
  });

  test('with 20,000 rows is read whole', async () => {
    const data = Array.from({ length: 20_000 }, (_, index) => [`r${index}`, index]);
    const reading = await readWorkbook(await build([{ sheet: 'Long', data }]));
    expect(reading.ok && reading.sheets[0]!.rows).toHaveLength(20_000);
    expect(reading.ok && reading.sheets[0]!.rows[19_999]).toEqual(['r19999', '19999']);
  });
});

describe('what is no readable workbook is refused with a sentence:', () => {
  const parts = { '[Content_Types].xml': strToU8('<Types/>'), 'xl/workbook.xml': strToU8('<workbook/>') };
  const sheet = { 'xl/worksheets/sheet1.xml': strToU8('<worksheet/>') };
  /** The container of locked and old workbooks begins so (MS-CFB). */
  const locked = Uint8Array.of(0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1, ...new Array(600).fill(0));
  const whole = zipSync({ ...parts, ...sheet });

  test.each<[string, () => Uint8Array, string]>([
    ['locked or old', () => locked, 'workbook-locked'],
    [
      'with macros',
      () => zipSync({ ...parts, ...sheet, 'xl/vbaProject.bin': strToU8('x') }),
      'workbook-macros',
    ],
    ['an archive of something else', () => zipSync({ 'holiday.jpg': strToU8('x') }), 'workbook-empty'],
    ['cut off', () => whole.slice(0, whole.length - 40), 'workbook-broken'],
    ['with garbled sheets', () => whole, 'workbook-broken'],
    ['zip by its first bytes only', () => Uint8Array.of(0x50, 0x4b, 3, 4, 9, 9, 9), 'workbook-broken'],
  ])('%s', async (_, make, code) => {
    const problem = await refusalOf(make());
    expect(problem.code).toBe(code);
    const { what, why, tryThis } = explainProblem(problem);
    for (const sentence of [what, why, tryThis]) {
      expect(sentence).toMatch(/^[A-Z].*\.$/);
      expect(sentence).not.toMatch(/undefined|null|NaN/);
    }
  });

  test('one that would unpack to more than the limit, without unpacking it', async () => {
    // some 160 MB of blanks in less than 200 kB
    const bomb = zipSync({
      ...parts,
      'xl/worksheets/sheet1.xml': new Uint8Array(MAX_UNPACKED_BYTES + 1e7).fill(32),
    });
    expect(bomb.length).toBeLessThan(200_000);
    const before = process.memoryUsage().arrayBuffers;
    const problem = await refusalOf(bomb);
    expect(problem.code).toBe('workbook-swollen');
    expect(explainProblem(problem).what).toContain('160 MB');
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(5e6);
  });

  test('one that lies about its size, in no more memory than it claims', async () => {
    const honest = zipSync({ ...parts, 'xl/worksheets/sheet1.xml': new Uint8Array(3e7).fill(32) });
    const liar = honest.slice();
    const view = new DataView(liar.buffer);
    // the size before packing stands in the directory at the end, 24 bytes behind each entry's mark (APPNOTE 4.3.12)
    for (let at = 0; at < liar.length - 4; at++) {
      if (view.getUint32(at, true) === 0x02014b50 && view.getUint32(at + 24, true) === 3e7)
        view.setUint32(at + 24, 1000, true);
    }
    const before = process.memoryUsage().arrayBuffers;
    expect((await refusalOf(liar)).code).toBe('workbook-broken');
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(2e7);
  });

  test('no bytes at all are no workbook', () => {
    expect(isWorkbook(new Uint8Array())).toBe(false);
    expect(isWorkbook(strToU8('Month,A,B'))).toBe(false);
  });
});
