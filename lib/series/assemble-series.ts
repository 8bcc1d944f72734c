/** Counts of months in any order -> consecutive months. */
import { MAX_SERIES_MONTHS } from './limits';
import { formatMonth } from './month';
import { makeError, makeWarning } from './problem';
import type { MonthCounts, RowsToRead } from './read-rows';
import type { Month, MonthlySeries, SeriesProblem } from './types';

/** Rows in any order -> consecutive months. */
export function assembleSeries(
  rows: readonly MonthCounts[],
  names: RowsToRead['names'],
  problems: SeriesProblem[],
): { series: MonthlySeries | null; rowOf: (month: Month) => number | null } {
  const byMonth = new Map(rows.map((row) => [row.month, row]));
  const rowOf = (month: Month) => byMonth.get(month)?.row ?? null;
  const known = rows.filter(({ focal, rival }) => focal !== null || rival !== null);
  if (known.length === 0) {
    problems.push(makeError('too-short-to-fit', { value: '0' }));
    return { series: null, rowOf };
  }

  const months = known.map(({ month }) => month);
  const firstMonth = months.reduce((a, b) => Math.min(a, b));
  const lastMonth = months.reduce((a, b) => Math.max(a, b));
  const length = lastMonth - firstMonth + 1;
  if (length > MAX_SERIES_MONTHS) {
    const span = `${formatMonth(firstMonth)} to ${formatMonth(lastMonth)}`;
    const other = { row: null, value: `${MAX_SERIES_MONTHS} months` };
    problems.push(
      makeError('too-large', { column: names.month, value: `${length} months (${span})`, other }),
    );
    return { series: null, rowOf };
  }
  const pick = (firm: 'focal' | 'rival') =>
    Array.from({ length }, (_, index) => byMonth.get(firstMonth + index)?.[firm] ?? null);
  const series: MonthlySeries = { firstMonth, focal: pick('focal'), rival: pick('rival') };
  problems.push(...clearInnerZeros(series.focal, firstMonth, names.focal, rowOf));
  problems.push(...clearInnerZeros(series.rival, firstMonth, names.rival, rowOf));
  return { series, rowOf };
}

/** Zeros after the first positive count become gaps, in place. */
function clearInnerZeros(
  counts: (number | null)[],
  firstMonth: Month,
  column: string,
  rowOf: (month: Month) => number | null,
): SeriesProblem[] {
  const launch = counts.findIndex((count) => count !== null && count > 0);
  const problems: SeriesProblem[] = [];
  for (let index = launch < 0 ? counts.length : launch; index < counts.length; index++) {
    if (counts[index] !== 0) continue;
    counts[index] = null;
    const month = firstMonth + index;
    problems.push(makeWarning('zero-inside', { row: rowOf(month), column, value: formatMonth(month) }));
  }
  return problems;
}
