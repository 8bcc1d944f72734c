/** Runs of the own model for tests of the backtest: cheap draws around a truth that is known. */
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import type { DrawSet, FitInput } from '@/lib/estimate/types';
import type { AnalysisInput, AnalysisProgress, AnalysisRun } from '@/lib/forecast/analysis-run';
import type { OutlookRun } from '@/lib/forecast/outlook-run';
import { createStream } from '@/lib/numeric/random';
import type { MonthlySeries } from '@/lib/series/types';
import { makeSample } from '../../brief/sample-report';

/** Any report: the backtest reads none of it. */
const { report } = makeSample('coexistence').facts;

/** Two firms far below saturation that do not meet: straight lines of logarithms, shaken once a month. */
export function straightMarket(months: number, noise = 0.02): MonthlySeries {
  const stream = createStream(21, 0);
  const walk = (start: number, rate: number) => {
    let level = start;
    return Array.from({ length: months }, () => {
      level *= Math.exp(rate + noise * stream.normal());
      return level;
    });
  };
  return { firstMonth: 24_300, focal: walk(1000, 0.05), rival: walk(500, 0.03) };
}

/** Draws that grow on from the last counts at the given rates, without competition or saturation in sight. */
export function drawsFor(series: MonthlySeries, rates: [number, number], noise = 0.02): DrawSet {
  const [n1, n2] = [series.focal, series.rival].map((counts) => counts.at(-1) ?? 1);
  const columns = [
    'r1',
    'r2',
    'k1',
    'k2',
    'alpha',
    'beta',
    'n1',
    'n2',
    'size1',
    'size2',
    'persistence1',
    'persistence2',
    'residual1',
    'residual2',
  ];
  const row = [...rates, 1e9, 1e9, 1e-6, 1e-6, n1, n2, noise, noise, 0, 0, 0, 0];
  const count = 200;
  return { errorModel: 'ar1', columns, count, values: Array.from({ length: count }, () => row).flat() };
}

/** A stand-in for a fit that knows the rates; two slices, then draws. */
export function knowingRun(rates: [number, number], noise?: number): (input: FitInput) => OutlookRun {
  return ({ series }) => {
    let slices = 0;
    return {
      next() {
        slices += 1;
        if (slices <= 2)
          return {
            done: false,
            progress: {
              stage: 'sampling',
              startsDone: 1,
              startsTotal: 1,
              bestValue: null,
              drawsKept: 0,
              drawsTarget: 1,
              rHat: null,
              ess: null,
            },
          };
        return { done: true, report, draws: drawsFor(series, rates, noise) };
      },
    };
  };
}

export function inputFor(series: MonthlySeries): AnalysisInput {
  return { series, options: { ...DEFAULT_FIT_OPTIONS }, report, draws: drawsFor(series, [0.05, 0.03]) };
}

/** Drives a run to its end and gives all that it reported. */
export function finish<Result, Failure extends string>(run: AnalysisRun<Result, Failure>) {
  const seen: AnalysisProgress[] = [];
  for (;;) {
    const step = run.next();
    if (step.done) return { end: step, seen };
    seen.push(step.progress);
  }
}
