/** The locale of every number and month on a page, the same on the server and in the browser, and how days are written. */
import { DEFAULT_LOCALE } from '@/lib/brief/words';

export const LOCALE = DEFAULT_LOCALE;

const days = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  timeZone: 'UTC',
});

/** "12 March 2026", by the calendar of UTC, so that a frozen date reads the same everywhere. */
export function formatDay(date: Date): string {
  return days.format(date);
}
