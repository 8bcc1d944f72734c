/**
 * Checks of a monthly series as a whole: gaps, jumps, firms that are the same, shares in place of counts, unequal units, length.
 * They change nothing; each finding is a problem with its place in the file.
 */
import {
  CONSTANT_SUM_SPREAD,
  JUMP_FACTOR,
  MIN_MONTHS_TO_COMPARE,
  MIN_MONTHS_TO_FIT,
  UNIT_MISMATCH_RATIO,
} from './limits';
import { formatMonth } from './month';
import { makeError, makeWarning } from './problem';
import type { Month, MonthlySeries, SeriesProblem } from './types';

/** Where the series came from: column headers, and the row that gave a month (null: no row did). */
export interface SeriesSource {
  month: string;
  focal: string;
  rival: string;
  rowOf(month: Month): number | null;
}

export function checkSeries(series: MonthlySeries, source: SeriesSource, thisMonth?: Month): SeriesProblem[] {
  return [
    ...findGaps(series, source),
    ...findFutureMonths(series, source, thisMonth),
    ...findJumps(series.focal, series.firstMonth, source.focal, source),
    ...findJumps(series.rival, series.firstMonth, source.rival, source),
    ...findNeverLaunched(series, source),
    ...findIdenticalFirms(series, source),
    ...findConstantSum(series),
    ...findUnitMismatch(series, source),
    ...findTooShort(series),
  ];
}

/** Months in which both firms are known; a zero before a launch is known. */
export function countMonthsKnown(series: MonthlySeries): number {
  return pairsOf(series).length;
}

/** Runs of months that have no row at all. */
function findGaps({ firstMonth, focal }: MonthlySeries, source: SeriesSource): SeriesProblem[] {
  const problems: SeriesProblem[] = [];
  for (let month = firstMonth; month < firstMonth + focal.length; month++) {
    if (source.rowOf(month) !== null) continue;
    const start = month;
    while (source.rowOf(month + 1) === null && month + 1 < firstMonth + focal.length) month++;
    const other = month > start ? { row: null, value: formatMonth(month) } : undefined;
    const row = source.rowOf(month + 1);
    problems.push(
      makeWarning('month-missing', { row, column: source.month, value: formatMonth(start), other }),
    );
  }
  return problems;
}

function findFutureMonths(
  { firstMonth, focal }: MonthlySeries,
  source: SeriesSource,
  thisMonth?: Month,
): SeriesProblem[] {
  const last = firstMonth + focal.length - 1;
  if (thisMonth === undefined || last < thisMonth) return [];
  const detail = { row: source.rowOf(last), column: source.month, value: formatMonth(last) };
  if (last === thisMonth) return [makeWarning('month-unfinished', detail)];
  return [makeWarning('month-in-future', { ...detail, other: { row: null, value: formatMonth(thisMonth) } })];
}

/** Counts more than JUMP_FACTOR times the last known one, or less than its part, per month in between. */
function findJumps(
  counts: readonly (number | null)[],
  firstMonth: Month,
  column: string,
  source: SeriesSource,
): SeriesProblem[] {
  const problems: SeriesProblem[] = [];
  let before = -1;
  for (const [index, count] of counts.entries()) {
    if (count === null || count === 0) continue;
    if (before >= 0) {
      const previous = counts[before]!;
      const factor = Math.max(count / previous, previous / count);
      if (factor > JUMP_FACTOR ** (index - before)) {
        const other = { row: source.rowOf(firstMonth + before), value: String(previous) };
        problems.push(
          makeWarning('jump', { row: source.rowOf(firstMonth + index), column, value: String(count), other }),
        );
      }
    }
    before = index;
  }
  return problems;
}

function findNeverLaunched(series: MonthlySeries, source: SeriesSource): SeriesProblem[] {
  return (['focal', 'rival'] as const)
    .filter((firm) => !series[firm].some((count) => count !== null && count > 0))
    .map((firm) => makeError('never-launched', { column: source[firm] }));
}

function findIdenticalFirms(series: MonthlySeries, source: SeriesSource): SeriesProblem[] {
  const pairs = pairsOf(series);
  const isSame = pairs.every(([focal, rival]) => focal === rival) && pairs.some(([focal]) => focal > 0);
  if (!(isSame && pairs.length >= MIN_MONTHS_TO_COMPARE)) return [];
  return [makeError('identical-firms', { column: source.rival, other: { row: null, value: source.focal } })];
}

/** Counts that always add up to the same are shares. */
function findConstantSum(series: MonthlySeries): SeriesProblem[] {
  const pairs = pairsOf(series).filter(([focal, rival]) => focal > 0 && rival > 0);
  if (pairs.length < MIN_MONTHS_TO_COMPARE) return [];
  const sums = pairs.map(([focal, rival]) => focal + rival);
  const isConstant = relativeSpread(sums) <= CONSTANT_SUM_SPREAD;
  const isMoving = relativeSpread(pairs.map(([focal]) => focal)) > CONSTANT_SUM_SPREAD;
  return isConstant && isMoving
    ? [makeWarning('constant-sum', { value: String(Number(sums[0].toPrecision(4))) })]
    : [];
}

function findUnitMismatch(series: MonthlySeries, source: SeriesSource): SeriesProblem[] {
  const highest = { focal: highestOf(series.focal), rival: highestOf(series.rival) };
  const small = highest.focal < highest.rival ? 'focal' : 'rival';
  const large = small === 'focal' ? 'rival' : 'focal';
  const ratio = highest[large] / highest[small];
  if (!(highest[small] > 0 && ratio >= UNIT_MISMATCH_RATIO)) return [];
  const other = { row: null, value: source[large] };
  return [makeWarning('unit-mismatch', { column: source[small], value: String(Math.round(ratio)), other })];
}

function findTooShort(series: MonthlySeries): SeriesProblem[] {
  const known = countMonthsKnown(series);
  return known < MIN_MONTHS_TO_FIT ? [makeError('too-short-to-fit', { value: String(known) })] : [];
}

function pairsOf({ focal, rival }: MonthlySeries): [number, number][] {
  return focal.flatMap((count, index) => {
    const other = rival[index];
    return count === null || other === null ? [] : [[count, other] as [number, number]];
  });
}

/** (largest - smallest) / mean; 0 for equal numbers. */
function relativeSpread(values: number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const largest = values.reduce((a, b) => Math.max(a, b));
  const smallest = values.reduce((a, b) => Math.min(a, b));
  return (largest - smallest) / mean;
}

function highestOf(counts: readonly (number | null)[]): number {
  return counts.reduce<number>((highest, count) => Math.max(highest, count ?? 0), 0);
}
