/**
 * Profile likelihood intervals of two published experiments (Gause 1934; data and sources in test/reference/data), computed independently
 * with scipy (LSODA rtol 1e-10), 95 %, by the chi2 and by the F threshold. One of them is open at infinity.
 */
import { describe, expect, it } from 'vitest';
import { fitPlain } from '@/lib/estimate/plain-fit';
import { createPlainProblem, type PlainSeries } from '@/lib/estimate/plain-problem';
import { toPlainTheta } from '@/lib/forecast/identifiability/plain-point';
import type { ProfiledQuantity } from '@/lib/forecast/identifiability/profile-constraint';
import { profileQuantity } from '@/lib/forecast/identifiability/profile-interval';
import { readCsv, toSeries } from '../estimate/read-data';

const paramecium = toSeries(readCsv('gause1934_app_t3_paramecium.csv'), {
  time: 'day',
  first: 'aurelia_mix',
  second: 'caudatum_mix',
});
const science = toSeries(readCsv('gause1934_science_fig2_3_paramecium_volume.csv'), {
  time: 'day',
  first: 'caudatum_mix',
  second: 'aurelia_mix',
});

type Ends = readonly [number, number | null];

interface Reference {
  name: string;
  series: PlainSeries;
  errorScale: 'log' | 'raw';
  /** F(.95; 1, n - 8). */
  f: number;
  rows: readonly (readonly [ProfiledQuantity, chi2: Ends, f: Ends])[];
}

/** null: infinity. */
const REFERENCES: Reference[] = [
  {
    name: 'Gause Science',
    series: science,
    errorScale: 'raw',
    f: 4.09817173,
    rows: [
      ['a12', [1.0381, 2.0095], [1.0045, 2.1069]],
      ['a21', [0.0191, 0.5667], [-0.0232, 0.5963]],
      ['k1', [183.01, 295.59], [179.04, 306.68]],
      ['k2', [136.12, 165.05], [134.24, 166.77]],
    ],
  },
  {
    name: 'Gause T3',
    series: paramecium,
    errorScale: 'log',
    f: 4.07265375,
    rows: [
      ['a12', [-0.148, 1.53], [-0.222, 1.636]],
      ['a21', [0.6055, null], [0.5704, null]],
      ['k1', [310.7, 432.3], [305.5, 439.7]],
      ['k2', [230.4, null], [220.3, null]],
    ],
  },
];

/** 0.5 % of the interval's own width, or of the end where the other is infinite: a root near 0 has no relative error of its own. */
const TOLERANCE = 0.005;

function expectEnds(found: { low: number | null; high: number | null }, [low, high]: Ends): void {
  const size = high === null ? low : high - low;
  expect(Math.abs(found.low! - low)).toBeLessThan(TOLERANCE * size);
  if (high === null) expect(found.high).toBeNull();
  else expect(Math.abs(found.high! - high)).toBeLessThan(TOLERANCE * Math.min(size, high));
}

describe.each(REFERENCES)('$name, $errorScale errors', ({ series, errorScale, f, rows }) => {
  const fit = fitPlain(series, { errorScale, starts: 2 });
  const problem = createPlainProblem(series, errorScale);
  const best = toPlainTheta(fit, problem.scales);

  it.each(rows)('has the reference intervals of %s', (quantity, chi2, byF) => {
    const profile = (options: Parameters<typeof profileQuantity>[4]) =>
      profileQuantity(problem, best, fit.rss, quantity, { allowsHelp: true, ...options })!;
    expectEnds(profile({}), chi2);
    expectEnds(profile({ threshold: 'f', quantile: f }), byF);
  });
});
