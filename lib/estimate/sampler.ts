/**
 * Draws from the posterior: several seeded chains of Hamiltonian Monte Carlo, started from all modes found, in working coordinates.
 *
 * Warm-up: windows of growing length; after each the metric is the covariance of the window's positions over all chains (shrunk
 * towards the one before), and the step is tuned all along. Sampling goes on in rounds until split R-hat and bulk ESS of the watched
 * quantities pass, or to a stated limit. Trajectory lengths are drawn anew each time, so no length resonates.
 * A generator: each `yield` ends a bounded slice of work; the driver owns the clock.
 */
import { createTrajectory } from '../dynamics/trajectory';
import { choleskyOrNull, sampleCovariance } from '../numeric/cholesky';
import { bulkEss, splitRHat } from '../numeric/convergence';
import { createStream, type RandomStream } from '../numeric/random';
import {
  chooseUnits,
  createWorkingCoordinates,
  toValueCovariance,
  type WorkingCoordinates,
} from './coordinates';
import { ESS_LIMIT, R_HAT_LIMIT } from './defaults';
import { createHmcChain, type HmcChain } from './hmc';
import type { Posterior } from './posterior';
import { createStepSizeTuner } from './step-size';

export interface SamplerStart {
  /** A point of high density, in the posterior's own coordinates. */
  q: Float64Array;
  /** Rough covariance there, row-major. */
  covariance: Float64Array;
}

export interface SamplerProgress {
  stage: 'warm-up' | 'sampling';
  drawsKept: number;
  drawsTarget: number;
  rHat: number | null;
  ess: number | null;
}

export interface SamplerResult {
  hasConverged: boolean;
  rHat: number;
  ess: number;
  chains: number;
  /** Rows of `posterior.columns`, chains interleaved: draw i of every chain, then draw i + 1. */
  count: number;
  values: Float64Array;
}

export const CHAINS = 4;
const WARM_UP_WINDOWS = [40, 80, 120];
const STEP_ONLY_WINDOW = 50;
/** Draws per chain between two looks at convergence; the first look comes after two rounds. */
const ROUND = 250;
const FIRST_LOOK = 2 * ROUND;
/** Draws per chain at which a fit that has not converged stops. */
export const DRAW_LIMIT = 5000;
const WANTED_ACCEPTANCE = 0.8;
/** Mean length of a trajectory in units of the metric: a quarter turn of a standard normal. */
const MEAN_LENGTH = 1.6;
const MAX_STEPS = 40;
const FIRST_STEP = 0.5;
/** Weight of the metric before, in draws, when a window's covariance is taken. */
const METRIC_SHRINKAGE = 30;
/** Evaluations x months of one slice: some 30 ms. */
const SLICE_WORK = 150_000;
/** First stream of the chains; lower ones belong to the starts. */
const FIRST_STREAM = 10;
/** ln users below which a firm counts as gone: keeps watched quantities finite. */
const GONE = -700;

export function* runSampler(
  posterior: Posterior,
  starts: readonly SamplerStart[],
  seed: number,
  horizonMonths: number,
): Generator<SamplerProgress, SamplerResult> {
  const streams = Array.from({ length: CHAINS }, (_, c) => createStream(seed, FIRST_STREAM + c));
  const coordinates = createCoordinates(posterior, starts[0]);
  const chains = streams.map((stream) => createHmcChain(posterior.dimension, coordinates.logDensity, stream));
  const tuner = createStepSizeTuner(FIRST_STEP, WANTED_ACCEPTANCE);
  let metric = firstMetric(posterior.dimension, coordinates, starts[0]);
  chains.forEach((chain, c) => {
    placeChain(chain, coordinates, metric, starts[c % starts.length], streams[c]);
  });

  const slice = createSlice(posterior);
  const move = (chain: HmcChain, stream: RandomStream, stepSize: number) => {
    const steps = Math.ceil((2 * MEAN_LENGTH * stream.uniform()) / stepSize);
    return chain.move(metric, stepSize, Math.min(steps, MAX_STEPS));
  };
  const drawsTarget = FIRST_LOOK * CHAINS;
  for (const length of WARM_UP_WINDOWS) {
    const visited: Float64Array[] = [];
    for (let i = 0; i < length; i++) {
      for (let c = 0; c < CHAINS; c++) {
        tuner.update(move(chains[c], streams[c], tuner.current));
        visited.push(chains[c].position.slice());
      }
      if (slice.isOver()) yield { stage: 'warm-up', drawsKept: 0, drawsTarget, rHat: null, ess: null };
    }
    metric = blendMetric(metric, visited, posterior.dimension);
    tuner.restart();
  }
  for (let i = 0; i < STEP_ONLY_WINDOW; i++) {
    for (let c = 0; c < CHAINS; c++) tuner.update(move(chains[c], streams[c], tuner.current));
    if (slice.isOver()) yield { stage: 'warm-up', drawsKept: 0, drawsTarget, rHat: null, ess: null };
  }

  const stepSize = tuner.averaged;
  const store = createDrawStore(posterior, coordinates, streams, horizonMonths);
  let rHat = Number.POSITIVE_INFINITY;
  let ess = 0;
  while (store.perChain < DRAW_LIMIT) {
    const until = Math.max(store.perChain + ROUND, FIRST_LOOK);
    while (store.perChain < until) {
      for (let c = 0; c < CHAINS; c++) {
        move(chains[c], streams[c], stepSize);
        store.keep(c, chains[c].position);
      }
      if (slice.isOver()) yield progressOf(store.count, drawsTarget, rHat, ess);
    }
    ({ rHat, ess } = store.judge());
    if (rHat <= R_HAT_LIMIT && ess >= ESS_LIMIT) break;
    yield progressOf(store.count, drawsTarget, rHat, ess);
  }
  const hasConverged = rHat <= R_HAT_LIMIT && ess >= ESS_LIMIT;
  return { hasConverged, rHat, ess, chains: CHAINS, count: store.count, values: store.values() };
}

