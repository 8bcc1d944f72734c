/**
 * The months of a whole column. A single "03/04/2024" could be March or April; a column often says which:
 *   - a part above 12 anywhere rules out a layout for all cells written in the same shape;
 *   - of the layouts left, only one may give one row a month. To prove the day order this takes 13 rows: a run of 12 days
 *     ("01/01/2024" to "01/12/2024") and 12 months look alike, a longer run of days would show a day above 12;
 *   - years of two digits could be days of a year not given, so they too must give one row a month;
 *   - numbers of five digits are a spreadsheet's day numbers only where the whole column is made of them.
 * What stays open is reported with its readings, never guessed.
 */
import { type MonthShape, type MonthText, readMonthText, yearOf } from './month';
import type { MonthLayout } from './period';
import type { DateOrder, Grain, Month } from './types';

export type MonthReading =
  /** `day`: days since 1970-01-01 where the text names a day or a week. */
  | { kind: 'month'; month: Month; period: Grain; day: number | null }
  | { kind: 'ambiguous'; months: Month[] }
  | { kind: 'empty' }
  | { kind: 'unreadable' };

/** Rows that prove which of day and month comes first; fewer could be a run of days. */
const ROWS_TO_PROVE_ORDER = 13;

/** Rows from which one row a month is a pattern. */
const ROWS_TO_SEE_PATTERN = 3;

/** Largest span of months per row that still counts as one row a month: a third of the months may be missing. */
const MAX_SPAN_PER_ROW = 1.5;

/**
 * One reading per text, in the same order. `dateOrder` is the answer of a person and settles the order of day and month.
 * `mayBeSerials`: false where counts could be taken for day numbers.
 */
export function readMonthColumn(
  texts: readonly string[],
  dateOrder?: DateOrder,
  mayBeSerials = true,
): MonthReading[] {
  const cells = texts.map(readMonthText);
  const areSerials =
    mayBeSerials && cells.every(({ shape }, index) => shape === 'serial' || texts[index].trim() === '');
  const layouts = new Map<MonthShape, MonthLayout | null>();
  for (const shape of new Set(cells.map((cell) => cell.shape))) {
    const group = cells.filter((cell) => cell.shape === shape && cell.candidates.length > 0);
    layouts.set(
      shape,
      shape === 'certain' || shape === 'serial' ? null : settleLayout(shape, group, dateOrder),
    );
  }
  return cells.map((cell, index) => {
    if (texts[index].trim() === '') return { kind: 'empty' };
    if (cell.shape === 'serial' && !areSerials) return { kind: 'unreadable' };
    return settleCell(cell, layouts.get(cell.shape) ?? null);
  });
}

function settleCell({ shape, candidates }: MonthText, layout: MonthLayout | null): MonthReading {
  if (candidates.length === 0) return { kind: 'unreadable' };
  const chosen = candidates.find((one) => one.layout === layout);
  if (chosen) return asMonth(chosen);
  const months = [...new Set(candidates.map(({ month }) => month))];
  const needsLayout = shape.startsWith('short-year');
  if (months.length === 1 && !needsLayout) return asMonth(candidates[0]);
  return { kind: 'ambiguous', months };
}

function asMonth({ month, period, day }: MonthText['candidates'][number]): MonthReading {
  return { kind: 'month', month, period, day };
}

/** The one layout that the column proves, or null. */
function settleLayout(shape: MonthShape, group: MonthText[], dateOrder?: DateOrder): MonthLayout | null {
  let layouts = sharedLayouts(group);
  if (dateOrder) layouts = layouts.filter((layout) => layout !== excludedBy(dateOrder));
  if (shape === 'full-year-last' && layouts.length === 1) return layouts[0];

  const bothOrders = layouts.includes('day-month-year') && layouts.includes('month-day-year');
  if (group.length < (bothOrders ? ROWS_TO_PROVE_ORDER : ROWS_TO_SEE_PATTERN)) return null;
  const monthly = layouts.filter((layout) => isOneRowAMonth(group, layout));
  if (monthly.length !== 1) return null;
  return shape === 'short-year' && !spansTwoYears(group, monthly[0]) ? null : monthly[0];
}

function sharedLayouts(group: MonthText[]): MonthLayout[] {
  const offered = group.map(({ candidates }) => candidates.map(({ layout }) => layout));
  return offered.length === 0
    ? []
    : offered[0].filter((layout) => offered.every((list) => list.includes(layout)));
}

function excludedBy(dateOrder: DateOrder): MonthLayout {
  return dateOrder === 'day-first' ? 'month-day-year' : 'day-month-year';
}

function monthsOf(group: MonthText[], layout: MonthLayout): Month[] {
  return group.map(({ candidates }) => candidates.find((one) => one.layout === layout)!.month);
}

function isOneRowAMonth(group: MonthText[], layout: MonthLayout): boolean {
  const sorted = monthsOf(group, layout).sort((a, b) => a - b);
  const isDistinct = sorted.every((month, index) => index === 0 || month !== sorted[index - 1]);
  return isDistinct && sorted[sorted.length - 1] - sorted[0] + 1 <= MAX_SPAN_PER_ROW * sorted.length;
}

function spansTwoYears(group: MonthText[], layout: MonthLayout): boolean {
  return new Set(monthsOf(group, layout).map(yearOf)).size > 1;
}
