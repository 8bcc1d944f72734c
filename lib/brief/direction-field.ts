/** Direction marks of the phase map: which way the market moves from each place, fading where they would clutter a line. */
import { type CompetitionSystem, fillGrowth } from '../dynamics/system';
import { type Box, distanceToPolyline } from './map-geometry';
import type { MapDirection, MapPoint } from './types';

/** Marks along each axis. */
const MARKS_PER_AXIS = 9;
/** Distance from a line, as part of the map, within which a mark fades. */
const FADE_WITHIN = 0.07;

/** `lines` in users. Directions are unit vectors in fractions of the map, so they look right whatever the units of the axes. */
export function buildDirections(system: CompetitionSystem, box: Box, lines: MapPoint[][]): MapDirection[] {
  const scaledLines = lines.map((line) => line.map((point) => scale(point, box)));
  const growth = new Float64Array(2);
  const marks: MapDirection[] = [];
  for (let row = 0; row < MARKS_PER_AXIS; row++) {
    for (let column = 0; column < MARKS_PER_AXIS; column++) {
      const at: MapPoint = [
        ((column + 0.5) / MARKS_PER_AXIS) * box.x1,
        ((row + 0.5) / MARKS_PER_AXIS) * box.y1,
      ];
      fillGrowth(system, at, growth);
      const [dx, dy] = [growth[0]! / box.x1, growth[1]! / box.y1];
      const length = Math.hypot(dx, dy);
      if (!(length > 0)) continue;
      const near = Math.min(...scaledLines.map((line) => distanceToPolyline(scale(at, box), line)));
      marks.push({ at, dx: dx / length, dy: dy / length, strength: smoothStep(near / FADE_WITHIN) });
    }
  }
  return marks;
}

function scale(point: MapPoint, box: Box): MapPoint {
  return [point[0] / box.x1, point[1] / box.y1];
}

/** 0 at 0, 1 from 1 on, flat at both ends. */
function smoothStep(x: number): number {
  const t = Math.min(1, Math.max(0, x));
  return t * t * (3 - 2 * t);
}
