import { describe, expect, it } from 'vitest';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import type { FitOptions } from '@/lib/estimate/types';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import type { MonthlySeries } from '@/lib/series/types';
import { COEXISTING, FIRST_MONTH, simulateSeries } from '../estimate/simulated-market';

function codesOf(series: MonthlySeries, options: Partial<FitOptions> = {}): string[] {
  const run = createOutlookRun({ series, options: { ...DEFAULT_FIT_OPTIONS, ...options } });
  let step = run.next();
  while (!step.done) step = run.next();
  if (!('report' in step)) throw new Error(step.failure);
  return step.report.unknowns.map(({ code, firm, parameter }) =>
    [code, firm, parameter].filter((part) => part !== null).join(' '),
  );
}

describe('what the data cannot tell', () => {
  it('is nothing for five years in which a market bends and settles', () => {
    expect(codesOf(simulateSeries(COEXISTING, 60, 0.01, 1))).toEqual([]);
  });

  it('is the saturation level, the competition and more before the series has bent', () => {
    const codes = codesOf(
      simulateSeries({ ...COEXISTING, r1: 0.08, r2: 0.09, n1: 5e3, n2: 4e3 }, 18, 0.02, 1),
    );
    expect(codes).toContain('short-series');
    expect(codes).toContain('saturation-unseen 1 k1');
    expect(codes).toContain('saturation-unseen 2 k2');
    expect(codes).toContain('competition-unidentified 1 alpha');
  });

  it('names shares of a whole and a late launch', () => {
    const focal = Array.from({ length: 30 }, (_, t) => 100 - 60 / (1 + Math.exp(-(t - 15) / 4)));
    expect(codesOf({ firstMonth: FIRST_MONTH, focal, rival: focal.map((share) => 100 - share) })).toContain(
      'share-only',
    );
    const base = simulateSeries(COEXISTING, 30, 0.02, 2);
    expect(codesOf({ ...base, rival: base.rival.map((count, t) => (t < 8 ? 0 : count)) })).toContain(
      'late-launch 2',
    );
  });

  it('names a prior that the counts contradict, of a coefficient too, and none that they do not', () => {
    const series = simulateSeries(COEXISTING, 60, 0.02, 1);
    const alpha = { meanLog: Math.log(2.5), sdLog: 0.5 };
    const priors = { ...USUAL_PRIORS, alpha, noCompetition: 0 };
    expect(codesOf(series, { priors })).toContain('prior-conflict 1 alpha');
    expect(codesOf(series).join()).not.toContain('prior-conflict');
  });

  it('says that a firm that only falls does not show its own crowding', () => {
    const focal = Array.from({ length: 30 }, (_, t) => 1000 * Math.exp(-0.06 * t));
    const rival = simulateSeries(COEXISTING, 30, 0.02, 3).rival;
    expect(codesOf({ firstMonth: FIRST_MONTH, focal, rival })).toContain('flat-incumbent 1 k1');
  });
});
