/**
 * Months that an analyst leaves out of the fit, each with a reason. They stay in the record; to the fit they are gaps.
 */
import type { Month, MonthlySeries } from './types';

/** A month that is left out, for both firms. */
export interface Exclusion {
  month: Month;
  /** In the analyst's words: "strike of the ferries". */
  reason: string;
}

/**
 * The series as the fit sees it: excluded months are gaps, and months at either end in which neither firm is known are cut off.
 * @returns null when nothing is left
 */
export function leaveOut(series: MonthlySeries, exclusions: readonly Exclusion[]): MonthlySeries | null {
  const excluded = new Set(exclusions.map(({ month }) => month));
  const isUsed = (_: unknown, index: number) =>
    !excluded.has(series.firstMonth + index) &&
    (series.focal[index] !== null || series.rival[index] !== null);
  const start = series.focal.findIndex(isUsed);
  const end = series.focal.findLastIndex(isUsed);
  if (start < 0) return null;
  const keep = (counts: (number | null)[]) =>
    counts
      .map((count, index) => (excluded.has(series.firstMonth + index) ? null : count))
      .slice(start, end + 1);
  return { firstMonth: series.firstMonth + start, focal: keep(series.focal), rival: keep(series.rival) };
}

/** Those of the exclusions whose months the series has: what carries over to newer counts. */
export function keepExclusions(exclusions: readonly Exclusion[], series: MonthlySeries): Exclusion[] {
  const end = series.firstMonth + series.focal.length;
  return exclusions.filter(({ month }) => month >= series.firstMonth && month < end);
}
