/**
 * The whole way from a series to a stored result as a resumable run: the fit, then its outlook. Each `next()` is a bounded slice.
 */
import { createTrajectory } from '../dynamics/trajectory';
import { thinDraws } from '../estimate/draws';
import { ENGINE_VERSION } from '../estimate/engine-version';
import { type Fit, type FitFailure, runFit } from '../estimate/fit-run';
import type { DrawSet, FitInput, FitProgress } from '../estimate/types';
import { readDrawTable } from './draw-table';
import { computeHistory } from './history';
import { computeErrors, computeOutlook } from './outlook';
import { computeParameterRows } from './parameter-rows';
import type { Diagnostics, FitReport, PointFit } from './report';
import { listUnknowns } from './unknowns';

export type OutlookStep =
  | { done: false; progress: FitProgress }
  | { done: true; report: FitReport; draws: DrawSet }
  | { done: true; failure: FitFailure['status']; diagnostics: Diagnostics };

export interface OutlookRun {
  next(): OutlookStep;
}

/** Draws handed over at most: enough for every later question, small enough to keep. */
export const KEPT_DRAWS = 4000;

type End = Exclude<OutlookStep, { done: false }>;

export function createOutlookRun(input: FitInput): OutlookRun {
  const steps = runOutlook(input);
  return {
    next() {
      const { done, value } = steps.next();
      return done ? value : { done: false, progress: value };
    },
  };
}

function* runOutlook(input: FitInput): Generator<FitProgress, End> {
  const end = yield* runFit(input);
  if ('failure' in end) {
    const { status } = end.failure;
    return { done: true, failure: status, diagnostics: describeFailure(end.failure) };
  }
  const { fit } = end;
  yield outlookProgress(fit);
  return { done: true, report: buildReport(fit, input), draws: thinDraws(fit.draws, KEPT_DRAWS) };
}

function outlookProgress(fit: Fit): FitProgress {
  return {
    stage: 'outlook',
    startsDone: fit.starts.length,
    startsTotal: fit.starts.length,
    bestValue: fit.best.value,
    drawsKept: fit.sampler.count,
    drawsTarget: fit.sampler.count,
    rHat: finiteOrNull(fit.sampler.rHat),
    ess: fit.sampler.ess,
  };
}

function buildReport(fit: Fit, { series, options }: FitInput): FitReport {
  const lastMonth = series.firstMonth + series.focal.length - 1;
  const { seed, horizonMonths } = options;
  const { outlook, cloud } = computeOutlook({ fit, seed, horizonMonths, lastMonth });
  const parameters = computeParameterRows(readDrawTable(fit.draws), fit.priors);
  const errors = computeErrors(fit.draws);
  return {
    engineVersion: ENGINE_VERSION,
    seed,
    errorModel: options.errorModel,
    months: fit.observations.months,
    diagnostics: describeFit(fit),
    point: describePoint(fit),
    parameters,
    errors,
    history: computeHistory(fit.draws, fit.observations),
    outlook,
    cloud,
    unknowns: listUnknowns(fit, parameters, errors),
  };
}

function describeFit(fit: Fit): Diagnostics {
  const starts = describeStarts(fit.starts);
  return {
    status: fit.status,
    rHat: finiteOrNull(fit.sampler.rHat),
    ess: fit.sampler.ess,
    chains: fit.sampler.chains,
    drawsKept: fit.sampler.count,
    evaluations: fit.evaluations,
    starts,
    startsAtBest: starts.filter((start) => start.reachedBest).length,
    conditionNumber: finiteOrNull(fit.best.conditionNumber),
  };
}

function describeFailure(failure: FitFailure): Diagnostics {
  const starts = describeStarts(failure.starts);
  return {
    status: failure.status,
    rHat: null,
    ess: null,
    chains: 0,
    drawsKept: 0,
    evaluations: 0,
    starts,
    startsAtBest: starts.filter((start) => start.reachedBest).length,
    conditionNumber: null,
  };
}

function describeStarts(starts: Fit['starts']): Diagnostics['starts'] {
  return starts.map(({ origin, value, reachedBest, iterations, stopped }) => ({
    origin,
    value,
    reachedBest,
    iterations,
    stopped,
  }));
}

function describePoint(fit: Fit): PointFit {
  const { months, firms } = fit.observations;
  const trajectory = createTrajectory({ months, entry1: firms[0].entry, entry2: firms[1].entry });
  trajectory.run(fit.best.theta);
  const [r1, r2, k1, k2, alpha, beta, n1Start, n2Start] = Array.from(fit.best.theta, Math.exp);
  return {
    r1,
    r2,
    k1,
    k2,
    alpha,
    beta,
    n1Start,
    n2Start,
    n1Last: Math.exp(trajectory.logLevel1[months - 1]),
    n2Last: Math.exp(trajectory.logLevel2[months - 1]),
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
