/**
 * Days and years as numbers: days since 1970-01-01 of the proleptic Gregorian calendar, and years as people write them. Plain
 * arithmetic on UTC; no clock, no time zone.
 */
import { MAX_YEAR, MIN_YEAR } from './limits';
import type { Month } from './types';

const MONTHS_PER_YEAR = 12;
const MS_PER_DAY = 86_400_000;

/** Two-digit years below this are 20xx, from it on 19xx (common practice, POSIX strptime). */
const SHORT_YEAR_PIVOT = 69;

/** Days since 1970-01-01. `monthOfYear` 1 to 12; a day beyond the month's end runs on into the next month. */
export function dayNumber(year: number, monthOfYear: number, day: number): number {
  return Date.UTC(year, monthOfYear - 1, day) / MS_PER_DAY;
}

export function monthOfDay(day: number): Month {
  const date = new Date(day * MS_PER_DAY);
  return date.getUTCFullYear() * MONTHS_PER_YEAR + date.getUTCMonth();
}

/** First day of a month; that of the next month minus one is its last. */
export function firstDayOf(month: Month): number {
  return dayNumber(Math.floor(month / MONTHS_PER_YEAR), (month % MONTHS_PER_YEAR) + 1, 1);
}

/** A year of four digits within the limits, or one of two digits; else null. */
export function readYear(text: string): number | null {
  const number = Number(text);
  if (text.length === 2) return number < SHORT_YEAR_PIVOT ? 2000 + number : 1900 + number;
  return text.length === 4 && number >= MIN_YEAR && number <= MAX_YEAR ? number : null;
}
