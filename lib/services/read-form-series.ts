/** Reads an uploaded table on the server with the same code that showed it in the browser. */
import { readSeries } from '../series/read-series';
import type { MonthlySeries, SeriesProblem } from '../series/types';
import type { RevisionForm } from './forms';
import { type Refusal, refuse, type Success, succeed } from './outcome';

export type UnreadableSeries = Refusal<'unreadable-series', { problems: SeriesProblem[] }>;

export function readFormSeries(form: RevisionForm): Success<MonthlySeries> | UnreadableSeries {
  const { series, problems } = readSeries(form.text, form.mapping);
  return series ? succeed(series) : refuse('unreadable-series', { problems });
}
