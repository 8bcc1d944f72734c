/** Rows of the forecast chart: the observed months, then the forecast bands. A month that was not counted stays a gap. */
import type { Bands } from '../forecast/report';
import type { FigureTable, ForecastPoint, ForecastRow, ForecastSeriesKey } from './types';
import type { Words } from './words';

/** What one series of a view shows and how its numbers read. */
export interface SeriesSource {
  key: ForecastSeriesKey;
  name: string;
  seen: (number | null)[];
  bands: Bands;
  spellSeen(value: number): string;
  spellForecast(value: number, band: [number, number]): string;
}

export function buildForecastRows(words: Words, sources: SeriesSource[]): ForecastRow[] {
  const { firstMonth, focal } = words.facts.series;
  const history = focal.map((_, i): ForecastRow => {
    const isLast = i === focal.length - 1;
    return makeRow(words, firstMonth + i, false, sources, (source) => seenPoint(source, i, isLast));
  });
  const { firstMonth: firstForecast, horizonMonths } = words.facts.report.outlook;
  const forecast = Array.from({ length: horizonMonths }, (_, ahead) =>
    makeRow(words, firstForecast + ahead, true, sources, (source) => forecastPoint(source, ahead)),
  );
  return [...history, ...forecast];
}

function makeRow(
  words: Words,
  month: number,
  isForecast: boolean,
  sources: SeriesSource[],
  point: (source: SeriesSource) => ForecastPoint,
): ForecastRow {
  const points = Object.fromEntries(sources.map((source) => [source.key, point(source)]));
  return { month, label: words.months.short(month), isForecast, points };
}

/** In the last month line and bands start from the count itself: it is known, so they have no width there. */
function seenPoint(source: SeriesSource, i: number, isLast: boolean): ForecastPoint {
  const seen = source.seen[i] ?? null;
  if (seen === null) return { seen: null, mid: null, band50: null, band90: null, text: '' };
  const text = source.spellSeen(seen);
  if (!isLast) return { seen, mid: null, band50: null, band90: null, text };
  return { seen, mid: seen, band50: [seen, seen], band90: [seen, seen], text };
}

function forecastPoint({ bands, spellForecast }: SeriesSource, ahead: number): ForecastPoint {
  const mid = bands.q50[ahead]!;
  const band90: [number, number] = [bands.q05[ahead]!, bands.q95[ahead]!];
  const band50: [number, number] = [bands.q25[ahead]!, bands.q75[ahead]!];
  return { seen: null, mid, band50, band90, text: spellForecast(mid, band90) };
}

export function tabulateForecast(title: string, sources: SeriesSource[], rows: ForecastRow[]): FigureTable {
  const columns = sources.flatMap(({ name }) => [name, `${name}, 90\u00a0% from`, `${name}, 90\u00a0% to`]);
  const numbers = (row: ForecastRow): (number | null)[] =>
    sources.flatMap(({ key }) => {
      const point = row.points[key];
      if (!point) return [null, null, null];
      return row.isForecast ? [point.mid, point.band90![0], point.band90![1]] : [point.seen, null, null];
    });
  const raw = rows.map((row) => [row.label, ...numbers(row)]);
  return {
    title,
    columns: ['Month', ...columns],
    rows: rows.map((row) => [row.label, ...sources.flatMap((source) => spellCells(source, row))]),
    raw,
  };
}

function spellCells(source: SeriesSource, row: ForecastRow): string[] {
  const point = row.points[source.key];
  if (!point || (point.seen === null && point.mid === null)) return ['', '', ''];
  if (!row.isForecast) return [source.spellSeen(point.seen!), '', ''];
  const band = point.band90!;
  return [point.mid!, band[0], band[1]].map((value) => source.spellSeen(value));
}
