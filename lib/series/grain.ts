/**
 * How often the rows of a table come, and rows finer than months brought to months: their mean, or the last one of each month.
 * A week belongs to the month of its Thursday (ISO 8601). A first or last month that its rows do not fill is told as partial.
 */
import { firstDayOf } from './calendar';
import type { MonthReading } from './month-column';
import type { Aggregation, Grain, Month } from './types';

/** Share of the dated rows that must name quarters, weeks or days. */
const MIN_SHARE = 0.8;
/** Rows per month from which days are no month ends. */
const MIN_ROWS_PER_MONTH = 3;
/** Days between neighbouring rows up to which they are daily; weekends and holidays lie between. */
const LONGEST_DAILY_GAP = 4;
/** Days at either end that a whole month may lack: a weekend with a holiday, or a week. */
const SLACK: Record<'day' | 'week', number> = { day: 4, week: 7 };
const DAYS_PER_WEEK = 7;

export function detectGrain(readings: readonly MonthReading[]): Grain {
  const dated = readings.filter((reading) => reading.kind === 'month');
  const share = (period: Grain) => dated.filter((one) => one.period === period).length / dated.length;
  if (dated.length === 0) return 'month';
  if (share('quarter') >= MIN_SHARE) return 'quarter';
  if (share('week') >= MIN_SHARE) return 'week';
  if (!(share('day') >= MIN_SHARE)) return 'month';
  const days = [...new Set(dated.flatMap(({ day }) => (day === null ? [] : [day])))].sort((a, b) => a - b);
  const months = new Set(dated.map(({ month }) => month)).size;
  if (days.length < MIN_ROWS_PER_MONTH * months) return 'month';
  const gaps = days
    .slice(1)
    .map((day, index) => day - days[index])
    .sort((a, b) => a - b);
  return gaps[gaps.length >> 1] <= LONGEST_DAILY_GAP ? 'day' : 'week';
}

/** The firms' counts of one row, with the day it stands for. */
export interface FineRow {
  row: number;
  month: Month;
  day: number;
  focal: number | null;
  rival: number | null;
}

export interface MonthRow {
  /** The last row of the month. */
  row: number;
  month: Month;
  focal: number | null;
  rival: number | null;
  /** Its rows do not fill it. */
  isPartial: boolean;
}

/** One row a month, in order. */
export function toMonths(
  rows: readonly FineRow[],
  grain: 'day' | 'week',
  aggregation: Aggregation,
): MonthRow[] {
  const byMonth = new Map<Month, FineRow[]>();
  for (const row of rows) {
    const own = byMonth.get(row.month);
    if (own) own.push(row);
    else byMonth.set(row.month, [row]);
  }
  const months = [...byMonth.keys()].sort((a, b) => a - b);
  return months.map((month) => {
    const own = byMonth.get(month)!.sort((a, b) => a.day - b.day);
    const isFirst = month === months[0];
    const isLast = month === months[months.length - 1];
    return {
      row: own[own.length - 1].row,
      month,
      focal: aggregate(
        own.map(({ focal }) => focal),
        aggregation,
      ),
      rival: aggregate(
        own.map(({ rival }) => rival),
        aggregation,
      ),
      isPartial: (isFirst && startsLate(own, grain)) || (isLast && endsEarly(own, grain)),
    };
  });
}

function startsLate([first]: FineRow[], grain: 'day' | 'week'): boolean {
  return first.day > firstDayOf(first.month) + SLACK[grain] - 1;
}

function endsEarly(own: FineRow[], grain: 'day' | 'week'): boolean {
  const { day, month } = own[own.length - 1];
  const covered = grain === 'week' ? day + DAYS_PER_WEEK : day;
  return covered < firstDayOf(month + 1) - SLACK[grain];
}

/** Of the known counts; null when there is none. */
function aggregate(counts: (number | null)[], aggregation: Aggregation): number | null {
  const known = counts.filter((count) => count !== null);
  if (known.length === 0) return null;
  if (aggregation === 'last') return known[known.length - 1];
  return known.reduce((sum, count) => sum + count, 0) / known.length;
}
