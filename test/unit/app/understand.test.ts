import { describe, expect, test } from 'vitest';
import writeXlsxFile from 'write-excel-file/node';
import { openBytes, openText, understand } from '@/app/_components/import/understand';
import { NO_CHOICES, type ReadingChoices } from '@/app/_components/import/understood';
import { problemKey } from '@/lib/series/fixes';
import { makeMonth } from '@/lib/series/month';

const THIS_MONTH = makeMonth(2026, 6);
const MONTHS = Array.from(
  { length: 15 },
  (_, i) => `${2024 + Math.floor(i / 12)}-${String((i % 12) + 1).padStart(2, '0')}`,
);
const WIDE = ['Month,Norrland,Halcyon', ...MONTHS.map((month, i) => `${month},${100 + i},${50 + i}`)].join(
  '\n',
);
const LONG = [
  'Month,Firm,Users',
  ...MONTHS.flatMap((month, i) => [`${month},Norrland,${100 + i}`, `${month},Halcyon,${50 + i}`]),
].join('\n');

const read = (text: string, choices: ReadingChoices = NO_CHOICES) =>
  understand(openText(text), choices, THIS_MONTH);

async function makeWorkbook(): Promise<Uint8Array> {
  const rows = WIDE.split('\n').map((line) => line.split(',').map((value) => ({ value })));
  const cover = [[{ value: 'Only remarks' }]];
  const file = await writeXlsxFile([
    { data: cover, sheet: 'Cover' },
    { data: rows, sheet: 'Users' },
  ]);
  return new Uint8Array(await file.toBuffer());
}

describe('a table of text', () => {
  test('is understood with guessed columns, its first rows and its size', () => {
    const understood = read(WIDE);
    expect(understood).toMatchObject({
      sheets: [],
      rowCount: 15,
      canFit: true,
      mapping: { month: 'Month', focal: 'Norrland', rival: 'Halcyon' },
      reading: { grain: 'month', problems: [] },
    });
    expect(understood.sample).toHaveLength(6);
    expect(understood.sample[0]).toEqual({ row: 2, cells: ['2024-01', '100', '50'] });
  });

  test('keeps chosen columns, and guesses anew when the table has them no more', () => {
    const mapping = { month: 'Month', focal: 'Halcyon', rival: 'Norrland' };
    expect(read(WIDE, { sheet: null, mapping }).reading.series?.focal[0]).toBe(50);
    const gone = { ...mapping, rival: 'Third' };
    expect(read(WIDE, { sheet: null, mapping: gone }).mapping).toMatchObject({ focal: 'Norrland' });
  });

  test('in the long layout offers the firms; a firm that is not there is replaced, never twice the same', () => {
    const understood = read(LONG);
    expect(understood).toMatchObject({ firms: ['Norrland', 'Halcyon'], canFit: true });
    const { mapping } = understood;
    expect(mapping).toMatchObject({
      long: { firm: 'Firm', users: 'Users' },
      focal: 'Norrland',
      rival: 'Halcyon',
    });
    const swapped = read(LONG, { sheet: null, mapping: { ...mapping!, focal: 'Halcyon', rival: '' } });
    expect(swapped.mapping).toMatchObject({ focal: 'Halcyon', rival: 'Norrland' });
  });

  test('notes what was chosen about a problem, and nothing about what is done anyway', () => {
    const text = WIDE.replace('2024-05,104', '2024-05,90000');
    const before = read(text);
    const jump = before.reading.problems.find(({ code }) => code === 'jump')!;
    expect(before.notes).toEqual([]);
    const fixes = { [problemKey(jump)]: 'gap' as const };
    const after = read(text, { sheet: null, mapping: { ...before.mapping!, fixes } });
    expect(after.reading.series?.focal[4]).toBeNull();
    expect(after.notes).toEqual(['Row 6, column “Norrland”, 90000: keep as a gap.']);
  });

  test('with too few columns has nothing to choose and says why', () => {
    const understood = read('Month,A\n2024-01,5\n');
    expect(understood).toMatchObject({ mapping: null, canFit: false });
    expect(understood.reading.problems.map(({ code }) => code)).toContain('too-few-columns');
  });
});

describe('a workbook', () => {
  test('is read from the first sheet that looks like counts; another can be chosen', async () => {
    const source = await openBytes(await makeWorkbook());
    const understood = understand(source, NO_CHOICES, THIS_MONTH);
    expect(understood).toMatchObject({ sheets: ['Cover', 'Users'], sheet: 1, canFit: true });
    expect(understood.reading.series).toEqual(read(WIDE).reading.series);
    expect(understood.notes).toEqual(['Sheet “Users”.']);
    const cover = understand(source, { sheet: 0, mapping: null }, THIS_MONTH);
    expect(cover).toMatchObject({ sheet: 0, mapping: null, canFit: false });
  });

  test('that is locked or broken is refused with its reason', async () => {
    for (const [bytes, code] of [
      [Uint8Array.of(0xd0, 0xcf, 0x11, 0xe0, 1, 2), 'workbook-locked'],
      [Uint8Array.of(0x50, 0x4b, 3, 4, 1, 2, 3), 'workbook-broken'],
    ] as const) {
      const { reading, canFit } = understand(await openBytes(bytes), NO_CHOICES, THIS_MONTH);
      expect([canFit, reading.problems.map((problem) => problem.code)]).toEqual([false, [code]]);
    }
  });
});
