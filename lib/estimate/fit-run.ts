/**
 * A fit from series to draws as a resumable run: each step of the generator is a bounded slice and tells how far the run is. No clock here;
 * the driver owns time and cancelling.
 */
import { createStream } from '../numeric/random';
import type { Month } from '../series/types';
import { createAr1Posterior, SMALLEST_ERROR } from './ar1-posterior';
import { blendRows, judgeBlend, limitsOfPart, samplePaths, type WeightedDraws } from './blend';
import { ESS_LIMIT, HYPERCUBE_STARTS, R_HAT_LIMIT } from './defaults';
import { chooseModels, climbFrom, type ModelChoice } from './model-choice';
import { type Observations, readObservations } from './observations';
import { distinctEnds, fitStart, type Mode, polishMode, SAME_VALUE, type StartResult } from './point-fit';
import { buildPriors, type Priors } from './priors';
import { CHAINS, runSampler } from './sampler';
import { createStarts } from './starts';
import type { DrawSet, FitInput, FitOptions, FitProgress, FitStatus } from './types';

export interface Fit {
  status: FitStatus;
  observations: Observations;
  priors: Priors;
  starts: (StartResult & { reachedBest: boolean })[];
  /** The best point fit. */
  best: Mode;
  choice: ModelChoice;
  rHat: number;
  ess: number;
  chains: number;
  /** Draws of all chains before blending. */
  drawsKept: number;
  draws: DrawSet;
  /** ln levels of sampled paths through the series, firm-major then month. */
  paths: Float64Array[];
  evaluations: number;
}

export interface FitFailure {
  status: Exclude<FitStatus, 'converged' | 'not-converged'>;
  starts: Fit['starts'];
}

export type FitEnd = { fit: Fit } | { failure: FitFailure };

export type FitStep =
  | { done: false; progress: FitProgress }
  | { done: true; fit: Fit }
  | { done: true; failure: FitFailure };

export interface FitRun {
  next(): FitStep;
}

/** Streams of the seed: the starts, the sampled paths, and CHAINS for each component from FIRST_CHAIN_STREAM on. */
const START_STREAM = 0;
const PATH_STREAM = 1;
const FIRST_CHAIN_STREAM = 10;
/** Starts of one slice. */
const STARTS_PER_SLICE = 3;
/** Ends polished at most. */
const MAX_POINTS = 4;
/** Rows of the blended draw set. */
export const BLENDED_DRAWS = 2000;
/** Sampled paths: months of history get their intervals from them. */
const PATHS = 300;

export function createFitRun(input: FitInput): FitRun {
  const steps = runFit(input);
  return {
    next() {
      const { done, value } = steps.next();
      return done ? { done: true, ...value } : { done: false, progress: value };
    },
  };
}

/** The run as a generator; `createFitRun` and the outlook run drive it. */
export function* runFit({ series, options }: FitInput): Generator<FitProgress, FitEnd> {
  const reading = readObservations(series);
  if (!reading.ok) return { failure: { status: reading.status, starts: [] } };
  const { observations } = reading;
  const priors = buildPriors(observations, options);
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
  const points: Mode[] = [];
  for (const mode of polishEnds(observations, priors, options, results)) {
    if (mode) points.push(mode);
    yield progress('polish');
  }
  const marked = placeMarks(options.changeMonths, series.firstMonth, observations);
  const choosing = chooseComponents(observations, priors, options, points, marked);
  let choice = choosing.next();
  for (; !choice.done; choice = choosing.next()) yield progress('polish');
  if (!choice.value) return { failure: { status: 'failed', starts: rows } };

  const parts: WeightedDraws[] = [];
  for (const [k, component] of choice.value.components.entries()) {
    const sampling = runSampler(component, {
      seed: options.seed,
      firstStream: FIRST_CHAIN_STREAM + k * CHAINS,
      horizonMonths: options.horizonMonths,
      ...limitsOfPart(component.weight, { rHat: R_HAT_LIMIT, ess: ESS_LIMIT }),
    });
    const before = countDraws(parts);
    let step = sampling.next();
    for (; !step.done; step = sampling.next()) {
      const { drawsKept, drawsTarget } = step.value;
      const components = choice.value.components.length;
      yield {
        ...progress(step.value.stage),
        ...step.value,
        drawsKept: before + drawsKept,
        drawsTarget: Math.max(drawsTarget * components, before + drawsKept),
      };
    }
    parts.push({ weight: component.weight, result: step.value });
  }
  return { fit: assembleFit(observations, priors, rows, points[0], choice.value, parts, options) };
}

