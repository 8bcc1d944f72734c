/**
 * Places the words on the phase map so that they stand beside what they name and do not cover each other, the lines or the marks.
 * Every label has a list of candidate places; the cheapest one given the labels placed before it is taken (greedy, in the order
 * of the list). All lengths here are pixels of the frame, y upwards.
 */
import { type Box, distanceToPolyline, lengthInside, sharedArea } from './map-geometry';
import type { LabelFrame, MapPoint, PhaseMap, PlacedLabel } from './types';

/** Mean width of a letter and height of a line, in font sizes. */
const LETTER_WIDTH = 0.55;
const LINE_HEIGHT = 1.25;
/** Room between a label and what it names, pixels. */
const GAP = 6;
/** Points of a path nearer than this, pixels, read as one. */
const TOLD_APART = 4;
/** Directions tried around a point. */
const DIRECTIONS = 16;
/** Half the size of a mark, pixels. */
const MARK_RADIUS = 6;

/** Prices of a candidate place. Leaving the frame or covering a word is never worth it while any other place exists. */
const COST = {
  outsidePerPixel: 40,
  coveredWordPerSquarePixel: 10,
  crossedLinePerPixel: 5,
  coveredMark: 60,
  coveredDot: 0.5,
  nearerToAnotherLine: 40,
  distancePerPixel: 0.15,
};

interface Candidate {
  x: number;
  y: number;
  anchor: PlacedLabel['anchor'];
  /** Distance from the wanted place, pixels. */
  away: number;
}

interface Scene {
  frame: LabelFrame;
  /** Polylines by id. */
  lines: Map<string, MapPoint[]>;
  marks: MapPoint[];
  dots: MapPoint[];
}

/** Labels of `map` placed anew for a plot of this size; texts and tones stay. */
export function placeMapLabels(map: PhaseMap, frame: LabelFrame): PlacedLabel[] {
  const scene = buildScene(map, frame);
  const taken: Box[] = [];
  const placed: PlacedLabel[] = [];
  for (const label of map.labels) {
    const candidates = listCandidates(label, map, scene);
    let best: { at: Candidate; box: Box; cost: number } | null = null;
    for (const at of candidates) {
      const box = boxOf(label, at, frame);
      const cost = priceOf(label, at, box, scene, taken);
      if (!best || cost < best.cost) best = { at, box, cost };
    }
    if (!best) continue;
    taken.push(best.box);
    placed.push({
      ...label,
      x: best.at.x / frame.width,
      y: best.at.y / frame.height,
      anchor: best.at.anchor,
    });
  }
  return placed;
}

function buildScene(map: PhaseMap, frame: LabelFrame): Scene {
  const toPixel = ([x, y]: MapPoint): MapPoint => [
    (x / map.domain.x[1]) * frame.width,
    (y / map.domain.y[1]) * frame.height,
  ];
  const lines = new Map<string, MapPoint[]>();
  for (const stop of map.growthStops) lines.set(`stop-${stop.firm}`, stop.points.map(toPixel));
  if (map.separatrix) lines.set('separatrix', map.separatrix.map(toPixel));
  map.pathSoFar.forEach((piece, i) => {
    lines.set(`so-far-${i}`, thinLine(piece.map((at) => toPixel(at.point))));
  });
  lines.set('ahead', thinLine(map.pathAhead.map((at) => toPixel(at.point))));
  return {
    frame,
    lines,
    marks: map.equilibria.map((one) => toPixel(one.point)),
    dots: map.cloud.map((one) => toPixel(one.point)),
  };
}

/** Leaves out points that lie too close to the one before to be told from it; the last point stays. */
function thinLine(line: MapPoint[]): MapPoint[] {
  const kept: MapPoint[] = [];
  line.forEach((point, i) => {
    const before = kept.at(-1);
    if (!before || i === line.length - 1 || distance(before, point) >= TOLD_APART) kept.push(point);
  });
  return kept;
}

function listCandidates(label: PlacedLabel, map: PhaseMap, scene: Scene): Candidate[] {
  const line = scene.lines.get(label.id);
  if (line) return besideLine(line);
  const equilibrium = map.equilibria.findIndex((_, i) => label.id === `equilibrium-${i}`);
  if (equilibrium >= 0) return aroundPoint(scene.marks[equilibrium]!);
  const lastPiece = scene.lines.get(`so-far-${map.pathSoFar.length - 1}`);
  const now = lastPiece?.at(-1);
  return label.id === 'now' && now ? aroundPoint(now) : [];
}

