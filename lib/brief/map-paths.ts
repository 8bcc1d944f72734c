/** The path so far (observed months, gaps left open) and the path ahead (the map's system, integrated) on the phase map. */
import { integrate } from '../dynamics/integrate';
import { fillGrowth } from '../dynamics/system';
import type { Month, MonthlySeries } from '../series/types';
import { type Box, isInside } from './map-geometry';
import type { MapSystem } from './map-system';
import type { MonthFormat } from './month-words';
import type { MapPathPoint, MapPoint } from './types';

/** Furthest that the path ahead is drawn, months. */
const AHEAD_MONTHS = 360;
/** The path ahead is drawn until it stays within this part of the map from its end. */
const END_WITHIN = 2e-3;
const PATH_TOLERANCE = 1e-7;
/** Most marks on the path ahead. */
const MARKS_AHEAD = 6;

export function readPathSoFar(series: MonthlySeries, months: MonthFormat): MapPathPoint[][] {
  const pieces: MapPathPoint[][] = [];
  let piece: MapPathPoint[] = [];
  series.focal.forEach((focal, i) => {
    const rival = series.rival[i] ?? null;
    if (focal === null || rival === null) {
      if (piece.length > 0) pieces.push(piece);
      piece = [];
      return;
    }
    const month = series.firstMonth + i;
    piece.push({ point: [focal, rival], month, mark: month % 12 === 0 ? String(months.year(month)) : null });
  });
  if (piece.length > 0) pieces.push(piece);
  markEnds(pieces, months);
  return pieces;
}

function markEnds(pieces: MapPathPoint[][], months: MonthFormat): void {
  const [first, last] = [pieces[0]?.[0], pieces.at(-1)?.at(-1)];
  if (first) first.mark = months.short(first.month);
  if (last) last.mark = months.short(last.month);
}

/**
 * Monthly points from the last observed month on, until the path has settled or leaves the map.
 * Empty when the start is not inside or the system cannot be followed.
 */
export function tracePathAhead(
  map: MapSystem,
  lastMonth: Month,
  box: Box,
  months: MonthFormat,
): MapPathPoint[] {
  const { system, start } = map;
  if (!isInside([start[0], start[1]], box)) return [];
  const run = integrate((_, state, out) => fillGrowth(system, state, out), 0, start, AHEAD_MONTHS, {
    relativeTolerance: PATH_TOLERANCE,
    absoluteTolerance: [PATH_TOLERANCE * box.x1, PATH_TOLERANCE * box.y1],
    isDense: true,
  });
  if (run.status !== 'reached-end' || !run.path) return [];
  const path: MapPathPoint[] = [];
  const state = new Float64Array(2);
  for (let ahead = 0; ahead <= AHEAD_MONTHS; ahead++) {
    run.path.evaluateAt(ahead, state);
    const point: MapPoint = [state[0]!, state[1]!];
    if (!isInside(point, box)) break;
    path.push({ point, month: lastMonth + ahead, mark: null });
  }
  return markYears(cutTail(path, box), months);
}

/** Drops the months that hardly move any more, keeping the last of them. */
function cutTail(path: MapPathPoint[], box: Box): MapPathPoint[] {
  const end = path.at(-1)?.point;
  if (!end) return path;
  const isAway = ({ point }: MapPathPoint) =>
    Math.hypot((point[0] - end[0]) / box.x1, (point[1] - end[1]) / box.y1) > END_WITHIN;
  return path.slice(0, path.findLastIndex(isAway) + 2);
}

function markYears(path: MapPathPoint[], months: MonthFormat): MapPathPoint[] {
  const every = Math.max(1, Math.ceil(path.length / 12 / MARKS_AHEAD));
  return path.map((at, i) => {
    const isMarked = i > 0 && at.month % 12 === 0 && months.year(at.month) % every === 0;
    return isMarked ? { ...at, mark: String(months.year(at.month)) } : at;
  });
}
