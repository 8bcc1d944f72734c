/**
 * What one revision of a series changes of another, month by month: added, changed and removed counts, and months newly left
 * out of the fit or taken in again.
 */
import type { Exclusion } from './exclusions';
import type { Month, MonthlySeries } from './types';

/** A revision's content: the counts and the months left out of the fit. */
export interface SeriesContent {
  series: MonthlySeries;
  exclusions: readonly Exclusion[];
}

/** One month as a revision has it. A month outside the series reads like a month without counts. */
export interface MonthContent {
  focal: number | null;
  rival: number | null;
  /** Reason for leaving the month out of the fit; null: it is used. */
  exclusion: string | null;
}

export type MonthChangeKind = 'added' | 'changed' | 'removed';

export interface MonthChange {
  month: Month;
  /** added: no count before; removed: none after; changed: anything else, a new or gone exclusion included. */
  kind: MonthChangeKind;
  before: MonthContent;
  after: MonthContent;
}

/** The months that differ, in order; empty: the same content. */
export function compareSeries(before: SeriesContent, after: SeriesContent): MonthChange[] {
  const readBefore = readerOf(before);
  const readAfter = readerOf(after);
  const first = Math.min(before.series.firstMonth, after.series.firstMonth);
  const end = Math.max(endOf(before.series), endOf(after.series));
  const changes: MonthChange[] = [];
  for (let month = first; month < end; month++) {
    const change = { month, before: readBefore(month), after: readAfter(month) };
    if (!isSame(change.before, change.after)) changes.push({ ...change, kind: kindOf(change) });
  }
  return changes;
}

/** Reads any month of a revision. */
export function readerOf({ series, exclusions }: SeriesContent): (month: Month) => MonthContent {
  const reasons = new Map(exclusions.map(({ month, reason }) => [month, reason]));
  return (month) => ({
    focal: series.focal[month - series.firstMonth] ?? null,
    rival: series.rival[month - series.firstMonth] ?? null,
    exclusion: reasons.get(month) ?? null,
  });
}

/** The month after the last one. */
export function endOf({ firstMonth, focal }: MonthlySeries): Month {
  return firstMonth + focal.length;
}

function isSame(a: MonthContent, b: MonthContent): boolean {
  return a.focal === b.focal && a.rival === b.rival && a.exclusion === b.exclusion;
}

function kindOf({ before, after }: Pick<MonthChange, 'before' | 'after'>): MonthChangeKind {
  if (!hasCount(before) && hasCount(after)) return 'added';
  return hasCount(before) && !hasCount(after) ? 'removed' : 'changed';
}

function hasCount({ focal, rival }: MonthContent): boolean {
  return focal !== null || rival !== null;
}
