/** Choices about problems: what is done changes, and what was chosen about stays listed. */
import { describe, expect, test } from 'vitest';
import { chosenFix, nameFix, problemKey } from '@/lib/series/fixes';
import { formatMonth, makeMonth } from '@/lib/series/month';
import { readSeries } from '@/lib/series/read-series';
import type { ProblemFix, SeriesProblemCode } from '@/lib/series/types';

const MAPPING = { month: 'Month', focal: 'A', rival: 'B' };
const FIRST = makeMonth(2023, 1);
const good = Array.from(
  { length: 14 },
  (_, index) => `${formatMonth(FIRST + index)},${200 + index},${300 - index}`,
);

function read(extra: string[], choose: [SeriesProblemCode, ProblemFix] | null, thisMonth?: number) {
  const text = ['Month,A,B', ...good, ...extra].join('\n');
  const plain = readSeries(text, MAPPING, { thisMonth });
  if (!choose) return plain;
  const problem = plain.problems.find(({ code }) => code === choose[0])!;
  expect(problem.fixes).toContain(choose[1]);
  return readSeries(text, { ...MAPPING, fixes: { [problemKey(problem)]: choose[1] } }, { thisMonth });
}

/** Counts of A in the last month with a row, for each choice. */
const cases: [SeriesProblemCode, string[], ProblemFix, (number | null)[]][] = [
  ['month-duplicate', ['2024-02,999,1'], 'skip-row', [212, 213]],
  ['month-duplicate', ['2024-02,250,1'], 'use', [212, 250]],
  ['jump', ['2024-03,5000,290'], 'use', [213, 5000]],
  ['jump', ['2024-03,5000,290'], 'gap', [213, null]],
  ['jump', ['2024-03,5000,290'], 'skip-row', [212, 213]],
  ['count-negative', ['2024-03,-4,290'], 'gap', [213, null]],
  ['count-negative', ['2024-03,-4,290'], 'skip-row', [212, 213]],
  ['count-unreadable', ['2024-03,many,290'], 'skip-row', [212, 213]],
  ['zero-inside', ['2024-03,0,290'], 'skip-row', [212, 213]],
];

describe('a choice about', () => {
  test.each(cases)('%s after %j, %s, leaves %j at the end', (code, extra, fix, end) => {
    const reading = read(extra, [code, fix]);
    expect(reading.series!.focal.slice(-2)).toEqual(end);
    expect(reading.problems.map((problem) => problem.code)).toContain(code);
  });

  test('future months leaves all of them out', () => {
    const used = read([], null, makeMonth(2023, 12));
    const left = read([], ['month-in-future', 'skip-row'], makeMonth(2023, 12));
    expect(used.series!.focal).toHaveLength(14);
    expect(left.series!.focal).toHaveLength(12);
  });

  test('the current month leaves it out', () => {
    expect(read([], ['month-unfinished', 'skip-row'], makeMonth(2024, 2)).series!.focal).toHaveLength(13);
  });

  test('mixed units takes the smaller firm times a thousand, and says so', () => {
    const rows = good.map((row, index) => row.replace(/,(\d+),/, `,${(20_000 + 500 * index) * 10},`));
    const text = ['Month,A,B', ...rows].join('\n');
    const problem = readSeries(text, MAPPING).problems.find(({ code }) => code === 'unit-mismatch')!;
    const fixed = readSeries(text, { ...MAPPING, fixes: { [problemKey(problem)]: 'times-thousand' } });
    expect(fixed.series!.rival[0]).toBe(300_000);
    expect(fixed.notes.join(' ')).toContain('times 1,000');
  });
});

test('what is not offered is not done', () => {
  const problem = read(['2024-02,999,1'], null).problems.find(({ code }) => code === 'month-duplicate');
  expect(chosenFix(problem!, { [problemKey(problem!)]: 'times-thousand' })).toBe('skip-row');
  expect(chosenFix({ ...problem!, fixes: undefined }, {})).toBeNull();
});

test('every fix has a name', () => {
  for (const fix of ['use', 'gap', 'skip-row', 'times-thousand'] as const)
    expect(nameFix(fix)).toMatch(/^[a-z][a-z0-9 ,]+$/);
});
