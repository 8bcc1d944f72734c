import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { readObservations } from '@/lib/estimate/observations';
import { compareScales, fitScale, readPlainSeries } from '@/lib/forecast/identifiability/error-scales';
import type { MonthlySeries } from '@/lib/series/types';

function compare(series: MonthlySeries) {
  const reading = readObservations(series);
  if (!reading.ok) throw new Error(reading.status);
  const plain = readPlainSeries(series, reading.observations);
  if (!plain) return null;
  const [log, raw] = (['log', 'raw'] as const).map((scale) => {
    const steps = fitScale(plain, scale, 1);
    let step = steps.next();
    while (!step.done) step = steps.next();
    return step.value;
  });
  return compareScales(log, raw);
}

function pathOf(theta: number[], months: number): MonthlySeries {
  const path = createTrajectory({ months, entry1: 0, entry2: 0 });
  path.run(theta.map(Math.log));
  const round = (levels: Float64Array) => Array.from(levels, (value) => Math.round(Math.exp(value)));
  return { firstMonth: 24000, focal: round(path.logLevel1), rival: round(path.logLevel2) };
}

/** Two published recordings of one experiment end apart under the two scales: test/reference/estimate holds them. */
describe('error scales', () => {
  it('agree on counts that hardly err', () => {
    const found = compare(pathOf([0.25, 0.2, 1e5, 8e4, 0.5, 0.6, 4000, 3000], 60))!;
    expect([found.log.outcome, found.raw.outcome]).toEqual(['coexistence', 'coexistence']);
    expect(found.disagree).toBe(false);
    // counts are rounded to whole users of some thousands: a part in ten thousand
    expect(found.log.alpha).toBeCloseTo(0.5, 2);
    expect(found.raw.beta).toBeCloseTo(0.6, 2);
  });

  it('say that nothing is identified where a firm only grows, and never call that a disagreement', () => {
    const found = compare(pathOf([0.05, 0.04, 1e9, 1e9, 0.1, 0.1, 4000, 3000], 24))!;
    expect([found.log.outcome, found.raw.outcome]).toContain('notIdentified');
    expect(found.disagree).toBe(false);
  });

  it('are left out where too few months have both firms', () => {
    const series = pathOf([0.25, 0.2, 1e5, 8e4, 0.5, 0.6, 4000, 3000], 24);
    expect(compare({ ...series, rival: series.rival.map((count, t) => (t < 20 ? 0 : count)) })).toBeNull();
  });
});
