import { describe, expect, it } from 'vitest';
import { buildBrief } from '@/lib/brief/build-brief';
import { factsOf, proseOf } from './brief-cases';
import { SAMPLES, type SampleName } from './sample-report';

const NAMES = Object.keys(SAMPLES) as SampleName[];

describe('buildBrief', () => {
  it.each(NAMES)('%s: is plain JSON and depends on the facts alone', (name) => {
    const brief = buildBrief(factsOf(name));
    expect(JSON.parse(JSON.stringify(brief))).toEqual(brief);
    expect(buildBrief(factsOf(name))).toEqual(brief);
  });

  it('leaves the facts as they are', () => {
    const facts = factsOf('coexistence');
    buildBrief(facts);
    expect(facts).toEqual(factsOf('coexistence'));
  });

  it('heads the page with revision, months and last month', () => {
    expect(buildBrief(factsOf('coexistence')).dataLine).toBe('revision 4 · 42 months to Dec 2025');
  });

  it('follows the locale in numbers and months', () => {
    const brief = buildBrief(factsOf('coexistence'), { locale: 'de' });
    expect(brief.why.parameters.rows.find((row) => row.id === 'k1')!.value).toMatch(/^\d{3}\.000$/);
    expect(brief.dataLine).toMatch(/Dez\.? 2025/);
  });

  it('does not change meaning with other users’ units: a thousand times the users reads the same but for its numbers', () => {
    const facts = factsOf('coexistence');
    const { report, series } = facts;
    const grow = (value: number) => value * 1000;
    for (const firm of ['focal', 'rival', 'total'] as const) {
      for (const bands of [report.outlook.observations[firm], report.outlook.levels[firm]]) {
        for (const row of Object.values(bands)) row.splice(0, row.length, ...row.map(grow));
      }
    }
    for (const firm of ['focal', 'rival'] as const)
      series[firm] = series[firm].map((count) => count && grow(count));
    for (const id of ['k1', 'k2', 'n1Start', 'n2Start', 'n1Last', 'n2Last'] as const)
      report.point[id] *= 1000;
    report.cloud = report.cloud.map((one) => ({ ...one, n1End: grow(one.n1End), n2End: grow(one.n2End) }));
    const [large, small] = [buildBrief(facts), buildBrief(factsOf('coexistence'))];
    expect(large.where.verdict).toEqual(small.where.verdict);
    small.why.phaseMap.labels.forEach((label, i) => {
      const same = large.why.phaseMap.labels[i]!;
      expect(same.text).toBe(label.text);
      // rounding of a division by the axis
      expect(same.x).toBeCloseTo(label.x, 12);
      expect(same.y).toBeCloseTo(label.y, 12);
    });
    expect(large.why.phaseMap.xTicks.map((tick) => tick.label)).toEqual(
      small.why.phaseMap.xTicks.map((tick) => tick.label.replace('k', 'M')),
    );
  });

  it('says every sentence whole', () => {
    for (const name of NAMES) {
      for (const text of proseOf(buildBrief(factsOf(name)))) expect(text.trim()).toBe(text);
    }
  });
});
