/**
 * Texts that name a quarter (2024-Q1, Q1 2024, 1Q24), a week (2024-W05, Week 5 2024; ISO 8601) or a spreadsheet's day number (45350).
 */
import { dayNumber, monthOfDay, readYear } from './calendar';
import type { Grain, Month } from './types';

/** In which order the parts of a text are taken. */
export type MonthLayout =
  | 'year-month'
  | 'month-year'
  | 'year-month-day'
  | 'day-month-year'
  | 'month-day-year'
  | 'name'
  | 'quarter'
  | 'week'
  | 'serial';

/** What a text names under one layout. */
export interface PeriodText {
  layout: MonthLayout;
  /** Of a quarter its last one; of a week the one that holds its Thursday (ISO 8601). */
  month: Month;
  period: Grain;
  /** Days since 1970-01-01: the day itself, or the Monday of a week; null when the text names no day. */
  day: number | null;
}

const QUARTER = [
  /^(?<year>\d{4})[ \-/.]?Q(?<quarter>[1-4])$/i,
  /^Q(?<quarter>[1-4])[ \-/.’']*(?<year>\d{4}|\d{2})$/i,
  /^(?<quarter>[1-4])Q[ \-/.’']*(?<year>\d{4}|\d{2})$/i,
];

export function readQuarter(text: string): PeriodText | null {
  const parts = matchAny(QUARTER, text);
  const year = parts ? readYear(parts.year!) : null;
  if (!parts || year === null) return null;
  const month = year * 12 + 3 * Number(parts.quarter) - 1;
  return { layout: 'quarter', month, period: 'quarter', day: null };
}

const WEEK = [
  /^(?<year>\d{4})[ -]?W(?<week>\d{2})(?:-?[1-7])?$/i,
  /^(?<year>\d{4})[ ,/-]+(?:W|wk|week|KW)[ .]*(?<week>\d{1,2})$/i,
  /^(?:W|wk|week|KW)[ .]*(?<week>\d{1,2})[ ,/-]+(?<year>\d{4})$/i,
];

const DAYS_PER_WEEK = 7;
const LAST_WEEK = 53;
/** 1970-01-01 was a Thursday: days since then, plus this, count from a Monday. */
const MONDAY_OFFSET = 3;
const THURSDAY = 3;

export function readWeek(text: string): PeriodText | null {
  const parts = matchAny(WEEK, text);
  const year = parts ? readYear(parts.year!) : null;
  const week = Number(parts?.week);
  if (year === null || !(week >= 1 && week <= LAST_WEEK)) return null;
  const fourth = dayNumber(year, 1, 4);
  const weekday = (((fourth + MONDAY_OFFSET) % DAYS_PER_WEEK) + DAYS_PER_WEEK) % DAYS_PER_WEEK;
  const monday = fourth - weekday + (week - 1) * DAYS_PER_WEEK;
  return { layout: 'week', month: monthOfDay(monday + THURSDAY), period: 'week', day: monday };
}

/** Day numbers of the years 1954 to 2099: 0 is 1899-12-30, which sets right the leap day that 1900 did not have (ECMA-376, 18.17.4). */
const SERIAL = /^(\d{5})(?:[.,]\d+)?$/;
const FIRST_SERIAL = 20_000;
const LAST_SERIAL = 73_050;
const SERIAL_EPOCH = dayNumber(1899, 12, 30);

export function readSerial(text: string): PeriodText | null {
  const serial = Number(SERIAL.exec(text)?.[1]);
  if (!(serial >= FIRST_SERIAL && serial <= LAST_SERIAL)) return null;
  const day = SERIAL_EPOCH + serial;
  return { layout: 'serial', month: monthOfDay(day), period: 'day', day };
}

function matchAny(patterns: RegExp[], text: string): Record<string, string | undefined> | null {
  for (const pattern of patterns) {
    const groups = pattern.exec(text)?.groups;
    if (groups) return groups;
  }
  return null;
}
