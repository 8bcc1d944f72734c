import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import type { FitOptions } from '@/lib/estimate/types';
import { OUTCOMES } from '@/lib/forecast/outcomes';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import { type FitReport, fitReportSchema } from '@/lib/forecast/report';
import type { MonthlySeries } from '@/lib/series/types';
import { explainFailure } from '@/lib/services/explain';
import {
  COEXISTING,
  FIRST_MONTH,
  RIVAL_LOSES,
  simulateSeries,
  simulateWandering,
} from '../estimate/simulated-market';
import { anySeries, driveInSlices, ODD_SERIES } from './odd-series';

/** Milliseconds: a series that no market makes may take the engine to its limit of work. */
const SLOW = 60_000;

function finish(series: MonthlySeries, options: Partial<FitOptions> = {}) {
  return driveInSlices(createOutlookRun({ series, options: { ...DEFAULT_FIT_OPTIONS, ...options } }));
}

function reportOf(series: MonthlySeries, options: Partial<FitOptions> = {}): FitReport {
  const end = finish(series, options);
  if (!('report' in end)) throw new Error(`no report: ${end.failure}`);
  return end.report;
}

/** Every number of a report is finite, or the schema refuses it; the odds add to 1 and the bands are in order. */
function checkReport(report: FitReport): void {
  fitReportSchema.parse(report);
  const { odds, observations, levels } = report.outlook;
  expect(OUTCOMES.reduce((sum, outcome) => sum + odds[outcome], 0)).toBeCloseTo(1, 10);
  for (const series of [observations, levels]) {
    for (const bands of Object.values(series)) {
      bands.q50.forEach((middle, h) => {
        const row = [bands.q05[h], bands.q25[h], middle, bands.q75[h], bands.q95[h]];
        expect(row.every(Number.isFinite)).toBe(true);
        expect(row).toEqual([...row].sort((a, b) => a - b));
      });
    }
  }
}

const series = simulateSeries(RIVAL_LOSES, 36, 0.02, 7);
const report = reportOf(series);

describe('the report of a fit', () => {
  it('is whole and in order', () => {
    checkReport(report);
    expect(report.outlook.observations.focal.q50.length).toBe(DEFAULT_FIT_OPTIONS.horizonMonths);
    expect(report.outlook.firstMonth).toBe(FIRST_MONTH + 36);
    expect(report.history.focal.length).toBe(36);
    expect(report.outlook.decided).toBe('exclusionByFocal');
  });

  it('has history levels around the counts', () => {
    report.history.focal.forEach((level, t) => {
      // error 2 %: a count strays from its level by less than five sd
      expect(Math.abs(Math.log(series.focal[t]! / level!.q50))).toBeLessThan(0.1);
    });
  });

  it('has wider bands for counts than for levels', () => {
    const { observations, levels } = report.outlook;
    for (const h of [0, 11, 23]) {
      const width = (bands: typeof levels) => Math.log(bands.focal.q95[h] / bands.focal.q05[h]);
      expect(width(observations)).toBeGreaterThan(width(levels));
    }
  });

  it('exchanges the firms with the series, but for the luck of the draws', () => {
    const swapped = reportOf({ ...series, focal: series.rival, rival: series.focal });
    expect(
      Math.abs(swapped.outlook.odds.exclusionByRival - report.outlook.odds.exclusionByFocal),
    ).toBeLessThan(0.06);
    for (const h of [5, 23]) {
      const [one, other] = [report.outlook.levels.focal, swapped.outlook.levels.rival];
      const width = Math.log(one.q95[h] / one.q05[h]);
      // 400 effective draws fix a median to a tenth of the sd, a fortieth of the band
      expect(Math.abs(Math.log(one.q50[h] / other.q50[h]))).toBeLessThan(0.15 * width);
    }
    expect(swapped.outlook.overtaking.overtaker).not.toBe(report.outlook.overtaking.overtaker);
  });

  it('scales with the users and moves with the months', () => {
    const scaled = reportOf({
      firstMonth: FIRST_MONTH + 7,
      focal: series.focal.map((count) => 1000 * count!),
      rival: series.rival.map((count) => 1000 * count!),
    });
    expect(scaled.outlook.firstMonth).toBe(report.outlook.firstMonth + 7);
    expect(
      Math.abs(scaled.outlook.odds.exclusionByFocal - report.outlook.odds.exclusionByFocal),
    ).toBeLessThan(0.06);
    const ratio = scaled.outlook.levels.focal.q50[23] / report.outlook.levels.focal.q50[23];
    expect(Math.abs(ratio / 1000 - 1)).toBeLessThan(0.02);
  });

  it(
    'has bands that hold about 90 % of what comes',
    () => {
      let inside = 0;
      let all = 0;
      for (let seed = 1; seed <= 5; seed++) {
        const whole = simulateWandering(COEXISTING, 42, 0.03, 0.015, 100 + seed);
        const past = { ...whole, focal: whole.focal.slice(0, 30), rival: whole.rival.slice(0, 30) };
        const { observations } = reportOf(past, { horizonMonths: 12, seed }).outlook;
        for (let h = 0; h < 12; h++) {
          for (const firm of ['focal', 'rival'] as const) {
            const count = whole[firm][30 + h]!;
            if (count >= observations[firm].q05[h] && count <= observations[firm].q95[h]) inside++;
            all++;
          }
        }
      }
      // 10 paths whose months hang together: some 25 independent looks, sd 6 %
      expect(inside / all).toBeGreaterThan(0.72);
      expect(inside / all).toBeLessThanOrEqual(1);
    },
    SLOW,
  );
});

describe('any series', () => {
  it.each(ODD_SERIES)(
    '%s: ends with a whole report or a status, in short slices',
    (_, odd) => {
      checkEnd(finish(odd));
    },
    SLOW,
  );

  it(
    'whatever it holds: never throws, never gives a number that is none',
    () => {
      fc.assert(
        fc.property(anySeries, (any) => {
          checkEnd(finish(any));
        }),
        { numRuns: 5, seed: 1925 },
      );
    },
    SLOW,
  );
});

/** A whole report, or a code for which people get a sentence. */
function checkEnd(end: ReturnType<typeof finish>): void {
  if ('report' in end) checkReport(end.report);
  else expect(explainFailure(end.failure).what).not.toBe('');
}
