import { describe, expect, test } from 'vitest';
import { describePlace, explainProblem } from '@/lib/series/explain';
import { MAX_ROW_PROBLEMS, MAX_TEXT_LENGTH } from '@/lib/series/limits';
import { formatMonth, makeMonth } from '@/lib/series/month';
import { readSeries } from '@/lib/series/read-series';
import type { SeriesProblem, SeriesProblemCode } from '@/lib/series/types';

const first = makeMonth(2023, 1);

function rows(count: number, write: (index: number) => string): string {
  const lines = Array.from({ length: count }, (_, index) => `${formatMonth(first + index)},${write(index)}`);
  return ['Month,A,B', ...lines, ''].join('\n');
}

const good = rows(14, (index) => `${20 + index},${30 - (index % 4)}`);

/** Days from 2 January 2023 to 10 March 2024. */
const daily = [
  'Month,A,B',
  ...Array.from({ length: 434 }, (_, day) => {
    const date = new Date(Date.UTC(2023, 0, 2 + day)).toISOString().slice(0, 10);
    return `${date},${200 + day},${300 - (day % 40)}`;
  }),
].join('\n');

/** Codes of workbooks, which are no text: `read-workbook.test.ts` provokes them. */
type WorkbookCode = Extract<SeriesProblemCode, `workbook-${string}`>;

/** A file that shows each problem. The type demands one for every code. */
const FILES: Record<Exclude<SeriesProblemCode, WorkbookCode>, string> = {
  'empty-file': ' ',
  'too-large': 'x'.repeat(MAX_TEXT_LENGTH + 1),
  'not-text': 'PK\u0003\u0004',
  'no-header': good.split('\n').slice(1).join('\n'),
  'too-few-columns': 'Month,A\n2023-01,5',
  'column-not-found': good.replace('A', 'C'),
  'same-column-twice': good,
  'row-misaligned': `${good}2024-03,1,2,3,4`,
  'quote-open': `${good}2024-03,"5,6`,
  'month-unreadable': `${good}Total,5,6`,
  'month-ambiguous': `${good}04/03/2024,5,6`,
  'month-duplicate': `${good}2023-01,5,6`,
  'month-missing': `${good}2024-06,30,30`,
  'month-in-future': good,
  'month-unfinished': good.slice(0, good.lastIndexOf('2024-02')),
  'month-partial': daily,
  'firm-not-found': 'Month,Firm,Users\n2023-01,A,5\n2023-01,C,6',
  'count-unreadable': `${good}2024-03,many,30`,
  'count-ambiguous': `${good}2024-03,"1,234",30`,
  'count-negative': `${good}2024-03,-3,30`,
  'count-missing': `${good}2024-03,,30`,
  'zero-inside': `${good}2024-03,0,30`,
  jump: `${good}2024-03,999,30`,
  'identical-firms': rows(14, (index) => `${20 + index},${20 + index}`),
  'constant-sum': rows(14, (index) => `${20 + index},${80 - index}`),
  'unit-mismatch': rows(14, (index) => `${20000 + index * 900},${30 - (index % 4)}`),
  'too-short-to-fit': rows(5, (index) => `${20 + index},${30 - index * 2}`),
  'never-launched': rows(14, (index) => `${20 + index},0`),
  'more-problems': `${good}${'x,1,2\n'.repeat(MAX_ROW_PROBLEMS + 1)}`,
};

function findProblem(code: keyof typeof FILES): SeriesProblem | undefined {
  const rival = code === 'same-column-twice' ? 'A' : 'B';
  const plain = { month: 'Month', focal: 'A', rival };
  const mapping =
    code === 'no-header'
      ? { month: 'Column A', focal: 'Column B', rival: 'Column C' }
      : code === 'firm-not-found'
        ? { ...plain, long: { firm: 'Firm', users: 'Users' } }
        : plain;
  return readSeries(FILES[code], mapping, { thisMonth: makeMonth(2024, 1) }).problems.find(
    (problem) => problem.code === code,
  );
}

describe('every problem can happen and is explained in three parts', () => {
  test.each(Object.keys(FILES) as (keyof typeof FILES)[])('%s', (code) => {
    const problem = findProblem(code);
    expect(problem).toBeDefined();
    const { what, why, tryThis } = explainProblem(problem!);
    for (const sentence of [what, why, tryThis]) {
      expect(sentence).toMatch(/^[A-Z“\d].*\.$/);
      expect(sentence).not.toMatch(/undefined|null|NaN|\[object/);
    }
    if (problem!.row !== null) expect(`${what} ${why}`.toLowerCase()).toContain(`row ${problem!.row}`);
    if (
      problem!.column !== null &&
      !['month-missing', 'month-partial', 'too-large'].includes(problem!.code)
    ) {
      expect(what).toContain(`“${problem!.column}”`);
    }
  });
});

test('an ambiguous count shows both readings', () => {
  expect(explainProblem(findProblem('count-ambiguous')!).what).toBe(
    'Row 16, column “A”: “1,234” could be 1234 or 1.234.',
  );
});

test('an ambiguous month shows both readings', () => {
  expect(explainProblem(findProblem('month-ambiguous')!).what).toBe(
    'Row 16, column “Month”: “04/03/2024” could be 2024-03 or 2024-04.',
  );
});

test.each([
  ['45352', 'day number'],
  ['Total', 'Nothing needs doing'],
  ['soon', 'Write months as'],
])('the advice for a month written %j fits it', (value, advice) => {
  const problem: SeriesProblem = {
    code: 'month-unreadable',
    severity: 'error',
    row: 3,
    column: 'Month',
    value,
  };
  expect(explainProblem(problem).tryThis).toContain(advice);
});

test('the whole file has no place', () => {
  expect(describePlace({ row: null, column: null })).toBe('');
  expect(describePlace({ row: 3, column: null })).toBe('Row 3');
  expect(describePlace({ row: null, column: 'A' })).toBe('Column “A”');
});
