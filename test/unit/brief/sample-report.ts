/**
 * Invented results of a fit, for tests of words and figures: draws are log-normal around chosen parameters, everything else
 * (odds, bands, destinations, milestones) is worked out from those draws with a plain fourth-order Runge-Kutta step, so the parts
 * of a sample agree with each other. It is not an estimate of anything.
 */

import type { BriefFacts } from '@/lib/brief/facts';
import type { DrawSet } from '@/lib/estimate/types';
import { OUTCOMES, type Outcome } from '@/lib/forecast/outcomes';
import type { Bands, FitReport, Interval, Odds, SeriesBands } from '@/lib/forecast/report';
import type { MonthlySeries } from '@/lib/series/types';

export interface SampleOptions {
  r1: number;
  r2: number;
  k1: number;
  k2: number;
  alpha: number;
  beta: number;
  /** Users in the first month. */
  n1Start: number;
  n2Start: number;
  months: number;
  horizonMonths: number;
  /** Spread of the draws: sd of ln alpha and ln beta; the other parameters have a fifth of it. */
  spread: number;
  draws: number;
  seed: number;
  /** Months (from 0) in which the rival's count is missing. */
  rivalGaps: number[];
}

export type SampleName =
  | 'coexistence'
  | 'exclusionByFocal'
  | 'exclusionByRival'
  | 'headStartDecides'
  | 'undecided';

const BASE: SampleOptions = {
  r1: 0.16,
  r2: 0.14,
  k1: 420_000,
  k2: 380_000,
  alpha: 0.55,
  beta: 0.5,
  n1Start: 95_000,
  n2Start: 15_000,
  months: 42,
  horizonMonths: 36,
  spread: 0.35,
  draws: 400,
  seed: 1,
  rivalGaps: [],
};

export const SAMPLES: Record<SampleName, SampleOptions> = {
  coexistence: BASE,
  exclusionByFocal: { ...BASE, alpha: 0.6, beta: 1.9, n2Start: 60_000 },
  exclusionByRival: { ...BASE, alpha: 1.9, beta: 0.6, n2Start: 60_000 },
  headStartDecides: { ...BASE, alpha: 1.7, beta: 1.8, n1Start: 60_000, n2Start: 50_000, spread: 0.2 },
  undecided: { ...BASE, alpha: 0.95, beta: 1.05, months: 18, spread: 0.7 },
};

interface Draw {
  r1: number;
  r2: number;
  k1: number;
  k2: number;
  alpha: number;
  beta: number;
  n1: number;
  n2: number;
}

const ERROR_SD = 0.03;
const FIRST_MONTH = 2022 * 12 + 6;
const WINDOW_MONTHS = 120;
const CLOUD_SIZE = 300;
/** Long enough for the samples to settle, months. */
const FAR_MONTHS = 600;

/** Small seeded generator (mulberry32) with normal deviates by Box-Muller. */
function createNoise(seed: number): () => number {
  let state = seed >>> 0;
  const uniform = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return (((t ^ (t >>> 14)) >>> 0) + 0.5) / 4294967296;
  };
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}

function slopes(d: Draw, n1: number, n2: number): [number, number] {
  return [
    d.r1 * n1 * (1 - n1 / d.k1 - (d.alpha * n2) / d.k2),
    d.r2 * n2 * (1 - n2 / d.k2 - (d.beta * n1) / d.k1),
  ];
}

/** Monthly states from `start`, month 0 included: months + 1 rows. Two Runge-Kutta steps a month. */
export function integratePlainly(d: Draw, start: [number, number], months: number): [number, number][] {
  const path: [number, number][] = [start];
  let [a, b] = start;
  const h = 1 / 2;
  for (let step = 1; step <= months * 2; step++) {
    const [p1, q1] = slopes(d, a, b);
    const [p2, q2] = slopes(d, a + (h / 2) * p1, b + (h / 2) * q1);
    const [p3, q3] = slopes(d, a + (h / 2) * p2, b + (h / 2) * q2);
    const [p4, q4] = slopes(d, a + h * p3, b + h * q3);
    a += (h / 6) * (p1 + 2 * p2 + 2 * p3 + p4);
    b += (h / 6) * (q1 + 2 * q2 + 2 * q3 + q4);
    if (step % 2 === 0) path.push([a, b]);
  }
  return path;
}

