import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { MAX_COLUMNS, MAX_ROWS, MAX_TEXT_LENGTH } from '@/lib/series/limits';
import { readTable } from '@/lib/series/parse-table';

const codes = (text: string) =>
  readTable(text).problems.map(({ code, row }) => (row === null ? code : `${code}@${row}`));

describe('cells are found whatever separates them', () => {
  const cells = [
    ['2024-01', '13,75', '9,5'],
    ['2024-02', '14,25', '9,9'],
  ];
  test.each([
    ['semicolon', ';'],
    ['tab', '\t'],
    ['bar', '|'],
  ])('%s, with decimal commas inside', (_, delimiter) => {
    const text = [['Month', 'Ferrow', 'Tarn'], ...cells].map((row) => row.join(delimiter)).join('\n');
    const table = readTable(text);
    expect(table.delimiter).toBe(delimiter);
    expect(table.header).toEqual(['Month', 'Ferrow', 'Tarn']);
    expect(table.rows.map((row) => row.cells)).toEqual(cells);
    expect(table.problems).toEqual([]);
  });

  test('comma, with quoted cells that hold commas, quotes and line breaks', () => {
    const table = readTable('Month,"Ferrow, Ltd","The ""Tarn""\nco-op"\r\n2024-01,"1,250",7\r\n');
    expect(table.header).toEqual(['Month', 'Ferrow, Ltd', 'The "Tarn" co-op']);
    expect(table.rows).toEqual([{ row: 2, cells: ['2024-01', '1,250', '7'] }]);
  });

  test.each([['\r\n'], ['\n'], ['\r']])('lines end with %j', (end) => {
    expect(readTable(['Month,A,B', '2024-01,1,2', '2024-02,3,4', ''].join(end)).rows).toHaveLength(2);
  });

  test('a byte order mark and a declared separator are no data', () => {
    const table = readTable('\uFEFFsep=;\r\nMonth;A;B\r\n2024-01;1;2\r\n');
    expect(table.header).toEqual(['Month', 'A', 'B']);
    expect(table.rows).toEqual([{ row: 3, cells: ['2024-01', '1', '2'] }]);
  });
});

describe('rows keep the number that a spreadsheet shows', () => {
  test('title lines, blank lines and a late header', () => {
    const table = readTable('Members export\n\nMonth,A,B\n\n2024-01,1,2\n,,\n2024-02,3,4\n');
    expect(table.header).toEqual(['Month', 'A', 'B']);
    expect(table.rows.map(({ row }) => row)).toEqual([5, 7]);
    expect(table.problems).toEqual([]);
  });

  test('title lines padded with commas by a spreadsheet', () => {
    const table = readTable('Members export,,\n,,\nMonth,A,B\n2024-01,1,2\n');
    expect(table.rows).toEqual([{ row: 4, cells: ['2024-01', '1', '2'] }]);
  });
});

describe('headers', () => {
  test('a missing header is noticed and the first row is not lost', () => {
    const table = readTable('2024-01,10,20\n2024-02,11,21\n');
    expect(table.header).toEqual(['Column A', 'Column B', 'Column C']);
    expect(table.rows).toHaveLength(2);
    expect(table.problems.map(({ code, severity, row }) => [code, severity, row])).toEqual([
      ['no-header', 'warning', 1],
    ]);
  });

  test('equal and empty names are told apart', () => {
    expect(readTable('Month,Users,Users,\n2024-01,1,2,3').header).toEqual([
      'Month',
      'Users',
      'Users (2)',
      'Column D',
    ]);
  });

  test('an empty last column, as a trailing comma leaves it, is no column', () => {
    expect(readTable('Month,A,B,\n2024-01,1,2,\n').header).toEqual(['Month', 'A', 'B']);
    expect(readTable('Month,A,B\n2024-01,1,2,\n').problems).toEqual([]);
  });

  test('formulas lose their shield, hidden characters go, long names are cut', () => {
    const [, first, second, third] = readTable(
      `Month,'=SUM(A1),Fer\u200brow\u202e,${'x'.repeat(200)}\n2024-01,1,2,3`,
    ).header;
    expect(first).toBe('=SUM(A1)');
    expect(second).toBe('Ferrow');
    expect([...third]).toHaveLength(80);
  });
});

describe('what cannot be a table is refused in one problem', () => {
  test.each([
    ['empty-file', ''],
    ['empty-file', '\uFEFF \n\n'],
    ['empty-file', ',,\n,,'],
    ['not-text', 'PK\u0003\u0004 sheet'],
    ['not-text', '%PDF-1.7'],
    ['not-text', 'Month\0A'],
    ['not-text', '\uFFFD\u0002\u0001'.repeat(50)],
  ])('%s', (code, text) => {
    expect(codes(text)).toEqual([code]);
    expect(readTable(text).rows).toEqual([]);
  });

  test('too many characters, rows or columns', () => {
    expect(codes('x'.repeat(MAX_TEXT_LENGTH + 1))).toEqual(['too-large']);
    expect(codes(`Month,A,B\n${'2024-01,1,2\n'.repeat(MAX_ROWS)}`)).toEqual(['too-large']);
    expect(codes(`${'a,'.repeat(MAX_COLUMNS)}b\n`)).toEqual(['too-large']);
  });

  test('the largest file allowed is read in full', () => {
    const { rows, problems } = readTable(`Month,A,B\n${'2024-01,1,2\n'.repeat(MAX_ROWS - 2)}`);
    expect(problems).toEqual([]);
    expect(rows).toHaveLength(MAX_ROWS - 2);
  });

  test('one or two columns', () => {
    expect(codes('just a sentence')).toEqual(['too-few-columns']);
    expect(codes('Month,A\n2024-01,1')).toEqual(['too-few-columns']);
  });
});

describe('a bad row never loses a good one', () => {
  test('unquoted decimal commas are reported, not read as other numbers', () => {
    const text = 'Month,A,B\n2024-01,10,20\n2024-02,13,75,9,5\n2024-03,12,22';
    expect(codes(text)).toEqual(['row-misaligned@3']);
    expect(readTable(text).rows.map(({ row }) => row)).toEqual([2, 4]);
  });

  test('a short row is filled with empty cells', () => {
    expect(readTable('Month,A,B\n2024-01,10').rows).toEqual([{ row: 2, cells: ['2024-01', '10', ''] }]);
  });

  test('a quote that is never closed swallows no rows', () => {
    const text = 'Month,A,B\n2024-01,10,20\n2024-02,"11,21\n2024-03,12,22';
    expect(readTable(text).rows.map(({ cells }) => cells[0])).toEqual(['2024-01', '2024-02', '2024-03']);
    expect(codes(text)).toEqual(['quote-open@3']);
  });
});

test('no text is too strange to read', () => {
  const pieces = fc.constantFrom(
    ',',
    ';',
    '\t',
    '"',
    '\n',
    '\r',
    '2024-01',
    '1,5',
    'Month',
    '=',
    '\u202e',
    '\0',
    'é',
    '😀',
    ' ',
  );
  fc.assert(
    fc.property(fc.array(pieces, { maxLength: 60 }), (parts) => {
      const { header, rows } = readTable(parts.join(''));
      return (
        rows.every(({ cells }) => cells.length === header.length) && new Set(header).size === header.length
      );
    }),
    { numRuns: 500 },
  );
});
