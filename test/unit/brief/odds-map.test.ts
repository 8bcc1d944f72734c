import { describe, expect, it } from 'vitest';
import { buildOddsMap } from '@/lib/brief/odds-map';
import { plainText } from '@/lib/brief/text';
import { createWords } from '@/lib/brief/words';
import { factsOf, factsWith, oddsOf, spaced } from './brief-cases';
import { outcomeOf } from './sample-report';

describe('buildOddsMap', () => {
  it('puts every draw into the quarter of its outcome', () => {
    const map = buildOddsMap(createWords(factsOf('undecided')));
    for (const { alpha, beta, outcome } of map.points) {
      const quarter = map.quarters.find((one) => one.outcome === outcome)!;
      expect(outcomeOf(alpha, beta)).toBe(outcome);
      expect(alpha).toBeGreaterThanOrEqual(quarter.x[0]);
      expect(alpha).toBeLessThanOrEqual(quarter.x[1]);
      expect(beta).toBeGreaterThanOrEqual(quarter.y[0]);
      expect(beta).toBeLessThanOrEqual(quarter.y[1]);
    }
  });

  it('names the quarters with their odds and shades the decided one', () => {
    const map = buildOddsMap(createWords(factsWith('coexistence', { odds: oddsOf(0.1, 0.8, 0.06, 0.04) })));
    expect(map.quarters.map((one) => spaced(one.label))).toEqual([
      'both stay · 10 %',
      'Quillfern alone · 80 %',
      'Marrowby alone · 6 %',
      'head start decides · 4 %',
    ]);
    expect(map.quarters.filter((one) => one.isDecided).map((one) => one.outcome)).toEqual([
      'exclusionByFocal',
    ]);
    expect(spaced(plainText(map.caption))).toContain(
      'The shaded quarter, Quillfern alone staying, holds 80 % of the draws.',
    );
  });

  it('shades nothing while the data do not decide', () => {
    const map = buildOddsMap(createWords(factsWith('coexistence', { odds: oddsOf(0.5, 0.3, 0.1, 0.1) })));
    expect(map.quarters.some((one) => one.isDecided)).toBe(false);
    expect(plainText(map.caption)).toContain('No quarter holds two thirds of the draws.');
  });

  it('has room on both sides of 1 and draws stragglers on the border', () => {
    const facts = factsOf('coexistence');
    facts.report.cloud[0] = { ...facts.report.cloud[0]!, alpha: 1e-9 };
    facts.report.cloud[1] = { ...facts.report.cloud[1]!, beta: 0 };
    const map = buildOddsMap(createWords(facts));
    for (const [low, high] of [map.domain.x, map.domain.y]) {
      expect(low).toBeLessThanOrEqual(0.2);
      expect(high).toBeGreaterThanOrEqual(5);
    }
    expect(map.points[0]).toMatchObject({ alpha: map.domain.x[0], isClipped: true });
    expect(map.points[1]).toMatchObject({ beta: map.domain.y[0], isClipped: true });
    expect(map.points[2]!.isClipped).toBe(false);
  });

  it('says on the axes who takes room from whom', () => {
    const map = buildOddsMap(createWords(factsOf('coexistence')));
    expect(map.xLabel).toBe('room Marrowby takes from Quillfern →');
    expect(map.yLabel).toBe('room Quillfern takes from Marrowby →');
    expect(map.xTicks.map((tick) => spaced(tick.label))).toEqual(['20 %', '50 %', '100 %', '200 %', '500 %']);
  });

  it('stands without draws', () => {
    const facts = factsOf('coexistence');
    facts.report.cloud = [];
    expect(buildOddsMap(createWords(facts)).points).toEqual([]);
  });
});