/** The distinct ends of the starts, polished; then the best of them under the part of the prior without competition. */
function* polishEnds(
  observations: Observations,
  priors: Priors,
  { measurementFloor }: FitOptions,
  results: readonly StartResult[],
): Generator<Mode | null> {
  const floors = [measurementFloor.focal, measurementFloor.rival].map((floor) =>
    Math.max(floor, SMALLEST_ERROR),
  );
  const pair = [floors[0], floors[1]] as const;
  const ends = distinctEnds(results, MAX_POINTS);
  for (const end of ends) yield polishMode(observations, priors, pair, end.theta, 'competition');
  if (ends.length > 0) yield polishMode(observations, priors, pair, ends[0].theta, 'no-competition');
}

function* chooseComponents(
  observations: Observations,
  priors: Priors,
  options: FitOptions,
  points: readonly Mode[],
  marked: readonly number[],
): Generator<undefined, ModelChoice | null> {
  if (points.length === 0) return null;
  if (options.errorModel === 'process-noise') {
    return yield* chooseModels(observations, priors, options.measurementFloor, points, marked);
  }
  const posterior = createAr1Posterior(observations, priors, options.measurementFloor);
  const modes = climbFrom(posterior, points);
  if (modes.length === 0) return null;
  return {
    components: [{ posterior, modes, weight: 1, breakMonths: null }],
    harmonics: 0,
    flags: [],
    breakChance: 0,
    markedBreaks: [],
  };
}

/** Marked months as months of the grid, in order, each once; those without a month of the series on both sides are passed over. */
function placeMarks(
  changeMonths: FitOptions['changeMonths'],
  firstMonth: Month,
  { skippedMonths, months }: Observations,
): number[] {
  const places = (changeMonths ?? []).map((month) => month - firstMonth - skippedMonths);
  return [...new Set(places)].filter((place) => place > 0 && place < months).sort((a, b) => a - b);
}

function assembleFit(
  observations: Observations,
  priors: Priors,
  starts: Fit['starts'],
  best: Mode,
  choice: ModelChoice,
  parts: readonly WeightedDraws[],
  options: FitOptions,
): Fit {
  const blended = blendRows(parts, BLENDED_DRAWS);
  const columns = [...choice.components[0].posterior.columns];
  const values = new Float64Array(blended.length * columns.length);
  blended.forEach(({ store, draw }, i) => {
    values.set(store.row(draw), i * columns.length);
  });
  const posteriors = new Set(choice.components.map(({ posterior }) => posterior));
  return {
    status: parts.every(({ result }) => result.hasConverged) ? 'converged' : 'not-converged',
    observations,
    priors,
    starts,
    best,
    choice,
    ...judgeBlend(parts),
    chains: CHAINS * parts.length,
    drawsKept: countDraws(parts),
    draws: { errorModel: options.errorModel, columns, count: blended.length, values },
    paths: samplePaths(blended, PATHS, observations.months, createStream(options.seed, PATH_STREAM)),
    evaluations: [...posteriors].reduce((sum, { evaluations }) => sum + evaluations, 0),
  };
}

function countDraws(parts: readonly WeightedDraws[]): number {
  return parts.reduce((sum, { result }) => sum + result.store.count, 0);
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
