/**
 * Months for reading: "Mar 2026", "March 2027", and how precisely a month that lies ahead may be named:
 * a month when its 90 % interval is at most a year and a half wide, a year when it is at most four years wide, else a span of years.
 */
import type { Interval } from '../forecast/report';
import type { Month } from '../series/types';

/** Widest 90 % interval, months, for which a single month is named. */
const MONTH_NAMED_WITHIN = 18;
/** Widest 90 % interval, months, for which a single year is named. */
const YEAR_NAMED_WITHIN = 48;

export interface MonthFormat {
  /** "Mar 2026". */
  short(month: Month): string;
  /** "March 2026". */
  long(month: Month): string;
  year(month: Month): number;
  /** "in March 2027", "around 2027", "some time between 2027 and 2034": as precise as the interval allows. */
  when(monthsAhead: Interval, lastMonth: Month): string;
  /** "Aug 2026 to Jun 2029". */
  interval(monthsAhead: Interval, lastMonth: Month): string;
}

/** @param locale BCP 47 tag for the names of months */
export function createMonthFormat(locale: string): MonthFormat {
  const shortNames = new Intl.DateTimeFormat(locale, { month: 'short', year: 'numeric', timeZone: 'UTC' });
  const longNames = new Intl.DateTimeFormat(locale, { month: 'long', year: 'numeric', timeZone: 'UTC' });
  const short = (month: Month) => shortNames.format(firstDay(month));
  const long = (month: Month) => longNames.format(firstDay(month));
  const at = (ahead: number, lastMonth: Month) => lastMonth + Math.max(1, Math.round(ahead));
  return {
    short,
    long,
    year: yearOf,
    when: (ahead, last) => {
      const width = ahead.q95 - ahead.q05;
      if (width <= MONTH_NAMED_WITHIN) return `around ${long(at(ahead.q50, last))}`;
      const [from, to] = [yearOf(at(ahead.q05, last)), yearOf(at(ahead.q95, last))];
      if (width <= YEAR_NAMED_WITHIN) return `around ${yearOf(at(ahead.q50, last))}`;
      return `some time between ${from} and ${to}`;
    },
    interval: (ahead, last) => {
      const [from, to] = [short(at(ahead.q05, last)), short(at(ahead.q95, last))];
      return from === to ? from : `${from} to ${to}`;
    },
  };
}

function firstDay(month: Month): Date {
  return new Date(Date.UTC(yearOf(month), month - yearOf(month) * 12, 1));
}

function yearOf(month: Month): number {
  return Math.floor(month / 12);
}
