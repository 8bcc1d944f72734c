/** The pushed path on the phase map, beside the path without pushes: of the one system that the map draws. */
import type { Push } from '../dynamics/push';
import { type PushedPath, tracePushedPath } from '../scenario/draw-paths';
import { type Box, isInside } from './map-geometry';
import { chooseMapSystem } from './map-system';
import type { MapPathPoint, PhaseMap } from './types';
import type { Words } from './words';

export interface MapPushPath {
  /** Monthly points inside the map, from the last observed month on. */
  points: MapPathPoint[];
  /** Null where the head start does not decide in the map's system: there is no line to cross. */
  hasCrossed: boolean | null;
  /** For a reader that does not see the map, and for the caption. */
  text: string;
}

/** Furthest that a path is followed, months. */
const PATH_MONTHS = 360;
/** A month that moves both firms by less than this part of the map is the end of the path. */
const END_WITHIN = 1e-4;

export function buildPushPath(
  words: Words,
  map: Pick<PhaseMap, 'domain'>,
  pushes: readonly Push[],
): MapPushPath {
  const { system, start } = chooseMapSystem(words.facts.report);
  const box = { x0: 0, y0: 0, x1: map.domain.x[1], y1: map.domain.y[1] };
  const path = tracePushedPath(system, start, pushes, PATH_MONTHS);
  const hasCrossed = path.isHeadStart ? path.hasCrossed : null;
  return { points: cutPath(words, path, pushes, box), hasCrossed, text: describeCrossing(hasCrossed) };
}

function cutPath(words: Words, { pushed }: PushedPath, pushes: readonly Push[], box: Box): MapPathPoint[] {
  const points: MapPathPoint[] = [];
  const settledFrom = Math.max(0, ...pushes.map(lastChange));
  for (const [ahead, [n1, n2]] of pushed.entries()) {
    if (!isInside([n1, n2], box)) break;
    points.push({ point: [n1, n2], month: words.lastMonth + ahead, mark: null });
    const before = pushed[ahead - 1];
    if (ahead <= settledFrom || !before) continue;
    const step = Math.max(Math.abs(n1 - before[0]) / box.x1, Math.abs(n2 - before[1]) / box.y1);
    if (step < END_WITHIN) break;
  }
  return points;
}

/** Month after which a push no longer changes in itself, but for what is carried over. */
function lastChange({ startMonth, rampMonths, lengthMonths }: Push): number {
  return startMonth + (lengthMonths ?? rampMonths);
}

function describeCrossing(hasCrossed: boolean | null): string {
  if (hasCrossed === null) return 'On the fit that the map draws there is no tipping line to cross.';
  return hasCrossed
    ? 'On the fit that the map draws the pushed path crosses the tipping line.'
    : 'On the fit that the map draws the pushed path stays on its side of the tipping line.';
}
