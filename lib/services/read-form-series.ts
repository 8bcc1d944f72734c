/** Reads the counts of a form strictly, whoever sent them: one spelling, months in a row, enough of them to be fitted. */
import { readCanonicalText } from '../series/canonical-text';
import { checkSeries } from '../series/check-series';
import type { SeriesContent } from '../series/compare-series';
import { type Exclusion, leaveOut } from '../series/exclusions';
import { makeMonth } from '../series/month';
import { isBlocking } from '../series/problem';
import type { Month, SeriesProblem } from '../series/types';
import { type Refusal, refuse, type Success, succeed } from './outcome';

export type UnreadableSeries = Refusal<'unreadable-series', { problems: SeriesProblem[] }>;

interface SentContent {
  canonicalText: string;
  exclusions: Exclusion[];
}

/** Header of the month column in problems. */
const MONTH_COLUMN = 'Month';
/** Rows of the sent months, below a header, as a spreadsheet would count them. */
const FIRST_ROW = 2;

export function readFormSeries(
  form: SentContent,
  firms = { focalName: 'Focal firm', rivalName: 'Rival' },
): Success<SeriesContent> | UnreadableSeries {
  const series = readCanonicalText(form.canonicalText);
  if (!series) return refuse('unreadable-series', { problems: [] });
  const exclusions = [...form.exclusions].sort((a, b) => a.month - b.month);
  const end = series.firstMonth + series.focal.length;
  const areMonths = exclusions.every(
    ({ month }, index) => month >= series.firstMonth && month < end && month !== exclusions[index - 1]?.month,
  );
  const used = leaveOut(series, exclusions);
  if (!areMonths || !used) return refuse('unreadable-series', { problems: [] });
  const source = {
    month: MONTH_COLUMN,
    focal: firms.focalName,
    rival: firms.rivalName,
    rowOf: (month: Month) => month - series.firstMonth + FIRST_ROW,
  };
  const problems = checkSeries(used, source, readThisMonth()).filter(isBlocking);
  return problems.length === 0 ? succeed({ series, exclusions }) : refuse('unreadable-series', { problems });
}

function readThisMonth(): Month {
  const now = new Date();
  return makeMonth(now.getFullYear(), now.getMonth() + 1);
}
