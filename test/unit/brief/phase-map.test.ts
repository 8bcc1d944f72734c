import { describe, expect, it } from 'vitest';
import { sharedArea } from '@/lib/brief/map-geometry';
import { placeMapLabels } from '@/lib/brief/map-labels';
import { buildPhaseMap } from '@/lib/brief/phase-map';
import { plainText } from '@/lib/brief/text';
import type { LabelFrame, PhaseMap, PlacedLabel } from '@/lib/brief/types';
import { createWords } from '@/lib/brief/words';
import { factsOf, factsWith, oddsOf, spaced } from './brief-cases';
import { SAMPLES, type SampleName } from './sample-report';

const NAMES = Object.keys(SAMPLES) as SampleName[];
const mapOf = (name: SampleName) => buildPhaseMap(createWords(factsOf(name)));

describe('buildPhaseMap', () => {
  it.each(NAMES)('%s: each firm stands still on its own line', (name) => {
    const { k1, k2, alpha, beta } = SAMPLES[name];
    for (const { firm, points } of mapOf(name).growthStops) {
      expect(points).toHaveLength(2);
      for (const [n1, n2] of points) {
        const growth = firm === 'focal' ? 1 - n1 / k1 - (alpha * n2) / k2 : 1 - n2 / k2 - (beta * n1) / k1;
        expect(growth).toBeCloseTo(0, 9);
      }
    }
  });

  it.each(NAMES)('%s: everything drawn lies inside the axes', (name) => {
    const map = mapOf(name);
    const [xMax, yMax] = [map.domain.x[1] * (1 + 1e-9), map.domain.y[1] * (1 + 1e-9)];
    const points = [
      ...map.growthStops.flatMap((stop) => stop.points),
      ...map.equilibria.map((one) => one.point),
      ...map.pathSoFar.flat().map((one) => one.point),
      ...map.pathAhead.map((one) => one.point),
      ...(map.separatrix ?? []),
      ...map.cloud.map((one) => one.point),
      ...map.directions.map((one) => one.at),
    ];
    for (const [x, y] of points) {
      expect(x).toBeGreaterThanOrEqual(0);
      expect(y).toBeGreaterThanOrEqual(0);
      expect(x).toBeLessThanOrEqual(xMax);
      expect(y).toBeLessThanOrEqual(yMax);
    }
    for (const tick of map.xTicks) expect(tick.value).toBeLessThanOrEqual(xMax);
  });

  it('marks equilibria by kind and names the firms right', () => {
    const marks = (name: SampleName) => mapOf(name).equilibria.map((one) => `${one.name}: ${one.marker}`);
    expect(marks('coexistence')).toEqual([
      'empty market: open',
      'Quillfern alone: open',
      'Marrowby alone: open',
      'both settle here: filled',
    ]);
    expect(marks('exclusionByFocal')).toContain('Quillfern alone: filled');
    expect(marks('exclusionByRival')).toContain('Marrowby alone: filled');
    expect(marks('headStartDecides')).toEqual(
      expect.arrayContaining(['tipping point: open', 'Quillfern alone: filled']),
    );
  });

  it('has a separatrix through the tipping point where the head start decides, and only there', () => {
    for (const name of NAMES) expect(mapOf(name).separatrix !== null).toBe(name === 'headStartDecides');
    const map = mapOf('headStartDecides');
    const saddle = map.equilibria.find((one) => one.kind === 'saddle')!.point;
    const nearest = Math.min(...map.separatrix!.map(([x, y]) => Math.hypot(x - saddle[0], y - saddle[1])));
    expect(nearest).toBeLessThan(1e-6 * saddle[0]);
  });

  it('leads the path ahead from the last month to where the best fit settles', () => {
    const { pathAhead, equilibria, domain } = mapOf('coexistence');
    const { point } = factsOf('coexistence').report;
    expect(pathAhead[0]!.point).toEqual([point.n1Last, point.n2Last]);
    expect(pathAhead[1]!.month - pathAhead[0]!.month).toBe(1);
    const end = pathAhead.at(-1)!.point;
    const sink = equilibria.find((one) => one.kind === 'sink')!.point;
    // drawn until it stays within 0.2 % of the map from its end
    expect(Math.hypot((end[0] - sink[0]) / domain.x[1], (end[1] - sink[1]) / domain.y[1])).toBeLessThan(
      0.005,
    );
  });

  it('leaves gaps in the path so far', () => {
    const facts = factsOf('coexistence');
    facts.series.rival[10] = null;
    facts.series.focal[20] = null;
    const pieces = buildPhaseMap(createWords(facts)).pathSoFar;
    expect(pieces.map((piece) => piece.length)).toEqual([10, 9, 21]);
    expect(pieces[0]![0]!.mark).toBe('Jul 2022');
    expect(pieces.at(-1)!.at(-1)!.mark).toBe('Dec 2025');
  });

  it('points each direction mark the way the market moves, faded near lines and never longer than one', () => {
    const { k1, k2, alpha, beta, r1, r2 } = SAMPLES.coexistence;
    const { directions, domain } = mapOf('coexistence');
    for (const { at, dx, dy, strength } of directions) {
      const fx = (r1 * at[0] * (1 - at[0] / k1 - (alpha * at[1]) / k2)) / domain.x[1];
      const fy = (r2 * at[1] * (1 - at[1] / k2 - (beta * at[0]) / k1)) / domain.y[1];
      expect(Math.hypot(dx, dy)).toBeCloseTo(1, 12);
      expect(dx * fx + dy * fy).toBeCloseTo(Math.hypot(fx, fy), 9);
      expect(strength).toBeGreaterThanOrEqual(0);
      expect(strength).toBeLessThanOrEqual(1);
    }
    expect(Math.min(...directions.map((one) => one.strength))).toBeLessThan(0.5);
    expect(Math.max(...directions.map((one) => one.strength))).toBe(1);
  });

  it('counts the draws that end outside the map', () => {
    const map = mapOf('coexistence');
    const { cloud } = factsOf('coexistence').report;
    expect(plainText(map.caption)).toContain(
      `where ${cloud.length} draws end, ${cloud.length - map.cloud.length} of them outside`,
    );
  });

  it('draws the medians when only they stand for the decided outcome, and says so', () => {
    const facts = factsWith('exclusionByFocal', {});
    // the best fit strays to coexistence
    facts.report.point.beta = 0.9;
    const map = buildPhaseMap(createWords(facts));
    expect(plainText(map.caption)).toContain('Lines and path: the medians of the draws.');
    expect(plainText(map.caption)).toContain('Quillfern’s line lies outside');
  });

  it('promises no destination that the verdict does not, and says what the draws stand for', () => {
    const undecided = buildPhaseMap(
      createWords(factsWith('coexistence', { odds: oddsOf(0.5, 0.4, 0.1, 0) })),
    );
    expect(undecided.labels.map((label) => label.text)).toContain('both settle, on the best fit');
    expect(plainText(undecided.caption)).toContain('the draws are divided between outcomes');
    const against = buildPhaseMap(createWords(factsWith('coexistence', { odds: oddsOf(0.1, 0.8, 0.1, 0) })));
    expect(plainText(against.caption)).toContain('most draws stand for Quillfern alone staying instead');
  });

  it('draws a boundary without classifying it', () => {
    const facts = factsWith('undecided', { odds: oddsOf(0.5, 0.5, 0, 0) });
    facts.report.point.beta = 1;
    facts.report.point.alpha = 0.5;
    const map = buildPhaseMap(createWords(facts));
    expect(map.equilibria.find((one) => one.name === 'Quillfern alone')).toMatchObject({
      marker: 'half',
      kind: 'non-hyperbolic',
    });
    expect(plainText(map.caption)).toContain('the border between two outcomes');
    expect(map.separatrix).toBeNull();
  });

  it('draws firms that take nothing from each other with lines along the axes', () => {
    const facts = factsOf('coexistence');
    facts.report.point.alpha = 0;
    facts.report.point.beta = 0;
    const [focal, rival] = buildPhaseMap(createWords(facts)).growthStops;
    expect(new Set(focal!.points.map(([x]) => x))).toEqual(new Set([facts.report.point.k1]));
    expect(new Set(rival!.points.map(([, y]) => y))).toEqual(new Set([facts.report.point.k2]));
  });

  it('keeps a saturation level that is only a guess from squeezing the map', () => {
    const facts = factsOf('coexistence');
    facts.report.point.k1 = 1e9;
    expect(buildPhaseMap(createWords(facts)).domain.x[1]).toBeLessThan(3e6);
  });

  it('reads the states out in a table', () => {
    const { table } = mapOf('coexistence');
    expect(table.rows.at(-1)!.map(spaced)).toEqual([
      'both settle here',
      '261,000',
      '262,000',
      'The market settles here.',
    ]);
  });
});

