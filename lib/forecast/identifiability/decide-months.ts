/**
 * Months until the data decide: a preposterior analysis (Raiffa & Schlaifer 1961, Applied Statistical Decision Theory).
 *
 * Futures are simulated from the draws as they are now. Each is then taken for data: every other draw is weighted with its likelihood of
 * the first h months, and odds are read from the weighted draws (`reweighted-odds.ts`). Reported is the expected chance, over futures, that
 * some outcome then passes 66 % or 90 %. The draw that made a future has no weight in it, else it would recognise itself.
 */
import { thinDraws } from '../../estimate/draws';
import type { DrawSet } from '../../estimate/types';
import { quantiles } from '../../numeric/quantile';
import { readDrawTable } from '../draw-table';
import { DECIDED_ABOVE } from '../odds';
import { OUTCOMES } from '../outcomes';
import { simulateLevels, simulateObservations } from '../simulate';
import { createFutureLikelihood } from './future-likelihood';
import { createReweighter, MIN_EFFECTIVE, type ReweightedOdds } from './reweighted-odds';

/** Further months that are looked at. */
export const DECISION_MONTHS = [3, 6, 12, 24] as const;
/** Odds that count as "very likely". */
export const SURE_ABOVE = 0.9;
/** Draws that futures are made from, and futures of each (antithetic errors). */
const FUTURE_DRAWS = 150;
const FUTURES_PER_DRAW = 2;
const FUTURES_PER_STEP = 10;
const FURTHEST = DECISION_MONTHS[DECISION_MONTHS.length - 1];

export interface DecisionRow {
  months: number;
  /** Expected chance that the odds of some outcome pass DECIDED_ABOVE, and SURE_ABOVE. */
  decided: number;
  sure: number;
  /** Median over futures of the effective draws, and the part of futures whose draws were too few to be counted directly. */
  effectiveDraws: number;
  extrapolated: number;
}

export interface DecisionAnalysis {
  futures: number;
  rows: DecisionRow[];
}

/** A generator that yields its progress in futures. */
export function* analyseDecision(
  draws: DrawSet,
  seed: number,
): Generator<{ done: number; total: number }, DecisionAnalysis> {
  const futures = simulateDecisionFutures(draws, seed, FUTURE_DRAWS);
  const score = createFutureScore(draws);
  const results: ReweightedOdds[][] = [];
  for (let at = 0; at < futures.length; at++) {
    const scored = score(futures[at]);
    if (scored) results.push(scored);
    if (at % FUTURES_PER_STEP === 0) yield { done: at, total: futures.length };
  }
  const rows = DECISION_MONTHS.map((months, k) => {
    const afterMonths = results.map((row) => row[k]);
    return summarise(months, afterMonths);
  });
  return { futures: results.length, rows };
}

export interface DecisionFuture {
  /** Row of the draw that made it. */
  source: number;
  /** ln counts, firm 1 then firm 2, of the last entry of DECISION_MONTHS months each. */
  logCounts: Float64Array;
}

/** Counts that may come, `FUTURES_PER_DRAW` from each of at most `sourceCount` draws. */
export function simulateDecisionFutures(draws: DrawSet, seed: number, sourceCount: number): DecisionFuture[] {
  const sources = thinDraws(draws, sourceCount);
  const levels = simulateLevels(sources, FURTHEST, seed);
  const { count, focal, rival } = simulateObservations(sources, levels, seed, FUTURES_PER_DRAW);
  return Array.from({ length: count }, (_, at) => {
    const logCounts = new Float64Array(2 * FURTHEST);
    for (let h = 0; h < FURTHEST; h++) {
      logCounts[h] = Math.log(focal[h * count + at]);
      logCounts[FURTHEST + h] = Math.log(rival[h * count + at]);
    }
    // the row that thinDraws took
    const source = Math.floor((Math.floor(at / FUTURES_PER_DRAW) * draws.count) / sources.count);
    return { source, logCounts };
  });
}

/** Odds of one future after the months of DECISION_MONTHS; null when its counts died out. */
export type FutureScore = (future: DecisionFuture) => ReweightedOdds[] | null;

export function createFutureScore(draws: DrawSet): FutureScore {
  const likelihood = createFutureLikelihood(draws, FURTHEST);
  const { alpha, beta } = readDrawTable(draws);
  const reweighter = createReweighter(alpha, beta);
  const { months, count } = likelihood;
  const running = new Float64Array(months);
  const byMonth = DECISION_MONTHS.map(() => new Float64Array(count));
  return ({ logCounts, source }) => {
    // counts that died out have no logarithm
    if (!logCounts.every(Number.isFinite)) return null;
    for (let j = 0; j < count; j++) {
      if (j === source) running.fill(Number.NEGATIVE_INFINITY);
      else likelihood.fillLogLikelihood(j, logCounts, running);
      DECISION_MONTHS.forEach((h, k) => {
        byMonth[k][j] = running[h - 1];
      });
    }
    return byMonth.map((values) => reweighter.odds(values));
  };
}

function summarise(months: number, futures: ReweightedOdds[]): DecisionRow {
  const share = (holds: (future: ReweightedOdds) => boolean) =>
    futures.length === 0 ? 0 : futures.filter(holds).length / futures.length;
  const passes = (threshold: number) =>
    share(({ odds }) => OUTCOMES.some((outcome) => odds[outcome] > threshold));
  return {
    months,
    decided: passes(DECIDED_ABOVE),
    sure: passes(SURE_ABOVE),
    effectiveDraws:
      futures.length === 0
        ? 0
        : quantiles(
            futures.map(({ effective }) => effective),
            [0.5],
          )[0],
    extrapolated: share(({ effective }) => effective < MIN_EFFECTIVE),
  };
}
