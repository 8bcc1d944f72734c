/** Whatever a series holds, what the data cannot tell ends: with numbers, or saying what is not identified. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { readObservations } from '@/lib/estimate/observations';
import { buildPriors } from '@/lib/estimate/priors';
import type { AnalysisInput } from '@/lib/forecast/analysis-run';
import { createIdentifiabilityRun } from '@/lib/forecast/identifiability/identifiability-run';
import {
  type IdentifiabilityReport,
  identifiabilityReportSchema,
} from '@/lib/forecast/identifiability/report';
import type { MonthlySeries } from '@/lib/series/types';
import { makeSample } from '../../brief/sample-report';
import { anySeries, driveInSlices, ODD_SERIES } from '../odd-series';
import { drawSetAround } from './draw-sets';

/** A series that wanders far from any path makes the plain fits work to their limit. */
const SLOW = 180_000;

/** The series with a fit that somebody else made: the middle of the priors, and draws of any market. */
function inputFor(series: MonthlySeries): AnalysisInput | null {
  const reading = readObservations(series);
  if (!reading.ok) return null;
  const { parameters } = buildPriors(reading.observations);
  const { report } = makeSample('coexistence').facts;
  const point = { ...report.point };
  for (const id of Object.keys(parameters) as (keyof typeof parameters)[]) {
    point[id] = Math.exp(parameters[id].meanLog);
  }
  const draws = drawSetAround({ alpha: 0.5, beta: 0.5, k1: 0.3, k2: 0.3 }, 100);
  return { series, options: { ...DEFAULT_FIT_OPTIONS }, report: { ...report, point }, draws };
}

function analyse(series: MonthlySeries): IdentifiabilityReport | null {
  const input = inputFor(series);
  if (!input) return null;
  const end = driveInSlices(createIdentifiabilityRun(input));
  if (!('result' in end)) throw new Error(end.failure);
  // the schema refuses NaN and infinity
  return identifiabilityReportSchema.parse(end.result);
}

/** The rest of the odd series have nothing for the plain fits that these do not have; what is left of the analysis rests on draws. */
const ODD_TO_PLAIN_FITS = ODD_SERIES.filter(([title]) =>
  [
    'a firm only falls',
    'both firms only fall',
    'one firm constant',
    'tiny counts',
    'a jump of three orders',
    'one firm dies',
  ].includes(title),
);

const oddSeries = (title: string) => ODD_SERIES.find(([name]) => name === title)![1];

describe('what the data cannot tell of any series', () => {
  it.each(ODD_TO_PLAIN_FITS)(
    '%s: ends with a whole report, in short slices',
    (_, series) => {
      expect(analyse(series)!.sensitivity).not.toBeNull();
    },
    SLOW,
  );

  it(
    'whatever it holds: never throws, never gives a number that is none',
    () => {
      fc.assert(
        fc.property(anySeries, (series) => {
          analyse(series);
        }),
        { numRuns: 3, seed: 1958 },
      );
    },
    SLOW,
  );

  it('says that a firm that only falls has no room of its own to be told, and profiles none', () => {
    const { errorScales, profiles } = analyse(oddSeries('a firm only falls'))!;
    for (const { outcome, k1, alpha, beta } of [errorScales!.log, errorScales!.raw]) {
      expect([outcome, k1, alpha, beta]).toEqual(['notIdentified', null, null, null]);
    }
    expect(profiles?.map(({ quantity }) => quantity) ?? []).not.toContain('k1');
  });
});