function boxOf(label: PlacedLabel, frame: LabelFrame) {
  // the metrics that the placing assumes
  const [width, height] = [label.text.length * 0.55 * frame.fontSize, 1.25 * frame.fontSize];
  const x = label.x * frame.width;
  const left = label.anchor === 'start' ? x : label.anchor === 'end' ? x - width : x - width / 2;
  const y = label.y * frame.height;
  return { x0: left, x1: left + width, y0: y - height / 2, y1: y + height / 2 };
}

describe('placeMapLabels', () => {
  const frames: LabelFrame[] = [
    { width: 380, height: 380, fontSize: 13 },
    { width: 300, height: 300, fontSize: 13 },
    { width: 620, height: 460, fontSize: 14 },
  ];

  it.each(NAMES)('%s: labels stay on the map and off each other at every size', (name) => {
    const map: PhaseMap = mapOf(name);
    for (const frame of frames) {
      const labels = placeMapLabels(map, frame);
      expect(labels.map((label) => label.id)).toEqual(map.labels.map((label) => label.id));
      const boxes = labels.map((label) => boxOf(label, frame));
      for (const box of boxes) {
        expect(box.x0).toBeGreaterThanOrEqual(-1);
        expect(box.x1).toBeLessThanOrEqual(frame.width + 1);
        expect(box.y0).toBeGreaterThanOrEqual(-1);
        expect(box.y1).toBeLessThanOrEqual(frame.height + 1);
      }
      boxes.forEach((box, i) => {
        for (const other of boxes.slice(i + 1)) expect(sharedArea(box, other)).toBeLessThan(1);
      });
    }
  });

  it('gives the same places for the same map and size', () => {
    const map = mapOf('headStartDecides');
    expect(placeMapLabels(map, map.labelFrame)).toEqual(map.labels);
  });
});
