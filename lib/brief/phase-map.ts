/**
 * The phase map: both firms' users on the axes (focal across, rival up), with the lines on which each firm stops growing
 *
 *   focal  N1/K1 + alpha N2/K2 = 1        rival  N2/K2 + beta N1/K1 = 1
 *
 * the equilibria by kind, the path so far and ahead, the separatrix where the head start decides, the direction of movement and the
 * cloud of destinations. Lines, equilibria and path belong to one system (map-system.ts); the cloud belongs to all draws.
 */
import { type Equilibrium, findEquilibria } from '../dynamics/equilibria';
import { traceSeparatrix } from '../dynamics/separatrix';
import type { CompetitionSystem } from '../dynamics/system';
import { decideOutcome } from '../forecast/odds';
import { axisFromZero, ticksUpTo } from './axis-ticks';
import { captionPhaseMap } from './captions';
import { buildDirections } from './direction-field';
import { type Box, clipPolyline, clipSegment, isInside } from './map-geometry';
import { placeMapLabels } from './map-labels';
import { readPathSoFar, tracePathAhead } from './map-paths';
import { chooseMapSystem, type MapSystem } from './map-system';
import { toneOfOutcome } from './outcomes';
import type {
  EquilibriumKind,
  FigureTable,
  GrowthStop,
  LabelFrame,
  MapCloudPoint,
  MapEquilibrium,
  MapPoint,
  PhaseMap,
  PlacedLabel,
  Tone,
} from './types';
import type { Words } from './words';

/** Plot for which the stored labels are placed. */
const LABEL_FRAME: LabelFrame = { width: 380, height: 380, fontSize: 13 };
/** The map reaches this much beyond what it must hold. */
const MARGIN = 1.06;
/** A saturation level up to this many times what the map holds anyway is taken in. */
const TAKE_IN_WITHIN = 2.5;
/** Part of the cloud that the map holds at least. */
const CLOUD_HELD = 0.9;

export function buildPhaseMap(words: Words): PhaseMap {
  const map = chooseMapSystem(words.facts.report);
  const box = chooseBox(words, map.system);
  const growthStops = buildGrowthStops(words, map.system, box);
  const separatrix = buildSeparatrix(map.system, box);
  const { cloud } = words.facts.report;
  const lines = growthStops.map((stop) => stop.points);
  const drawn: Omit<PhaseMap, 'caption' | 'table'> = {
    title: `Phase map: ${words.focal} across, ${words.rival} up`,
    xLabel: `${words.focal} users →`,
    yLabel: `${words.rival} users →`,
    domain: { x: [0, box.x1], y: [0, box.y1] },
    xTicks: ticksUpTo(box.x1, words.numbers.axis),
    yTicks: ticksUpTo(box.y1, words.numbers.axis),
    growthStops,
    equilibria: buildEquilibria(words, map).filter((one) => isInside(one.point, box)),
    pathSoFar: readPathSoFar(words.facts.series, words.months),
    pathAhead: tracePathAhead(map, words.lastMonth, box, words.months),
    separatrix,
    directions: buildDirections(map.system, box, separatrix ? [...lines, separatrix] : lines),
    cloud: cloud.map(toCloudPoint).filter((one) => isInside(one.point, box)),
    labels: [],
    labelFrame: LABEL_FRAME,
  };
  const caption = captionPhaseMap(words, map, drawn, cloud.length);
  const whole: PhaseMap = { ...drawn, caption, table: tabulate(words, drawn) };
  return { ...whole, labels: placeMapLabels({ ...whole, labels: listLabels(whole) }, LABEL_FRAME) };
}

/** Round axes that hold the observed months, the standing points with both or one firm, and most of the cloud. */
function chooseBox(words: Words, system: CompetitionSystem): Box {
  const { series, report } = words.facts;
  const shared = findEquilibria(system).find((one) => one.place === 'shared')?.point ?? [0, 0];
  const reach = (
    seen: (number | null)[],
    start: number,
    ends: number[],
    sharedAt: number,
    saturation: number,
  ) => {
    const held = Math.max(...seen.map((count) => count ?? 0), start, quantileOf(ends, CLOUD_HELD));
    const withShared = sharedAt <= TAKE_IN_WITHIN * held ? Math.max(held, sharedAt) : held;
    const top = saturation <= TAKE_IN_WITHIN * withShared ? Math.max(withShared, saturation) : withShared;
    return axisFromZero(top * MARGIN, String, AXIS_PARTS).domain[1];
  };
  const { point, cloud } = report;
  return {
    x0: 0,
    y0: 0,
    x1: reach(
      series.focal,
      point.n1Last,
      cloud.map((one) => one.n1End),
      shared[0],
      system.k1,
    ),
    y1: reach(
      series.rival,
      point.n2Last,
      cloud.map((one) => one.n2End),
      shared[1],
      system.k2,
    ),
  };
}

