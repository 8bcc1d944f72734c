/**
 * Brings together what two people changed of the same revision. Where only one of them touched a count or a month's exclusion,
 * that one's value stands; where both did and differ, mine stands and the month is told.
 */
import { endOf, type MonthContent, readerOf, type SeriesContent } from './compare-series';
import type { Exclusion } from './exclusions';
import type { Month } from './types';

export interface MergedSeries extends SeriesContent {
  /** Months in which both changed the same thing, differently. */
  conflicts: Month[];
}

export function mergeSeries(base: SeriesContent, mine: SeriesContent, theirs: SeriesContent): MergedSeries {
  const contents = [base, mine, theirs];
  const [readBase, readMine, readTheirs] = contents.map(readerOf) as [Reader, Reader, Reader];
  const first = Math.min(...contents.map(({ series }) => series.firstMonth));
  const end = Math.max(...contents.map(({ series }) => endOf(series)));
  const conflicts: Month[] = [];
  const months: (MonthContent & { month: Month })[] = [];
  for (let month = first; month < end; month++) {
    const merged = mergeMonth(readBase(month), readMine(month), readTheirs(month));
    if (merged.isConflict) conflicts.push(month);
    months.push({ month, ...merged.content });
  }
  return { ...fromMonths(months), conflicts };
}

type Reader = (month: Month) => MonthContent;

function mergeMonth(base: MonthContent, mine: MonthContent, theirs: MonthContent) {
  let isConflict = false;
  const pick = <Key extends keyof MonthContent>(key: Key): MonthContent[Key] => {
    if (mine[key] === base[key]) return theirs[key];
    if (theirs[key] !== base[key] && theirs[key] !== mine[key]) isConflict = true;
    return mine[key];
  };
  const content = { focal: pick('focal'), rival: pick('rival'), exclusion: pick('exclusion') };
  return { content, isConflict };
}

/** Months in a row -> content, without months at either end that hold no count. */
export function fromMonths(months: readonly (MonthContent & { month: Month })[]): SeriesContent {
  const isKnown = ({ focal, rival }: MonthContent) => focal !== null || rival !== null;
  const start = months.findIndex(isKnown);
  const kept = start < 0 ? [] : months.slice(start, months.findLastIndex(isKnown) + 1);
  const exclusions = kept.flatMap(({ month, exclusion }): Exclusion[] =>
    exclusion === null ? [] : [{ month, reason: exclusion }],
  );
  const series = {
    firstMonth: kept[0]?.month ?? months[0]?.month ?? 0,
    focal: kept.map(({ focal }) => focal),
    rival: kept.map(({ rival }) => rival),
  };
  return { series, exclusions };
}
