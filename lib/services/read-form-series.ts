/** Reads an uploaded table on the server with the same code that showed it in the browser. */
import { makeMonth } from '../series/month';
import { canFit, readSeries } from '../series/read-series';
import type { Month, MonthlySeries, SeriesProblem } from '../series/types';
import type { RevisionForm } from './forms';
import { type Refusal, refuse, type Success, succeed } from './outcome';

export type UnreadableSeries = Refusal<'unreadable-series', { problems: SeriesProblem[] }>;

/** Rows that cannot be read are gaps, as the page has shown; only what stops the whole table from being fitted is refused. */
export function readFormSeries(form: RevisionForm): Success<MonthlySeries> | UnreadableSeries {
  const reading = readSeries(form.text, form.mapping, { thisMonth: readThisMonth() });
  return reading.series && canFit(reading)
    ? succeed(reading.series)
    : refuse('unreadable-series', { problems: reading.problems });
}

function readThisMonth(): Month {
  const now = new Date();
  return makeMonth(now.getFullYear(), now.getMonth() + 1);
}