/** Both sides of a polyline, at many places along it. */
function besideLine(line: MapPoint[]): Candidate[] {
  const candidates: Candidate[] = [];
  const lengths = line.map((_, i) => (i === 0 ? 0 : distance(line[i - 1]!, line[i]!)));
  const total = lengths.reduce((sum, length) => sum + length, 0);
  for (let part = 0.06; part < 0.95; part += 0.04) {
    const [at, along] = pointAlong(line, lengths, part * total);
    for (const side of [1, -1]) {
      const normal: MapPoint = [-along[1] * side, along[0] * side];
      const anchor = Math.abs(normal[0]) < 0.35 ? 'middle' : normal[0] > 0 ? 'start' : 'end';
      for (const gap of [GAP, 2 * GAP, 4 * GAP]) {
        candidates.push({
          x: at[0] + normal[0] * gap,
          y: at[1] + normal[1] * (gap + (anchor === 'middle' ? GAP : 0)),
          anchor,
          away: gap + 20 * Math.abs(part - 0.5),
        });
      }
    }
  }
  return candidates;
}

function pointAlong(line: MapPoint[], lengths: number[], length: number): [MapPoint, MapPoint] {
  let left = length;
  for (let i = 1; i < line.length; i++) {
    const [a, b] = [line[i - 1]!, line[i]!];
    const step = lengths[i]!;
    if (step > 0 && (left <= step || i === line.length - 1)) {
      const along: MapPoint = [(b[0] - a[0]) / step, (b[1] - a[1]) / step];
      return [[a[0] + along[0] * left, a[1] + along[1] * left], along];
    }
    left -= step;
  }
  return [line[0] ?? [0, 0], [1, 0]];
}

/** All around at growing distance. */
function aroundPoint(point: MapPoint): Candidate[] {
  const candidates: Candidate[] = [];
  for (const reach of [MARK_RADIUS + GAP, 18, 26, 36, 48]) {
    for (let step = 0; step < DIRECTIONS; step++) {
      const angle = (2 * Math.PI * step) / DIRECTIONS;
      const [dx, dy] = [Math.cos(angle), Math.sin(angle)];
      const anchor = Math.abs(dx) < 0.1 ? 'middle' : dx > 0 ? 'start' : 'end';
      candidates.push({
        x: point[0] + dx * reach,
        y: point[1] + dy * (reach + GAP / 2),
        anchor,
        away: reach,
      });
    }
  }
  return candidates;
}

function boxOf(label: PlacedLabel, at: Candidate, frame: LabelFrame): Box {
  const width = label.text.length * LETTER_WIDTH * frame.fontSize;
  const height = LINE_HEIGHT * frame.fontSize;
  const left = at.anchor === 'start' ? at.x : at.anchor === 'end' ? at.x - width : at.x - width / 2;
  return { x0: left, x1: left + width, y0: at.y - height / 2, y1: at.y + height / 2 };
}

function priceOf(label: PlacedLabel, at: Candidate, box: Box, scene: Scene, taken: Box[]): number {
  const { frame } = scene;
  const outside =
    Math.max(0, -box.x0) +
    Math.max(0, box.x1 - frame.width) +
    Math.max(0, -box.y0) +
    Math.max(0, box.y1 - frame.height);
  let cost = outside * COST.outsidePerPixel + at.away * COST.distancePerPixel;
  for (const other of taken) cost += sharedArea(box, other) * COST.coveredWordPerSquarePixel;
  for (const line of scene.lines.values()) {
    for (let i = 1; i < line.length; i++) {
      cost += lengthInside(line[i - 1]!, line[i]!, box) * COST.crossedLinePerPixel;
    }
  }
  for (const mark of scene.marks) if (isNear(mark, box, MARK_RADIUS)) cost += COST.coveredMark;
  for (const dot of scene.dots) if (isNear(dot, box, 0)) cost += COST.coveredDot;
  return cost + (isAmbiguous(label, at, scene) ? COST.nearerToAnotherLine : 0);
}

function isNear(point: MapPoint, box: Box, margin: number): boolean {
  return (
    point[0] >= box.x0 - margin &&
    point[0] <= box.x1 + margin &&
    point[1] >= box.y0 - margin &&
    point[1] <= box.y1 + margin
  );
}

/** The label of a line stands nearer to another line than to its own. */
function isAmbiguous(label: PlacedLabel, at: Candidate, scene: Scene): boolean {
  const own = scene.lines.get(label.id);
  if (!own) return false;
  const point: MapPoint = [at.x, at.y];
  const ownDistance = distanceToPolyline(point, own);
  return [...scene.lines].some(
    ([id, line]) => id !== label.id && !isPath(id) && distanceToPolyline(point, line) < ownDistance,
  );
}

/** Paths have marks, not names. */
function isPath(id: string): boolean {
  return id === 'ahead' || id.startsWith('so-far-');
}

function distance(a: MapPoint, b: MapPoint): number {
  return Math.hypot(b[0] - a[0], b[1] - a[1]);
}
