/** SVG paths of the forecast chart. A gap stays a gap: every run of months with values is a piece of its own. */
import type { ForecastPoint, ForecastSeriesKey, ForecastView } from '@/lib/brief/types';

/** Pixels of a month and of a value. */
export interface PlotScale {
  x: (month: number) => number;
  y: (value: number) => number;
}

export interface Place {
  month: number;
  x: number;
  y: number;
}

/** Places of all values that are there, in order of months. */
export function readPlaces(
  view: ForecastView,
  key: ForecastSeriesKey,
  value: 'seen' | 'mid',
  scale: PlotScale,
): Place[] {
  return splitRuns(view, key, (point) => point[value]).flatMap((run) =>
    run.map(({ month, value }) => ({ month, x: scale.x(month), y: scale.y(value) })),
  );
}

export function linePath(
  view: ForecastView,
  key: ForecastSeriesKey,
  value: 'seen' | 'mid',
  scale: PlotScale,
): string {
  return splitRuns(view, key, (point) => point[value])
    .map((run) => `M${run.map(({ month, value }) => place(scale, month, value)).join('L')}`)
    .join('');
}

/** The area between the two edges of a band. */
export function bandPath(
  view: ForecastView,
  key: ForecastSeriesKey,
  band: 'band50' | 'band90',
  scale: PlotScale,
): string {
  return splitRuns(view, key, (point) => point[band])
    .map((run) => {
      const low = run.map(({ month, value }) => place(scale, month, value[0]));
      const high = run.map(({ month, value }) => place(scale, month, value[1])).reverse();
      return `M${[...low, ...high].join('L')}Z`;
    })
    .join('');
}

/** Tenths of a pixel are finer than any screen shows. */
function place(scale: PlotScale, month: number, value: number): string {
  return `${scale.x(month).toFixed(1)},${scale.y(value).toFixed(1)}`;
}

function splitRuns<Value>(
  view: ForecastView,
  key: ForecastSeriesKey,
  read: (point: ForecastPoint) => Value | null,
): { month: number; value: Value }[][] {
  const runs: { month: number; value: Value }[][] = [];
  let isOpen = false;
  for (const { month, points } of view.rows) {
    const point = points[key];
    const value = point ? read(point) : null;
    if (value === null) {
      isOpen = false;
      continue;
    }
    if (!isOpen) runs.push([]);
    runs[runs.length - 1]!.push({ month, value });
    isOpen = true;
  }
  return runs;
}
