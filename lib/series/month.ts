/**
 * Calendar months as integers: month = year * 12 + (month of the year - 1). Differences are months; no clock, no time zone.
 * A text is read into every month that it could name; `month-column.ts` settles the open ones with the rest of the column.
 */
import { dayNumber, readYear } from './calendar';
import { monthOfYearFromName } from './month-names';
import { type MonthLayout, type PeriodText, readQuarter, readSerial, readWeek } from './period';
import type { Month } from './types';

const MONTHS_PER_YEAR = 12;
const LAST_DAY = 31;

/** A number such as 31.5, which is no month of a two-digit year. */
const DECIMAL = /^\d{1,2}\.\d{1,2}$/;

/** How a text is written; texts of one shape in one column share one layout. */
export type MonthShape =
  | 'certain'
  | 'full-year-last'
  | 'short-year'
  | 'short-year-with-day'
  | 'short-year-name'
  | 'serial';

export interface MonthText {
  shape: MonthShape;
  /** Every month the text could name, by layout. Empty: no month at all. */
  candidates: PeriodText[];
}

/** `monthOfYear` 1 to 12. Throws when it is not: the caller has checked it. */
export function makeMonth(year: number, monthOfYear: number): Month {
  if (!(Number.isInteger(year) && Number.isInteger(monthOfYear) && monthOfYear >= 1 && monthOfYear <= 12)) {
    throw new RangeError(`makeMonth: year ${year}, month of the year ${monthOfYear}`);
  }
  return year * MONTHS_PER_YEAR + monthOfYear - 1;
}

/** The month that is `count` months later (earlier when negative). */
export function addMonths(month: Month, count: number): Month {
  return month + count;
}

export function yearOf(month: Month): number {
  return Math.floor(month / MONTHS_PER_YEAR);
}

/** 1 to 12. */
export function monthOfYear(month: Month): number {
  return month - yearOf(month) * MONTHS_PER_YEAR + 1;
}

/** "2024-03". Throws when `month` is not an integer. */
export function formatMonth(month: Month): string {
  if (!Number.isInteger(month)) throw new RangeError(`formatMonth: month ${month}`);
  return `${String(yearOf(month)).padStart(4, '0')}-${String(monthOfYear(month)).padStart(2, '0')}`;
}

/** The month that a single text names beyond doubt ("2024-03", "31 Mar 2024", "03/2024", "25/03/2024"), else null. */
export function parseMonth(text: string): Month | null {
  const { shape, candidates } = readMonthText(text);
  if (candidates.length === 0 || shape === 'serial' || shape.startsWith('short-year')) return null;
  return candidates.every(({ month }) => month === candidates[0].month) ? candidates[0].month : null;
}

/** Every month that a text could name. */
export function readMonthText(text: string): MonthText {
  const plain = text
    .trim()
    .replace(/\s+/g, ' ')
    .replace(/[‐-―−]/g, '-')
    .replace(/(?<=\d)(T| )\d{1,2}:\d{2}(:\d{2}([.,]\d+)?)?( ?[AaPp][Mm])?( ?(Z|UTC|[+-]\d{2}:?\d{2}))?$/, '');
  if (/^\d{4}-?M\d{2}$/i.test(plain)) return readNumbers([plain.slice(0, 4), plain.slice(-2)]);
  if (/^\d{6}$/.test(plain)) return readNumbers([plain.slice(0, 4), plain.slice(4)]);
  if (/^\d{8}$/.test(plain)) return readNumbers([plain.slice(0, 4), plain.slice(4, 6), plain.slice(6)]);
  if (DECIMAL.test(plain)) return nothing;
  if (/^\d{1,4}([-/. ])\d{1,4}(\1\d{1,4})?$/.test(plain)) return readNumbers(plain.split(/[-/. ]/));
  const period = readQuarter(plain) ?? readWeek(plain);
  if (period) return asText('certain', period);
  const serial = readSerial(plain);
  return serial ? asText('serial', serial) : readNamed(plain);
}

const nothing: MonthText = { shape: 'certain', candidates: [] };

/** Two or three numbers in the order they stand. */
function readNumbers(parts: string[]): MonthText {
  const [first, second, third] = parts;
  if (third === undefined) {
    if (first.length === 4) return asText('certain', candidate('year-month', first, second));
    if (second.length === 4) return asText('certain', candidate('month-year', second, first));
    return asText(
      'short-year',
      candidate('month-year', second, first),
      candidate('year-month', first, second),
    );
  }
  if (first.length === 4) return asText('certain', candidate('year-month-day', first, second, third));
  const lastIsYear = [
    candidate('day-month-year', third, second, first),
    candidate('month-day-year', third, first, second),
  ];
  if (third.length === 4) return asText('full-year-last', ...lastIsYear);
  return asText('short-year-with-day', ...lastIsYear, candidate('year-month-day', first, second, third));
}

/** A month name with a year and perhaps a day, in any order. */
function readNamed(plain: string): MonthText {
  const tokens = plain.replace(/(\d)(st|nd|rd|th)\b/gi, '$1').match(/\d+|\p{L}[\p{L}\p{M}]*/gu) ?? [];
  const isOnlyTokens = plain.replace(/[\p{L}\p{M}\d\s.,'’/-]/gu, '') === '';
  const words = tokens.filter((token) => !/\d/.test(token) && token.toLowerCase() !== 'de');
  const monthNumber = words.length === 1 ? monthOfYearFromName(words[0]) : null;
  if (!isOnlyTokens || monthNumber === null) return nothing;

  const numbers = tokens.filter((token) => /\d/.test(token));
  const fullYears = numbers.filter((token) => token.length === 4);
  const year = fullYears.length === 1 ? fullYears[0] : numbers.at(-1);
  const days = numbers.filter((token) => token !== year);
  if (year === undefined || numbers.length > 2 || days.length !== numbers.length - 1) return nothing;
  const shape = year.length === 4 ? 'certain' : 'short-year-name';
  return asText(shape, candidate('name', year, String(monthNumber), days[0]));
}

function asText(shape: MonthShape, ...candidates: (PeriodText | null)[]): MonthText {
  return { shape, candidates: candidates.filter((one) => one !== null) };
}

/** null when the parts are no year, month of the year and day. */
function candidate(
  layout: MonthLayout,
  yearText: string,
  monthText: string,
  dayText?: string,
): PeriodText | null {
  const year = readYear(yearText);
  const monthNumber = Number(monthText);
  const day = Number(dayText ?? '1');
  if (year === null || monthText.length > 2 || (dayText?.length ?? 0) > 2) return null;
  if (!(monthNumber >= 1 && monthNumber <= MONTHS_PER_YEAR && day >= 1 && day <= LAST_DAY)) return null;
  const month = makeMonth(year, monthNumber);
  if (dayText === undefined) return { layout, month, period: 'month', day: null };
  return { layout, month, period: 'day', day: dayNumber(year, monthNumber, day) };
}
