/**
 * The whole way from a series to a stored result as a resumable run: the fit, then its outlook. Each `next()` is a bounded slice.
 */
import { readColumn, thinDraws } from '../estimate/draws';
import { ENGINE_VERSION } from '../estimate/engine-version';
import { type Fit, type FitFailure, runFit } from '../estimate/fit-run';
import { INDEX } from '../estimate/parameters';
import { measureConditioning } from '../estimate/point-fit';
import { USUAL_PRIORS } from '../estimate/priors';
import type { DrawSet, FitInput, FitProgress } from '../estimate/types';
import { readDrawTable } from './draw-table';
import { computeHistory } from './history';
import { intervalOf } from './interval';
import { computeErrors, computeOutlook } from './outlook';
import { computeParameterRows } from './parameter-rows';
import type { Diagnostics, FitReport, PointFit } from './report';
import { describeStructure } from './structure';
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
    drawsKept: fit.drawsKept,
    drawsTarget: fit.drawsKept,
    rHat: finiteOrNull(fit.rHat),
    ess: fit.ess,
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
    history: computeHistory(fit),
    structure: describeStructure(fit, series.firstMonth),
    beliefs: { priors: options.priors ?? USUAL_PRIORS, addressable: options.addressable ?? null },
    outlook,
    cloud,
    unknowns: listUnknowns(fit, parameters, errors),
  };
}

function describeFit(fit: Fit): Diagnostics {
  const starts = describeStarts(fit.starts);
  return {
    status: fit.status,
    rHat: finiteOrNull(fit.rHat),
    ess: fit.ess,
    chains: fit.chains,
    drawsKept: fit.drawsKept,
    evaluations: fit.evaluations,
    starts,
    startsAtBest: starts.filter((start) => start.reachedBest).length,
    conditionNumber: finiteOrNull(measureConditioning(fit.best)),
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

/** The mode of the heaviest component, its rates those in force now; users in the last month: medians over draws. */
function describePoint(fit: Fit): PointFit {
  const { posterior, modes } = fit.choice.components.reduce((a, b) => (b.weight > a.weight ? b : a));
  const { q } = modes[0];
  const last = posterior.segments[posterior.segments.length - 1];
  const [r1, r2, k1, k2, alpha, beta] = Array.from(q.subarray(last, last + 6), Math.exp);
  const median = (column: string) => intervalOf(readColumn(fit.draws, column)).q50;
  return {
    r1,
    r2,
    k1,
    k2,
    alpha,
    beta,
    n1Start: Math.exp(q[INDEX.n1Start]),
    n2Start: Math.exp(q[INDEX.n2Start]),
    n1Last: median('n1'),
    n2Last: median('n2'),
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