export function outcomeOf(alpha: number, beta: number): Outcome {
  if (alpha < 1) return beta < 1 ? 'coexistence' : 'exclusionByFocal';
  return beta < 1 ? 'exclusionByRival' : 'headStartDecides';
}

function quantile(values: number[], p: number): number {
  const sorted = [...values].sort((x, y) => x - y);
  const at = (sorted.length - 1) * p;
  const low = Math.floor(at);
  return sorted[low]! + (at - low) * (sorted[Math.min(low + 1, sorted.length - 1)]! - sorted[low]!);
}

function interval(values: number[]): Interval {
  return { q05: quantile(values, 0.05), q50: quantile(values, 0.5), q95: quantile(values, 0.95) };
}

function bands(paths: number[][]): Bands {
  const at = (p: number) =>
    paths[0]!.map((_, month) =>
      quantile(
        paths.map((path) => path[month]!),
        p,
      ),
    );
  return { q05: at(0.05), q25: at(0.25), q50: at(0.5), q75: at(0.75), q95: at(0.95) };
}

function seriesBands(paths: [number, number][][]): SeriesBands {
  return {
    focal: bands(paths.map((path) => path.map((s) => s[0]))),
    rival: bands(paths.map((path) => path.map((s) => s[1]))),
    total: bands(paths.map((path) => path.map((s) => s[0] + s[1]))),
    share: bands(paths.map((path) => path.map((s) => s[0] / (s[0] + s[1])))),
  };
}

function oddsOf(draws: Draw[]): Odds {
  const odds: Odds = { coexistence: 0, exclusionByFocal: 0, exclusionByRival: 0, headStartDecides: 0 };
  for (const d of draws) odds[outcomeOf(d.alpha, d.beta)] += 1 / draws.length;
  for (const outcome of OUTCOMES) odds[outcome] = Math.min(1, odds[outcome]);
  return odds;
}

function makeDraws(o: SampleOptions, last: [number, number]): Draw[] {
  const noise = createNoise(o.seed);
  const around = (value: number, sd: number) => value * Math.exp(sd * noise());
  return Array.from({ length: o.draws }, () => ({
    r1: around(o.r1, o.spread / 5),
    r2: around(o.r2, o.spread / 5),
    k1: around(o.k1, o.spread / 5),
    k2: around(o.k2, o.spread / 5),
    alpha: around(o.alpha, o.spread),
    beta: around(o.beta, o.spread),
    n1: around(last[0], 0.01),
    n2: around(last[1], 0.01),
  }));
}

function makeSeries(o: SampleOptions, path: [number, number][]): MonthlySeries {
  const noise = createNoise(o.seed + 1000);
  const seen = (users: number) => Math.round(users * Math.exp(ERROR_SD * noise()));
  return {
    firstMonth: FIRST_MONTH,
    focal: path.map((s) => seen(s[0])),
    rival: path.map((s, month) => (o.rivalGaps.includes(month) ? null : seen(s[1]))),
  };
}