/** Finer than the ticks, so that little of the map stays empty. */
const AXIS_PARTS = 10;

function quantileOf(values: number[], part: number): number {
  if (values.length === 0) return 0;
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor((sorted.length - 1) * part)]!;
}

function buildGrowthStops(words: Words, system: CompetitionSystem, box: Box): GrowthStop[] {
  const { k1, k2, alpha, beta } = system;
  // a firm that the other takes nothing from stops on a line parallel to the other's axis
  const focalTop: MapPoint = alpha > 0 ? [0, k2 / alpha] : [k1, box.y1];
  const rivalRight: MapPoint = beta > 0 ? [k1 / beta, 0] : [box.x1, k2];
  const line = (firm: 'focal' | 'rival', a: MapPoint, b: MapPoint): GrowthStop => ({
    firm,
    name: `${words.name(firm)} stops growing`,
    tone: firm,
    isDashed: firm === 'rival',
    points: clipSegment(a, b, box) ?? [],
  });
  return [line('focal', [k1, 0], focalTop), line('rival', [0, k2], rivalRight)];
}

function buildSeparatrix(system: CompetitionSystem, box: Box): MapPoint[] | null {
  const trace = traceSeparatrix(system, { n1Max: box.x1, n2Max: box.y1 });
  if (trace.status !== 'traced') return null;
  const points = clipPolyline(
    trace.points.map(([x, y]): MapPoint => [x, y]),
    box,
  );
  return points.length >= 2 ? points : null;
}

function buildEquilibria(words: Words, map: MapSystem): MapEquilibrium[] {
  const isDecided = decideOutcome(words.facts.report.outlook.odds) === map.outcome;
  return findEquilibria(map.system).map((one) => ({
    point: [one.point[0], one.point[1]],
    kind: one.kind,
    marker: markerOf(one.kind),
    isMain: one.kind === 'sink' || one.place === 'shared',
    name: nameEquilibrium(words, one, isDecided),
    meaning: meaningOf(one),
    tone: toneOf(one),
  }));
}

function markerOf(kind: EquilibriumKind): MapEquilibrium['marker'] {
  if (kind === 'sink') return 'filled';
  return kind === 'non-hyperbolic' ? 'half' : 'open';
}

function toneOf({ place, kind }: Equilibrium): Tone {
  if (place === 'shared') return kind === 'sink' ? 'both' : 'headStart';
  if (kind !== 'sink') return 'ink';
  return place === 'firstAlone' ? 'focal' : 'rival';
}

/** A destination is promised only when the verdict names it. */
function nameEquilibrium(words: Words, { place, kind }: Equilibrium, isDecided: boolean): string {
  if (place === 'empty') return 'empty market';
  if (place === 'shared') {
    if (kind !== 'sink') return 'tipping point';
    return isDecided ? 'both settle here' : 'both settle, on the best fit';
  }
  return `${place === 'firstAlone' ? words.focal : words.rival} alone`;
}

function meaningOf({ kind }: Equilibrium): string {
  if (kind === 'sink') return 'The market settles here.';
  if (kind === 'non-hyperbolic')
    return 'On the border: the fit does not tell whether the market stays or leaves.';
  return 'The market leaves this state.';
}

function toCloudPoint(one: Words['facts']['report']['cloud'][number]): MapCloudPoint {
  return { point: [one.n1End, one.n2End], outcome: one.outcome, tone: toneOfOutcome(one.outcome) };
}

/** Labels wanted, the most needed first; without places. */
function listLabels(map: PhaseMap): PlacedLabel[] {
  const label = (id: string, text: string, tone: Tone, isStrong: boolean): PlacedLabel => ({
    id,
    text,
    tone,
    isStrong,
    x: 0,
    y: 0,
    anchor: 'start',
  });
  const marks = map.equilibria.map((one, i) => ({ one, i })).filter(({ one }) => one.isMain);
  const now = map.pathSoFar.at(-1)?.at(-1)?.mark;
  return [
    ...marks.map(({ one, i }) => label(`equilibrium-${i}`, one.name, one.tone, true)),
    ...map.growthStops
      .filter((stop) => stop.points.length > 1)
      .map((stop) => label(`stop-${stop.firm}`, stop.name, stop.tone, false)),
    ...(map.separatrix ? [label('separatrix', 'tipping line', 'headStart', false)] : []),
    ...(now ? [label('now', now, 'ink', false)] : []),
  ];
}

function tabulate(words: Words, map: Pick<PhaseMap, 'equilibria'>): FigureTable {
  const rows = map.equilibria;
  return {
    title: 'Where the market can stand still',
    columns: ['State', `${words.focal} users`, `${words.rival} users`, 'What it means'],
    rows: rows.map((one) => [
      one.name,
      words.numbers.users(one.point[0]),
      words.numbers.users(one.point[1]),
      one.meaning,
    ]),
    raw: rows.map((one) => [one.name, one.point[0], one.point[1], one.kind]),
  };
}