function progressOf(drawsKept: number, drawsTarget: number, rHat: number, ess: number): SamplerProgress {
  const isJudged = Number.isFinite(rHat);
  return {
    stage: 'sampling',
    drawsKept,
    drawsTarget,
    rHat: isJudged ? rHat : null,
    ess: isJudged ? ess : null,
  };
}

function createSlice(posterior: Posterior): { isOver(): boolean } {
  const evaluations = SLICE_WORK / posterior.observations.months;
  let next = posterior.evaluations + evaluations;
  return {
    isOver() {
      if (posterior.evaluations < next) return false;
      next = posterior.evaluations + evaluations;
      return true;
    },
  };
}

function createCoordinates(posterior: Posterior, start: SamplerStart): WorkingCoordinates {
  const units = chooseUnits(start.q, start.covariance);
  const coordinates = createWorkingCoordinates(posterior.dimension, posterior.logDensity, units);
  coordinates.decorrelate(toValueCovariance(start.q, start.covariance, units));
  return coordinates;
}

/** Diagonal metric: what the triangular map leaves of each coordinate's spread. */
function firstMetric(n: number, coordinates: WorkingCoordinates, start: SamplerStart): Float64Array {
  const units = chooseUnits(start.q, start.covariance);
  const lower = choleskyOrNull(toValueCovariance(start.q, start.covariance, units), n);
  const metric = new Float64Array(coordinates.dimension ** 2);
  for (let j = 0; j < n; j++) metric[j * n + j] = lower ? Math.min(lower[j * n + j], 1.5) : 0.1;
  return metric;
}

/** Lower factor of the window's covariance, shrunk towards the diagonal of the metric before; that one again when it fails. */
function blendMetric(before: Float64Array, visited: readonly Float64Array[], n: number): Float64Array {
  const covariance = sampleCovariance(visited, n);
  const weight = METRIC_SHRINKAGE / (visited.length + METRIC_SHRINKAGE);
  for (let i = 0; i < n * n; i++) covariance[i] *= 1 - weight;
  for (let j = 0; j < n; j++) {
    let variance = 0;
    for (let k = 0; k <= j; k++) variance += before[j * n + k] ** 2;
    covariance[j * n + j] += weight * variance;
  }
  return choleskyOrNull(covariance, n) ?? before;
}

/** Tries of a spread-out first place before the mode itself is taken. */
const PLACE_TRIES = 20;
/** Log density below the mode at which a first place is too far out. */
const PLACE_DEPTH = 30;

/** A chain begins near its mode, spread as the metric says (over-dispersed starts make R-hat honest). */
function placeChain(
  chain: HmcChain,
  coordinates: WorkingCoordinates,
  metric: Float64Array,
  start: SamplerStart,
  stream: RandomStream,
): void {
  const n = coordinates.dimension;
  const mode = new Float64Array(n);
  coordinates.fromParameters(start.q, mode);
  const place = new Float64Array(n);
  const top = coordinates.logDensity(mode, null);
  for (let attempt = 0; attempt < PLACE_TRIES; attempt++) {
    for (let j = 0; j < n; j++) place[j] = mode[j] + metric[j * n + j] * stream.normal();
    if (coordinates.logDensity(place, null) > top - PLACE_DEPTH && chain.reset(place)) return;
  }
  chain.reset(mode);
}

interface DrawStore {
  readonly perChain: number;
  readonly count: number;
  keep(chain: number, position: Float64Array): void;
  judge(): { rHat: number; ess: number };
  values(): Float64Array;
}

/** Kept draws: the table for the forecast, and the watched quantities per chain. */
function createDrawStore(
  posterior: Posterior,
  coordinates: WorkingCoordinates,
  streams: readonly RandomStream[],
  horizonMonths: number,
): DrawStore {
  const width = posterior.columns.length;
  const at = (column: string) => posterior.columns.indexOf(column);
  const columns = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1', 'n2'].map(at);
  const ahead = createTrajectory({ months: horizonMonths + 1, entry1: 0, entry2: 0 });
  const theta = new Float64Array(columns.length);
  const q = new Float64Array(posterior.dimension);
  const watched = streams.map(() => [[], [], [], []] as number[][]);
  let table = new Float64Array(width * CHAINS * FIRST_LOOK);
  let count = 0;

  const watch = (chain: number, row: number) => {
    columns.forEach((column, j) => {
      theta[j] = Math.log(table[row + column]);
    });
    const isFollowed = ahead.run(theta);
    const kept = watched[chain];
    kept[0].push(theta[4]);
    kept[1].push(theta[5]);
    kept[2].push(isFollowed ? Math.max(ahead.logLevel1[horizonMonths], GONE) : GONE);
    kept[3].push(isFollowed ? Math.max(ahead.logLevel2[horizonMonths], GONE) : GONE);
  };

  return {
    get perChain() {
      return watched[CHAINS - 1][0].length;
    },
    get count() {
      return count;
    },
    keep(chain, position) {
      if (table.length < (count + 1) * width) {
        const larger = new Float64Array(2 * table.length);
        larger.set(table);
        table = larger;
      }
      coordinates.toParameters(position, q);
      posterior.fillDraw(q, streams[chain], table, count * width);
      watch(chain, count * width);
      count++;
    },
    judge() {
      const quantities = [0, 1, 2, 3].map((k) => watched.map((chain) => chain[k]));
      return {
        rHat: Math.max(...quantities.map(splitRHat)),
        ess: Math.min(...quantities.map(bulkEss)),
      };
    },
    values() {
      return table.slice(0, count * width);
    },
  };
}
