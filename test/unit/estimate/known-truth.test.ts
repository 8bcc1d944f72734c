/** What an analyst may state or a series may lack, each on a market whose truth is known: the truth stays inside of what is claimed. */
import { describe, expect, it } from 'vitest';
import { createTrajectory } from '@/lib/dynamics/trajectory';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { readColumn } from '@/lib/estimate/draws';
import type { FitOptions } from '@/lib/estimate/types';
import { createOutlookRun } from '@/lib/forecast/outlook-run';
import type { FitReport } from '@/lib/forecast/report';
import { quantiles } from '@/lib/numeric/quantile';
import { createStream } from '@/lib/numeric/random';
import type { MonthlySeries } from '@/lib/series/types';
import {
  COEXISTING,
  FIRST_MONTH,
  RIVAL_LOSES,
  simulateSeries,
  type Truth,
  toTheta,
} from './simulated-market';

function outlookOf(series: MonthlySeries, options: Partial<FitOptions> = {}) {
  const run = createOutlookRun({ series, options: { ...DEFAULT_FIT_OPTIONS, ...options } });
  let step = run.next();
  while (!step.done) step = run.next();
  if (!('report' in step)) throw new Error(step.failure);
  return step;
}

const IDS = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta'] as const;

/** Parameters outside of the middle 98 % of their draws: six of them each miss once in fifty. */
function missesOf({ draws }: ReturnType<typeof outlookOf>, truth: Truth): string[] {
  return IDS.filter((id) => {
    const [low, high] = quantiles(readColumn(draws, id), [0.01, 0.99]);
    return !(truth[id] >= low && truth[id] <= high);
  });
}

/** Months of the held-out part whose counts lie in the 90 % bands of their firm. */
function coverageOf({ report }: { report: FitReport }, future: MonthlySeries): number {
  const { observations } = report.outlook;
  const hits = (['focal', 'rival'] as const).flatMap((firm) =>
    future[firm].map(
      (count, h) => count! >= observations[firm].q05[h] && count! <= observations[firm].q95[h],
    ),
  );
  return hits.filter(Boolean).length / hits.length;
}

function split(series: MonthlySeries, months: number): [MonthlySeries, MonthlySeries] {
  const part = (from: number, to?: number) => ({
    firstMonth: series.firstMonth + from,
    focal: series.focal.slice(from, to),
    rival: series.rival.slice(from, to),
  });
  return [part(0, months), part(months)];
}

const widthOf = ({ draws }: ReturnType<typeof outlookOf>, column: string) => {
  const [low, high] = quantiles(readColumn(draws, column), [0.05, 0.95]);
  return Math.log(high / low);
};

describe('gaps', () => {
  it('cost accuracy, not truth: half of one firm and a whole quarter of both', () => {
    const [past, future] = split(simulateSeries(RIVAL_LOSES, 60, 0.03, 11), 48);
    const gappy = {
      ...past,
      focal: past.focal.map((count, t) => (t >= 20 && t < 23 ? null : count)),
      rival: past.rival.map((count, t) => (t % 2 === 1 || (t >= 20 && t < 23) ? null : count)),
    };
    const outlook = outlookOf(gappy, { horizonMonths: 12 });
    expect(missesOf(outlook, RIVAL_LOSES)).toEqual([]);
    expect(coverageOf(outlook, future)).toBeGreaterThan(0.75);
    expect(widthOf(outlook, 'r2')).toBeGreaterThan(widthOf(outlookOf(past), 'r2'));
  });
});

describe('a late launch', () => {
  it.each([0, null])('told by %s before it is no error: the truth of both firms is found', (before) => {
    const path = createTrajectory({ months: 54, entry1: 0, entry2: 13 });
    path.run(toTheta(COEXISTING));
    const stream = createStream(3, 0);
    const observed = (logLevel: Float64Array) =>
      Array.from(logLevel, (value) => Math.round(Math.exp(value + 0.02 * stream.normal())));
    const series = {
      firstMonth: FIRST_MONTH,
      focal: observed(path.logLevel1),
      rival: observed(path.logLevel2).map((count, t) => (t < 13 ? before : count)),
    };
    const [past, future] = split(series, 46);
    const outlook = outlookOf(past, { horizonMonths: 8 });
    expect(missesOf(outlook, COEXISTING)).toEqual([]);
    expect(coverageOf(outlook, future)).toBeGreaterThan(0.7);
    expect(outlook.report.unknowns.map(({ code }) => code)).toContain('late-launch');
    expect(outlook.report.history.rival.slice(0, 13)).toEqual(new Array(13).fill(null));
  });
});

