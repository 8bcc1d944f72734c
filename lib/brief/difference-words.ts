/** What one revision changes of another, in words and cells: a sentence on all of it, and a row for each month. */
import type { MonthChange, MonthContent } from '../series/compare-series';
import type { Month } from '../series/types';
import type { MonthFormat } from './month-words';

export interface DifferenceRow {
  month: Month;
  label: string;
  /** "new", "changed", "gone", "left out", "taken in again". */
  kind: string;
  /** Counts before and after; null: no count. `isChanged` false: both are the same. */
  focal: DifferenceCell;
  rival: DifferenceCell;
  /** "strike" for a month newly left out, else empty. */
  reason: string;
}

export interface DifferenceCell {
  before: string | null;
  after: string | null;
  isChanged: boolean;
}

export interface Difference {
  /** "2 months added, 1 changed." */
  summary: string;
  rows: DifferenceRow[];
}

export function describeDifference(
  changes: readonly MonthChange[],
  months: MonthFormat,
  locale: string,
): Difference {
  const counts = new Intl.NumberFormat(locale, { maximumFractionDigits: 6 });
  const spell = (count: number | null) => (count === null ? null : counts.format(count));
  const cell = ({ before, after }: MonthChange, firm: 'focal' | 'rival'): DifferenceCell => ({
    before: spell(before[firm]),
    after: spell(after[firm]),
    isChanged: before[firm] !== after[firm],
  });
  return {
    summary: summarise(changes),
    rows: changes.map((change) => ({
      month: change.month,
      label: months.short(change.month),
      kind: nameKind(change),
      focal: cell(change, 'focal'),
      rival: cell(change, 'rival'),
      reason: change.after.exclusion ?? '',
    })),
  };
}

function summarise(changes: readonly MonthChange[]): string {
  if (changes.length === 0) return 'No month differs.';
  const parts = (
    [
      ['added', changes.filter(({ kind }) => kind === 'added').length],
      ['changed', changes.filter((change) => change.kind === 'changed' && hasOtherCounts(change)).length],
      ['removed', changes.filter(({ kind }) => kind === 'removed').length],
      ['left out of the fit', changes.filter(isLeftOut).length],
      ['taken in again', changes.filter(isTakenIn).length],
    ] as const
  ).filter(([, count]) => count > 0);
  const [first, ...rest] = parts.map(([what, count]) => `${count} ${what}`);
  const noun = parts[0]?.[1] === 1 ? 'month' : 'months';
  return `${[first?.replace(' ', ` ${noun} `), ...rest].join(', ')}.`;
}

function nameKind(change: MonthChange): string {
  if (change.kind === 'added') return isLeftOut(change) ? 'new, left out' : 'new';
  if (change.kind === 'removed') return 'gone';
  if (hasOtherCounts(change)) return isLeftOut(change) ? 'changed, left out' : 'changed';
  if (isTakenIn(change)) return 'taken in again';
  return isLeftOut(change) ? 'left out' : 'other reason';
}

function hasOtherCounts({ before, after }: MonthChange): boolean {
  return before.focal !== after.focal || before.rival !== after.rival;
}

function isLeftOut({ before, after }: { before: MonthContent; after: MonthContent }): boolean {
  return before.exclusion === null && after.exclusion !== null;
}

function isTakenIn({ before, after, kind }: MonthChange): boolean {
  return kind !== 'removed' && before.exclusion !== null && after.exclusion === null;
}