function parameterRows(draws: Draw[], o: SampleOptions): FitReport['parameters'] {
  const prior = (median: number, sd: number): Interval => ({
    q05: median * Math.exp(-1.645 * sd),
    q50: median,
    q95: median * Math.exp(1.645 * sd),
  });
  const learnt = (sd: number, priorSd: number) => Math.max(0, Math.min(1, 1 - (sd / priorSd) ** 2));
  const of = (read: (d: Draw) => number) => interval(draws.map(read));
  const fifth = o.spread / 5;
  return [
    { id: 'r1', posterior: of((d) => d.r1), prior: prior(0.15, 0.8), contraction: learnt(fifth, 0.8) },
    { id: 'r2', posterior: of((d) => d.r2), prior: prior(0.15, 0.8), contraction: learnt(fifth, 0.8) },
    { id: 'k1', posterior: of((d) => d.k1), prior: prior(o.k1, 0.9), contraction: learnt(fifth, 0.9) },
    { id: 'k2', posterior: of((d) => d.k2), prior: prior(o.k2, 0.9), contraction: learnt(fifth, 0.9) },
    { id: 'alpha', posterior: of((d) => d.alpha), prior: prior(1, 0.8), contraction: learnt(o.spread, 0.8) },
    { id: 'beta', posterior: of((d) => d.beta), prior: prior(1, 0.8), contraction: learnt(o.spread, 0.8) },
    {
      id: 'a12',
      posterior: of((d) => (d.alpha * d.k1) / d.k2),
      prior: prior(o.k1 / o.k2, 1.5),
      contraction: learnt(o.spread, 1.5),
    },
    {
      id: 'a21',
      posterior: of((d) => (d.beta * d.k2) / d.k1),
      prior: prior(o.k2 / o.k1, 1.5),
      contraction: learnt(o.spread, 1.5),
    },
  ];
}

function makeOutlook(o: SampleOptions, draws: Draw[], last: [number, number]): FitReport['outlook'] {
  const far = draws.map((d) => integratePlainly(d, [d.n1, d.n2], FAR_MONTHS));
  const ahead = far.map((path) => path.slice(1, o.horizonMonths + 1));
  const noise = createNoise(o.seed + 2000);
  const shaken = ahead.map((path) =>
    path.map(
      (s) => [s[0] * Math.exp(ERROR_SD * noise()), s[1] * Math.exp(ERROR_SD * noise())] as [number, number],
    ),
  );
  const odds = oddsOf(draws);
  const ends = far.map((path) => path.at(-1)!);
  const overtaker = last[0] < last[1] ? 'focal' : 'rival';
  const isAhead = (s: [number, number]) => (overtaker === 'focal' ? s[0] > s[1] : s[1] > s[0]);
  const overtakes = far
    .map((path) => path.findIndex((s, m) => m > 0 && m <= WINDOW_MONTHS && isAhead(s)))
    .filter((m) => m > 0);
  const isNear = (s: [number, number], end: [number, number]) =>
    Math.abs(s[0] - end[0]) + Math.abs(s[1] - end[1]) <= 0.05 * (end[0] + end[1]);
  const nears = far
    .map((path, i) => path.findIndex((s, m) => m > 0 && isNear(s, ends[i]!)))
    .filter((m) => m > 0 && m <= WINDOW_MONTHS);
  const headStart = draws
    .map((d, i) => ({ d, end: ends[i]! }))
    .filter(({ d }) => outcomeOf(d.alpha, d.beta) === 'headStartDecides');
  return {
    horizonMonths: o.horizonMonths,
    firstMonth: FIRST_MONTH + o.months,
    odds,
    priorOdds: { coexistence: 0.25, exclusionByFocal: 0.25, exclusionByRival: 0.25, headStartDecides: 0.25 },
    decided: OUTCOMES.find((outcome) => odds[outcome] > 0.66) ?? null,
    headStartFocalAhead:
      headStart.length < 10 ? null : headStart.filter(({ end }) => end[0] > end[1]).length / headStart.length,
    observations: seriesBands(shaken),
    levels: seriesBands(ahead),
    destination: {
      focal: interval(ends.map((s) => s[0])),
      rival: interval(ends.map((s) => s[1])),
      share: interval(ends.map((s) => s[0] / (s[0] + s[1]))),
    },
    returnHalfLifeMonths: { q05: 6, q50: 11, q95: 30 },
    overtaking: {
      id: 'overtaking',
      chance: overtakes.length / draws.length,
      windowMonths: WINDOW_MONTHS,
      monthsAhead: overtakes.length < 10 ? null : interval(overtakes),
      overtaker,
    },
    nearDestination: {
      id: 'nearDestination',
      chance: nears.length / draws.length,
      windowMonths: WINDOW_MONTHS,
      monthsAhead: nears.length < 10 ? null : interval(nears),
    },
  };
}

