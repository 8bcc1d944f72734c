/**
 * A fit from series to draws as a resumable run: each `next()` does a bounded slice and tells how far it is. No clock here; the
 * driver owns time and cancelling.
 */
import { choleskyOrNull, invertFromCholesky } from '../numeric/cholesky';
import { createStream } from '../numeric/random';
import { createAr1Posterior, SMALLEST_ERROR } from './ar1-posterior';
import { HYPERCUBE_STARTS } from './defaults';
import { type Observations, readObservations } from './observations';
import { PARAMETERS } from './parameters';
import { distinctEnds, fitStart, type Mode, polishMode, SAME_VALUE, type StartResult } from './point-fit';
import type { Posterior } from './posterior';
import { buildPriors, type Priors } from './priors';
import { createProcessPosterior } from './process-posterior';
import { runSampler, type SamplerResult, type SamplerStart } from './sampler';
import { createStarts } from './starts';
import type { DrawSet, FitInput, FitProgress, FitStatus } from './types';

export interface Fit {
  status: FitStatus;
  observations: Observations;
  priors: Priors;
  starts: (StartResult & { reachedBest: boolean })[];
  best: Mode;
  sampler: SamplerResult;
  draws: DrawSet;
  evaluations: number;
}

export interface FitFailure {
  status: Exclude<FitStatus, 'converged' | 'not-converged'>;
  starts: Fit['starts'];
}

export type FitStep =
  | { done: false; progress: FitProgress }
  | { done: true; fit: Fit }
  | { done: true; failure: FitFailure };

export interface FitRun {
  next(): FitStep;
}

/** Stream of the seed that the starts use. */
const START_STREAM = 0;
/** Starts of one slice. */
const STARTS_PER_SLICE = 3;
/** Ends polished at most. */
const MAX_MODES = 4;
/** Log density below the best mode at which a mode is left out: it would hold less than one draw in twenty thousand. */
const MODE_DEPTH = 10;

export function createFitRun(input: FitInput): FitRun {
  const steps = runFit(input);
  return {
    next() {
      const { done, value } = steps.next();
      if (!done) return { done: false, progress: value };
      return 'failure' in value ? { done: true, failure: value.failure } : { done: true, fit: value.fit };
    },
  };
}

export type FitEnd = { fit: Fit } | { failure: FitFailure };

/** The run as a generator; `createFitRun` and the outlook run drive it. */
export function* runFit(input: FitInput): Generator<FitProgress, FitEnd> {
  const { series, options } = input;
  const reading = readObservations(series);
  if (!reading.ok) return { failure: { status: reading.status, starts: [] } };
  const { observations } = reading;
  const priors = buildPriors(observations);
  const floors = [options.measurementFloor.focal, options.measurementFloor.rival].map((floor) =>
    Math.max(floor, SMALLEST_ERROR),
  ) as [number, number];

  const starts = createStarts(
    observations,
    priors,
    HYPERCUBE_STARTS,
    createStream(options.seed, START_STREAM),
  );
  const results: StartResult[] = [];
  const progress = (stage: FitProgress['stage']): FitProgress => ({
    stage,
    startsDone: results.length,
    startsTotal: starts.length,
    bestValue: lowestValue(results),
    drawsKept: 0,
    drawsTarget: 0,
    rHat: null,
    ess: null,
  });
  for (const start of starts) {
    results.push(fitStart(observations, priors, start));
    if (results.length % STARTS_PER_SLICE === 0) yield progress('starts');
  }

  const rows = markBest(results);
  const modes: Mode[] = [];
  for (const end of distinctEnds(results, MAX_MODES)) {
    const mode = polishMode(observations, priors, floors, end.theta, 'competition');
    if (mode) modes.push(mode);
    yield progress('polish');
  }
  if (modes.length === 0) return { failure: { status: 'failed', starts: rows } };
  modes.sort((a, b) => a.value - b.value);
  const alone = polishMode(observations, priors, floors, modes[0].theta, 'no-competition');

  const createPosterior = options.errorModel === 'ar1' ? createAr1Posterior : createProcessPosterior;
  const posterior = createPosterior(observations, priors, options.measurementFloor);
  const samplerStarts = chooseSamplerStarts(posterior, alone ? [...modes, alone] : modes);
  if (samplerStarts.length === 0) return { failure: { status: 'failed', starts: rows } };
  const sampling = runSampler(posterior, samplerStarts, options.seed, options.horizonMonths);
  for (;;) {
    const step = sampling.next();
    if (!step.done) {
      yield { ...progress(step.value.stage), ...step.value };
      continue;
    }
    const sampler = step.value;
    const { count, values } = sampler;
    return {
      fit: {
        status: sampler.hasConverged ? 'converged' : 'not-converged',
        observations,
        priors,
        starts: rows,
        best: modes[0],
        sampler,
        draws: { errorModel: options.errorModel, columns: [...posterior.columns], count, values },
        evaluations: posterior.evaluations,
      },
    };
  }
}

function lowestValue(results: readonly StartResult[]): number | null {
  const values = results.flatMap((result) => (result.value === null ? [] : [result.value]));
  return values.length > 0 ? Math.min(...values) : null;
}

function markBest(results: readonly StartResult[]): Fit['starts'] {
  const best = lowestValue(results);
  return results.map((result) => ({
    ...result,
    reachedBest: best !== null && result.value !== null && result.value - best <= SAME_VALUE,
  }));
}

/** Modes with a share of the posterior worth a chain, best first. */
function chooseSamplerStarts(posterior: Posterior, modes: readonly Mode[]): SamplerStart[] {
  const starts = modes.flatMap((mode) => {
    const q = posterior.placeErrors(mode.theta, mode.errors);
    const density = posterior.logDensity(q, null);
    const covariance = approximateCovariance(mode, q, posterior);
    return density > Number.NEGATIVE_INFINITY && covariance ? [{ q, covariance, density }] : [];
  });
  const best = Math.max(...starts.map((start) => start.density));
  return starts.filter((start) => start.density > best - MODE_DEPTH).sort((a, b) => b.density - a.density);
}

/** Gauss-Newton covariance of the log parameters, prior included, beside that of the error parameters. */
function approximateCovariance(mode: Mode, q: Float64Array, posterior: Posterior): Float64Array | null {
  const n = posterior.dimension;
  const p = PARAMETERS.length;
  const information = new Float64Array(n * n);
  const rows = mode.jacobian.length / p;
  for (let row = 0; row < rows; row++) {
    for (let i = 0; i < p; i++) {
      for (let j = 0; j < p; j++)
        information[i * n + j] += mode.jacobian[row * p + i] * mode.jacobian[row * p + j];
    }
  }
  posterior.errorInformation(q).forEach((value, j) => {
    information[(p + j) * (n + 1)] = value;
  });
  const lower = choleskyOrNull(information, n);
  return lower && invertFromCholesky(lower, n);
}