describe('a yearly cycle', () => {
  it('is forecast with its months: held-out counts lie in the bands, its size is found', () => {
    const cycle = (t: number) => 0.1 * Math.cos((2 * Math.PI * (t - 5)) / 12);
    const base = simulateSeries(COEXISTING, 60, 0.02, 21);
    const series = { ...base, focal: base.focal.map((count, t) => Math.round(count! * Math.exp(cycle(t)))) };
    const [past, future] = split(series, 48);
    const outlook = outlookOf(past, { horizonMonths: 12 });
    expect(outlook.report.structure!.seasonHarmonics).toBeGreaterThanOrEqual(1);
    expect(missesOf(outlook, COEXISTING)).toEqual([]);
    expect(coverageOf(outlook, future)).toBeGreaterThan(0.75);
    for (let h = 1; h <= 12; h++) {
      const [low, high] = quantiles(readColumn(outlook.draws, `season1m${h}`), [0.01, 0.99]);
      expect(cycle(47 + h)).toBeGreaterThan(low);
      expect(cycle(47 + h)).toBeLessThan(high);
    }
  });
});

describe('a measurement floor', () => {
  it('keeps the errors from being taken for smaller than stated, and the truth inside', () => {
    // counts that happen to lie on a smooth line, of a panel that errs by 10 %
    const series = simulateSeries(COEXISTING, 36, 0.005, 31);
    const floor = { measurementFloor: { focal: 0, rival: 0.1 } };
    const [stated, unstated] = [outlookOf(series, floor), outlookOf(series)];
    expect(Math.min(...readColumn(stated.draws, 'size2'))).toBeGreaterThanOrEqual(0.1);
    expect(stated.report.errors.focal.q50).toBeLessThan(0.02);
    expect(missesOf(stated, COEXISTING)).toEqual([]);
    expect(widthOf(stated, 'k2')).toBeGreaterThan(widthOf(unstated, 'k2'));
  });

  it('of the size of the errors covers the counts to come', () => {
    const [past, future] = split(simulateSeries(RIVAL_LOSES, 48, 0.1, 33), 36);
    const floor = { measurementFloor: { focal: 0.1, rival: 0.1 } };
    const outlook = outlookOf(past, { ...floor, horizonMonths: 12 });
    expect(missesOf(outlook, RIVAL_LOSES)).toEqual([]);
    expect(coverageOf(outlook, future)).toBeGreaterThan(0.75);
  });
});

describe('an estimate of the addressable market', () => {
  // twenty months: growth has hardly bent, the counts alone leave the saturation levels open
  const early = simulateSeries({ ...COEXISTING, n1: 1.5e4, n2: 1e4 }, 20, 0.03, 41);
  const states = (factor: number, relativeError: number) => ({
    addressable: { focal: factor * COEXISTING.k1, rival: factor * COEXISTING.k2, relativeError },
  });

  it('that is right within its error narrows what the counts leave open, truth inside', () => {
    const [plain, helped] = [outlookOf(early), outlookOf(early, states(1.15, 0.2))];
    expect(missesOf(helped, COEXISTING)).toEqual([]);
    for (const level of ['k1', 'k2'])
      expect(widthOf(helped, level)).toBeLessThan(0.7 * widthOf(plain, level));
    expect(helped.report.beliefs!.addressable!.focal).toBe(1.15 * COEXISTING.k1);
  });

  it('that long counts contradict is told as a conflict', () => {
    const long = simulateSeries(COEXISTING, 60, 0.02, 42);
    const { report } = outlookOf(long, states(0.25, 0.1));
    const conflicts = report.unknowns.filter(({ code }) => code === 'prior-conflict');
    expect(conflicts.map(({ parameter }) => parameter)).toEqual(expect.arrayContaining(['k1', 'k2']));
  });
});
