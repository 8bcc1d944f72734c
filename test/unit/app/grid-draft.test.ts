import { describe, expect, test } from 'vitest';
import {
  addMonth,
  type DraftEdit,
  pasteCells,
  startDraft,
  typeCell,
} from '@/app/_components/data/grid-draft';
import { fromMonths } from '@/lib/series/merge-series';

const CONTENT = {
  series: { firstMonth: 24_300, focal: [0, 2, 3], rival: [4, null, 6] },
  exclusions: [{ month: 24_301, reason: 'strike' }],
};
const rows = startDraft(CONTENT);
const rowsOf = (edit: DraftEdit) => (edit.ok ? edit.rows : []);
const codeOf = (edit: DraftEdit) => (edit.ok ? 'ok' : edit.problem.code);

test('a draft nobody changed gives the same content', () => {
  expect(fromMonths(rows)).toEqual(CONTENT);
});

describe('typing', () => {
  test('puts a count, a gap or a reason into one cell and leaves the others and the old rows alone', () => {
    const before = structuredClone(rows);
    const focal = rowsOf(typeCell(rows, { row: 2, column: 'focal' }, ' 12.5k '));
    expect(focal.map((row) => row.focal)).toEqual([0, 2, 12_500]);
    expect(rowsOf(typeCell(rows, { row: 2, column: 'rival' }, ''))[2]).toMatchObject({
      focal: 3,
      rival: null,
    });
    expect(rowsOf(typeCell(rows, { row: 1, column: 'exclusion' }, '\u202e '))[1]?.exclusion).toBeNull();
    expect(rowsOf(typeCell(rows, { row: 0, column: 'exclusion' }, ' half a\tmonth '))[0]?.exclusion).toBe(
      'half a month',
    );
    expect(rows).toEqual(before);
  });

  test('refuses what is no count, with its place', () => {
    const at = { row: 2, column: 'focal' } as const;
    expect(typeCell(rows, at, 'many')).toEqual({
      ok: false,
      problem: { ...at, code: 'unreadable', text: 'many' },
    });
    expect(typeCell(rows, at, '1,234')).toMatchObject({
      problem: { code: 'ambiguous', readings: [1234, 1.234] },
    });
    expect(codeOf(typeCell(rows, at, '-5'))).toBe('negative');
    expect(codeOf(typeCell(rows, at, '0'))).toBe('zero-inside');
    expect(codeOf(typeCell(rows, { row: 0, column: 'focal' }, '0'))).toBe('ok');
    expect(codeOf(typeCell(rows, { row: 0, column: 'exclusion' }, 'x'.repeat(161)))).toBe('too-long');
  });
});

describe('pasting', () => {
  test('fills down and to the right, adds months below, and reads a column with its own decimal mark', () => {
    const pasted = rowsOf(pasteCells(rows, { row: 1, column: 'focal' }, '1.234\t7\r\n13,75\t8\r\n2\t9\r\n'));
    expect(pasted.map(({ month, focal, rival }) => [month, focal, rival])).toEqual([
      [24_300, 0, 4],
      [24_301, 1234, 7],
      [24_302, 13.75, 8],
      [24_303, 2, 9],
    ]);
  });

  test('is all or nothing: one bad cell refuses the whole', () => {
    expect(pasteCells(rows, { row: 0, column: 'rival' }, '1\nsome\n3')).toMatchObject({
      ok: false,
      problem: { row: 1, column: 'rival', code: 'unreadable' },
    });
  });

  test('does not go beyond the longest series', () => {
    const long = Array.from({ length: 700 }, (_, i) => i + 1).join('\n');
    expect(codeOf(pasteCells(rows, { row: 0, column: 'focal' }, long))).toBe('too-many-months');
  });
});

test('an added month that stays empty is no change', () => {
  expect(fromMonths(addMonth(rows))).toEqual(CONTENT);
});
