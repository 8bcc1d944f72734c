/** Plane geometry of the maps: cutting lines to a rectangle, distances, crossings. */
import type { MapPoint } from './types';

/** A rectangle by its lower left and upper right corner. */
export interface Box {
  x0: number;
  y0: number;
  x1: number;
  y1: number;
}

/** Cuts the segment a-b to the box (Liang & Barsky 1984); null when none of it is inside. */
export function clipSegment(a: MapPoint, b: MapPoint, box: Box): [MapPoint, MapPoint] | null {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  let from = 0;
  let to = 1;
  for (const [step, room] of [
    [-dx, a[0] - box.x0],
    [dx, box.x1 - a[0]],
    [-dy, a[1] - box.y0],
    [dy, box.y1 - a[1]],
  ] as const) {
    if (step === 0) {
      if (room < 0) return null;
    } else if (step < 0) from = Math.max(from, room / step);
    else to = Math.min(to, room / step);
  }
  if (!(from <= to)) return null;
  const at = (t: number): MapPoint => [a[0] + t * dx, a[1] + t * dy];
  return [from === 0 ? a : at(from), to === 1 ? b : at(to)];
}

/** The first unbroken part of a polyline that lies inside the box. */
export function clipPolyline(points: MapPoint[], box: Box): MapPoint[] {
  const inside: MapPoint[] = [];
  for (let i = 1; i < points.length; i++) {
    const part = clipSegment(points[i - 1]!, points[i]!, box);
    if (!part) {
      if (inside.length > 0) break;
      continue;
    }
    if (inside.length === 0) inside.push(part[0]);
    inside.push(part[1]);
    if (part[1] !== points[i]) break;
  }
  return inside;
}

export function isInside(point: MapPoint, box: Box): boolean {
  return point[0] >= box.x0 && point[0] <= box.x1 && point[1] >= box.y0 && point[1] <= box.y1;
}

/** Distance of `p` from the segment a-b. */
export function distanceToSegment(p: MapPoint, a: MapPoint, b: MapPoint): number {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const square = dx * dx + dy * dy;
  const t = square > 0 ? Math.min(1, Math.max(0, ((p[0] - a[0]) * dx + (p[1] - a[1]) * dy) / square)) : 0;
  return Math.hypot(p[0] - a[0] - t * dx, p[1] - a[1] - t * dy);
}

/** Smallest distance of `p` from a polyline; infinite for one with fewer than two points. */
export function distanceToPolyline(p: MapPoint, line: MapPoint[]): number {
  let distance = Number.POSITIVE_INFINITY;
  for (let i = 1; i < line.length; i++)
    distance = Math.min(distance, distanceToSegment(p, line[i - 1]!, line[i]!));
  return distance;
}

/** Length of the segment a-b inside the box. */
export function lengthInside(a: MapPoint, b: MapPoint, box: Box): number {
  if (Math.max(a[0], b[0]) < box.x0 || Math.min(a[0], b[0]) > box.x1) return 0;
  if (Math.max(a[1], b[1]) < box.y0 || Math.min(a[1], b[1]) > box.y1) return 0;
  const part = clipSegment(a, b, box);
  return part ? Math.hypot(part[1][0] - part[0][0], part[1][1] - part[0][1]) : 0;
}

/** Area that two boxes share. */
export function sharedArea(a: Box, b: Box): number {
  const width = Math.min(a.x1, b.x1) - Math.max(a.x0, b.x0);
  const height = Math.min(a.y1, b.y1) - Math.max(a.y0, b.y0);
  return width > 0 && height > 0 ? width * height : 0;
}
