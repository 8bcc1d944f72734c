'use client';

/** Source text and chosen columns -> what was understood, computed in the browser with the code that the server uses. */
import { useDeferredValue, useMemo, useState } from 'react';
import { makeMonth } from '@/lib/series/month';
import { readTable } from '@/lib/series/parse-table';
import { canFit, readSeriesFromTable } from '@/lib/series/read-series';
import type { SeriesMapping, SeriesReading, TableReading } from '@/lib/series/types';
import type { SourceText } from './source-step';

export interface Reading {
  source: SourceText;
  setSource: (source: SourceText) => void;
  /** null: nothing was given yet. */
  table: TableReading | null;
  /** null: the table has no columns. */
  mapping: SeriesMapping | null;
  setMapping: (mapping: SeriesMapping) => void;
  series: SeriesReading | null;
  canFit: boolean;
}

const NOTHING: SourceText = { fileName: null, text: '' };

export function useReading(): Reading {
  const [source, setSourceState] = useState<SourceText>(NOTHING);
  const [chosen, setMapping] = useState<SeriesMapping | null>(null);
  const text = useDeferredValue(source.text);
  const table = useMemo(() => (text.trim() === '' ? null : readTable(text)), [text]);
  const mapping = useMemo(() => (table ? fitMapping(table, chosen) : null), [table, chosen]);
  const series = useMemo(
    () => (table && mapping ? readSeriesFromTable(table, mapping, { thisMonth: currentMonth() }) : null),
    [table, mapping],
  );
  const setSource = (next: SourceText) => {
    setSourceState(next);
    setMapping(null);
  };
  return { source, setSource, table, mapping, setMapping, series, canFit: series !== null && canFit(series) };
}

/** The chosen columns while the table has them, else the guess, else the columns in their order. */
function fitMapping(table: TableReading, chosen: SeriesMapping | null): SeriesMapping | null {
  const { header, guess } = table;
  const hasChosen =
    chosen && [chosen.month, chosen.focal, chosen.rival].every((name) => header.includes(name));
  if (hasChosen) return chosen;
  const [first, second, third] = header;
  if (first === undefined || second === undefined || third === undefined) return null;
  const rest = header.filter((name) => name !== guess.month && name !== guess.focal);
  return {
    month: guess.month ?? first,
    focal: guess.focal ?? second,
    rival: guess.rival ?? rest[0] ?? third,
  };
}

function currentMonth(): number {
  const now = new Date();
  return makeMonth(now.getFullYear(), now.getMonth() + 1);
}
