import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import writeXlsxFile from 'write-excel-file/node';
import type { CommandEnd } from '@/lib/cli/command-end';
import type { FitRequest } from '@/lib/cli/fit-request';
import { forecast } from '@/lib/cli/forecast-command';
import { toErrorJson } from '@/lib/cli/forecast-json';
import type { Terminal } from '@/lib/cli/terminal';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { formatMonth, makeMonth } from '@/lib/series/month';

const folder = mkdtempSync(join(tmpdir(), 'elbowroom-cli-'));
afterAll(() => rmSync(folder, { recursive: true }));

const silent: Terminal = { showProgress: () => {}, clearProgress: () => {}, warn: () => {} };
const first = makeMonth(2022, 1);

function rows(count: number, write: (index: number) => string): string {
  return [
    'Month,A,B',
    ...Array.from({ length: count }, (_, i) => `${formatMonth(first + i)},${write(i)}`),
  ].join('\n');
}

const { seed, horizonMonths } = DEFAULT_FIT_OPTIONS;
const request = { columns: null, sheet: null, firms: null, seed, horizonMonths };

function run(content: string | Uint8Array, change: Partial<FitRequest> = {}): Promise<CommandEnd> {
  const file = join(folder, 'counts.csv');
  writeFileSync(file, content);
  return forecast({ ...request, file, ...change }, false, silent);
}

function failureOf(end: CommandEnd) {
  if (end.exit === 'ok') throw new Error('it went well');
  return end;
}

const rising = rows(24, (i) => `${100 + 9 * i},${50 + 4 * i + (i % 3)}`);

describe('what cannot be fitted ends with its own code and a sentence', () => {
  test.each([
    ['empty', '', 'data-unusable', 'empty'],
    ['a workbook', Uint8Array.of(0x50, 0x4b, 3, 4, 20, 0, 6, 0), 'data-unusable', 'could not be read'],
    ['no months', 'x,A,B\none,1,2\ntwo,3,4', 'data-unusable', 'no column of months'],
    [
      'one count column',
      'Month,A,Note\n2024-01,1,x\n2024-02,2,y',
      'data-unusable',
      'fewer than two columns of counts',
    ],
    ['identical firms', rows(20, (i) => `${9 + i},${9 + i}`), 'data-unusable', 'the same count'],
    ['a firm without users', rows(20, (i) => `${9 + i},0`), 'data-unusable', 'no count above zero'],
    ['nothing ever changes', rows(20, () => '9,8'), 'data-unusable', 'ever changes'],
    ['eleven months', rows(11, (i) => `${9 + i},${20 - i}`), 'too-short', '11 months'],
    ['a header alone', 'Month,A,B', 'data-unusable', 'no column of months'],
  ])('%s', async (_, content, exit, part) => {
    const end = failureOf(await run(content));
    expect(end.exit).toBe(exit);
    expect(end.message).toContain(part);
    expect(end.message).not.toMatch(/undefined|null|\n|Error/);
    expect(toErrorJson(end.exit, end.message, end.problems).error.code).toBe(exit);
  });

  test('a column that is not there', async () => {
    const end = failureOf(await run(rising, { columns: ['Month', 'A', 'Holm'] }));
    expect(end.exit).toBe('data-unusable');
    expect(end.message).toContain('“Holm”');
  });

  test('a file that is not there, and a folder', async () => {
    for (const file of [join(folder, 'none.csv'), folder]) {
      expect(failureOf(await run(rising, { file })).exit).toBe('file-unreadable');
    }
  });

  test('months that are too few because cells are unreadable name those cells', async () => {
    const end = failureOf(await run(rows(14, (i) => (i < 4 ? `about ${i},7` : `${9 + i},${20 - i}`))));
    expect(end.exit).toBe('too-short');
    expect(end.problems.filter(({ code }) => code === 'count-unreadable').map(({ row }) => row)).toEqual([
      2, 3, 4, 5,
    ]);
  });
});

test('a fit reports true progress and warns of nothing when all is well', async () => {
  const lines: string[] = [];
  const warnings: string[] = [];
  const file = 'seed/markets/night-buses.csv';
  const terminal: Terminal = {
    showProgress: (line) => lines.push(line),
    clearProgress: () => {},
    warn: (line) => warnings.push(line),
  };
  const end = await forecast({ ...request, file }, false, terminal);
  expect(end.exit).toBe('ok');
  expect(warnings).toEqual([]);
  expect(lines[0]).toMatch(/^starts \d+ of \d+$/);
  expect(lines.some((line) => /draws [1-9]\d* of [1-9]\d*/.test(line))).toBe(true);
});

describe('files of other kinds are read', () => {
  const counts = Array.from(
    { length: 24 },
    (_, i) => [formatMonth(first + i), 100 + 9 * i, 50 + 4 * i + (i % 3)] as const,
  );

  test('a sheet of a workbook, by its name or the first one with a table', async () => {
    const sheets = [
      { sheet: 'Notes', data: [[{ value: 'for the board' }]] },
      {
        sheet: 'Users',
        data: [['Month', 'A', 'B'], ...counts].map((cells) => cells.map((value) => ({ value }))),
      },
    ];
    const bytes = new Uint8Array(await writeXlsxFile(sheets as never).toBuffer());
    const byName = await run(bytes, { sheet: 'Users', horizonMonths: 3 });
    expect(byName.exit).toBe('ok');
    expect(await run(bytes, { horizonMonths: 3 })).toEqual(byName);
    expect(failureOf(await run(bytes, { sheet: 'Other' })).message).toContain('“Notes”, “Users”');
  });

  test('one row per month and firm, with the firms that are named', async () => {
    const long = counts.flatMap(([month, a, b]) => [`${month},A,${a}`, `${month},B,${b}`]);
    const text = ['Month,Firm,Users', ...long].join('\n');
    const end = await run(text, { firms: ['B', 'A'], horizonMonths: 3 });
    expect(end.exit).toBe('ok');
    const wide = counts.map(([month, a, b]) => `${month},${b},${a}`);
    expect(end).toEqual(await run(['Month,B,A', ...wide].join('\n'), { horizonMonths: 3 }));
    expect(failureOf(await run(text, { firms: ['A', 'Nobody'] })).message).toContain('“Nobody”');
  });
});