/** The columns of a draw set with AR(1) errors; the errors have no memory and are 0 in the last month. */
function drawSet(draws: Draw[], o: SampleOptions): DrawSet {
  const errors = {
    size1: ERROR_SD,
    size2: ERROR_SD,
    persistence1: 0,
    persistence2: 0,
    residual1: 0,
    residual2: 0,
  };
  const rows = draws.map((d) => ({ ...d, n1Start: o.n1Start, n2Start: o.n2Start, ...errors }));
  const columns = Object.keys(rows[0]!) as (keyof (typeof rows)[number])[];
  return {
    errorModel: 'ar1',
    columns: [...columns],
    count: rows.length,
    values: rows.flatMap((row) => columns.map((column) => row[column])),
  };
}

/** A whole sample: facts of a brief and the draws behind them. */
export function makeSample(nameOrOptions: SampleName | SampleOptions): { facts: BriefFacts; draws: DrawSet } {
  const o = typeof nameOrOptions === 'string' ? SAMPLES[nameOrOptions] : nameOrOptions;
  const truth: Draw = { ...o, n1: o.n1Start, n2: o.n2Start };
  const path = integratePlainly(truth, [o.n1Start, o.n2Start], o.months - 1);
  const last = path.at(-1)!;
  const draws = makeDraws(o, last);
  const cloud = draws.slice(0, CLOUD_SIZE).map((d) => {
    const end = integratePlainly(d, [d.n1, d.n2], FAR_MONTHS).at(-1)!;
    return {
      alpha: d.alpha,
      beta: d.beta,
      outcome: outcomeOf(d.alpha, d.beta),
      n1End: end[0],
      n2End: end[1],
    };
  });
  const level = (users: number): Interval => ({ q05: users * 0.98, q50: users, q95: users * 1.02 });
  const report: FitReport = {
    engineVersion: 'sample',
    seed: o.seed,
    errorModel: 'ar1',
    months: o.months,
    diagnostics: {
      status: 'converged',
      rHat: 1.004,
      ess: 812,
      chains: 4,
      drawsKept: o.draws,
      evaluations: 48_000,
      starts: [
        { origin: 'leslie', value: 12.3, reachedBest: true, iterations: 14, stopped: 'gradient-small' },
      ],
      startsAtBest: 1,
      conditionNumber: 340,
    },
    point: {
      r1: o.r1,
      r2: o.r2,
      k1: o.k1,
      k2: o.k2,
      alpha: o.alpha,
      beta: o.beta,
      n1Start: o.n1Start,
      n2Start: o.n2Start,
      n1Last: last[0],
      n2Last: last[1],
    },
    parameters: parameterRows(draws, o),
    errors: {
      focal: { q05: 0.024, q50: 0.03, q95: 0.038 },
      rival: { q05: 0.024, q50: 0.03, q95: 0.038 },
      persistenceFocal: { q05: -0.1, q50: 0.15, q95: 0.4 },
      persistenceRival: { q05: -0.1, q50: 0.15, q95: 0.4 },
    },
    history: { focal: path.map((s) => level(s[0])), rival: path.map((s) => level(s[1])) },
    outlook: makeOutlook(o, draws, last),
    cloud,
    unknowns: o.months < 24 ? [{ code: 'short-series', firm: null, parameter: null }] : [],
  };
  const facts: BriefFacts = {
    market: {
      name: 'Tool-lending memberships, Northmere',
      unit: 'monthly active members',
      focalName: 'Quillfern',
      rivalName: 'Marrowby',
    },
    series: makeSeries(o, path),
    revision: { number: 4, createdAt: '2026-01-08T09:00:00Z', fileName: 'northmere.csv' },
    report,
  };
  return { facts, draws: drawSet(draws, o) };
}
