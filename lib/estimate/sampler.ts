/**
 * Draws from one component of the posterior: several seeded chains of Hamiltonian Monte Carlo, started from its modes, in working
 * coordinates.
 *
 * Warm-up: windows of growing length; after each the metric is the covariance of the window's positions over all chains (shrunk
 * towards the one before), and the step is tuned all along. Sampling goes on in rounds until split R-hat and bulk ESS of the watched
 * quantities pass, or to a stated limit of draws or of work. Where parameters may jump, the month of the break moves by Metropolis steps between trajectories.
 * A generator: each `yield` ends a bounded slice of work; the driver owns the clock.
 */
import { choleskyOrNull, sampleCovariance } from '../numeric/cholesky';
import { createStream, type RandomStream } from '../numeric/random';
import type { ModelComponent } from './break-choice';
import type { WorkingCoordinates } from './coordinates';
import { createDrawStore, type DrawStore } from './draw-store';
import { createHmcChain, type HmcChain } from './hmc';
import type { LocalMode } from './local-mode';
import type { Posterior } from './posterior';
import { createStepSizeTuner } from './step-size';

export interface SamplerOptions {
  seed: number;
  /** Number of the first stream of the seed; CHAINS of them are used. */
  firstStream: number;
  horizonMonths: number;
  rHatLimit: number;
  essLimit: number;
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
  store: DrawStore;
}

export const CHAINS = 4;
const WARM_UP_WINDOWS = [30, 60, 100];
const STEP_ONLY_WINDOW = 40;
/** Draws per chain between two looks at convergence; the first look comes after two rounds. */
const ROUND = 250;
const FIRST_LOOK = 2 * ROUND;
/** Draws per chain at which a fit that has not converged stops. */
export const DRAW_LIMIT = 4000;
const WANTED_ACCEPTANCE = 0.75;
/** Mean length of a trajectory in units of the metric: a quarter turn of a standard normal. Drawn anew each time, so that no length resonates. */
const MEAN_LENGTH = 1.6;
const LENGTH_SPREAD = 0.4;
/** Share of trajectories with a far smaller step: they lead a chain out of a corner that is sharper than the metric knows. */
const CAREFUL_SHARE = 0.15;
const CAREFUL_STEP = 0.2;
const CAREFUL_STEPS = 8;
const MAX_STEPS = 40;
const FIRST_STEP = 0.5;
/** Weight of the metric before, in draws, when a window's covariance is taken. */
const METRIC_SHRINKAGE = 40;
/** Moves of the month of the break per trajectory, and the longest of them. */
const BREAK_MOVES = 2;
const LONGEST_BREAK_MOVE = 8;
/** Fewest draws per chain, and visits of a warm-up window, that a fit at its limit still takes. */
const FEWEST_DRAWS = 100;
const FEWEST_VISITS = 10;
/** Integration steps of one slice: some 30 ms; and those after which a component that has not converged stops: some four seconds. */
const SLICE_STEPS = 100_000;
export const STEP_LIMIT = 15_000_000;

export function* runSampler(
  component: ModelComponent,
  options: SamplerOptions,
): Generator<SamplerProgress, SamplerResult> {
  const { posterior, modes } = component;
  const { coordinates } = modes[0];
  let { metric } = modes[0];
  const walkers = Array.from({ length: CHAINS }, (_, c) => {
    const stream = createStream(options.seed, options.firstStream + c);
    return placeWalker(component, coordinates, metric, modes[c % modes.length], stream);
  });
  const firstStep = posterior.steps;
  const tuner = createStepSizeTuner(FIRST_STEP, WANTED_ACCEPTANCE);
  const isOverspent = () => posterior.steps - firstStep > STEP_LIMIT;
  const slice = createSlice(posterior);
  const warmUp: SamplerProgress = {
    stage: 'warm-up',
    drawsKept: 0,
    drawsTarget: FIRST_LOOK * CHAINS,
    rHat: null,
    ess: null,
  };
  const isWarmUpDear = () => posterior.steps - firstStep > STEP_LIMIT / 2;
  for (const length of WARM_UP_WINDOWS) {
    const visited: Float64Array[] = [];
    for (let i = 0; i < length && !(isWarmUpDear() && i >= FEWEST_VISITS); i++) {
      for (const walker of walkers) {
        tuner.update(walker.move(metric, tuner.current));
        visited.push(walker.chain.position.slice());
      }
      if (slice.isOver()) yield warmUp;
    }
    metric = blendMetric(metric, visited, posterior.dimension);
    tuner.restart();
  }
  for (let i = 0; i < STEP_ONLY_WINDOW; i++) {
    for (const walker of walkers) tuner.update(walker.move(metric, tuner.current));
    if (slice.isOver()) yield warmUp;
  }

  const stepSize = tuner.averaged;
  const store = createDrawStore(posterior, CHAINS, options.horizonMonths);
  const parameters = new Float64Array(posterior.dimension);
  let rHat = Number.POSITIVE_INFINITY;
  let ess = 0;
  const hasConverged = () => rHat <= options.rHatLimit && ess >= options.essLimit;
  while (
    store.perChain < FEWEST_DRAWS ||
    !(isOverspent() || store.perChain >= DRAW_LIMIT || hasConverged())
  ) {
    const until = Math.max(store.perChain + ROUND, FIRST_LOOK);
    while (store.perChain < until && !(isOverspent() && store.perChain >= FEWEST_DRAWS)) {
      walkers.forEach((walker, c) => {
        walker.move(metric, stepSize);
        coordinates.toParameters(walker.chain.position, parameters);
        store.keep(c, parameters, walker.stream);
      });
      if (slice.isOver())
        yield { ...warmUp, stage: 'sampling', drawsKept: store.count, ...judged(rHat, ess) };
    }
    ({ rHat, ess } = store.judge());
    yield { ...warmUp, stage: 'sampling', drawsKept: store.count, ...judged(rHat, ess) };
  }
  return { hasConverged: hasConverged(), rHat, ess, store };
}

function judged(rHat: number, ess: number): { rHat: number | null; ess: number | null } {
  return Number.isFinite(rHat) ? { rHat, ess } : { rHat: null, ess: null };
}

function createSlice(posterior: Posterior): { isOver(): boolean } {
  let next = posterior.steps + SLICE_STEPS;
  return {
    isOver() {
      if (posterior.steps < next) return false;
      next = posterior.steps + SLICE_STEPS;
      return true;
    },
  };
}

/** Lower factor of the window's covariance, shrunk towards the metric before; that one again when it fails. */
function blendMetric(before: Float64Array, visited: readonly Float64Array[], n: number): Float64Array {
  const covariance = sampleCovariance(visited, n);
  const weight = METRIC_SHRINKAGE / (visited.length + METRIC_SHRINKAGE);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let earlier = 0;
      for (let k = 0; k <= Math.min(i, j); k++) earlier += before[i * n + k] * before[j * n + k];
      covariance[i * n + j] = (1 - weight) * covariance[i * n + j] + weight * earlier;
    }
  }
  return choleskyOrNull(covariance, n) ?? before;
}

/** A chain with its own random stream and its own month of the break. */
interface Walker {
  chain: HmcChain;
  stream: RandomStream;
  /** One trajectory and the moves of the break; leaves the posterior at the walker's month. @returns what the tuning of the step hears */
  move(metric: Float64Array, stepSize: number): number;
}

/** Tries of a spread-out first place before the mode itself is taken. */
const PLACE_TRIES = 20;
/** Log density below the mode at which a first place is too far out. */
const PLACE_DEPTH = 30;

/** A walker begins near its mode, spread as the metric says, so that R-hat means something. */
function placeWalker(
  { posterior, breakMonths }: ModelComponent,
  coordinates: WorkingCoordinates,
  metric: Float64Array,
  mode: LocalMode,
  stream: RandomStream,
): Walker {
  const n = posterior.dimension;
  const chain = createHmcChain(n, coordinates.logDensity, stream);
  let breakMonth = mode.breakMonth;

  const moveBreak = (first: number, last: number) => {
    const distance = 1 + stream.integer(stream.uniform() < 0.5 ? 1 : LONGEST_BREAK_MOVE);
    const month = breakMonth! + (stream.uniform() < 0.5 ? -distance : distance);
    if (!(month >= first && month <= last)) return;
    posterior.breakMonth = month;
    const gain = coordinates.logDensity(chain.position, null) - chain.logDensity;
    if (!(Math.log(stream.uniform()) < gain)) return;
    breakMonth = month;
    chain.refresh();
  };

  const place = () => {
    posterior.breakMonth = breakMonth;
    const centre = new Float64Array(n);
    coordinates.fromParameters(mode.q, centre);
    const top = coordinates.logDensity(centre, null);
    const spread = new Float64Array(n);
    for (let attempt = 0; attempt < PLACE_TRIES; attempt++) {
      const z = Float64Array.from({ length: n }, () => stream.normal());
      for (let i = 0; i < n; i++) {
        spread[i] = centre[i];
        for (let k = 0; k <= i; k++) spread[i] += metric[i * n + k] * z[k];
      }
      if (coordinates.logDensity(spread, null) > top - PLACE_DEPTH && chain.reset(spread)) return;
    }
    chain.reset(centre);
  };

  place();
  return {
    chain,
    stream,
    move(currentMetric, stepSize) {
      posterior.breakMonth = breakMonth;
      const length = MEAN_LENGTH * (1 + LENGTH_SPREAD * (2 * stream.uniform() - 1));
      const steps = Math.min(Math.max(Math.round(length / stepSize), 1), MAX_STEPS);
      const isCareful = stream.uniform() < CAREFUL_SHARE;
      const acceptance = isCareful
        ? chain.move(currentMetric, CAREFUL_STEP * stepSize, Math.min(steps, CAREFUL_STEPS))
        : chain.move(currentMetric, stepSize, steps);
      for (let k = 0; breakMonths && k < BREAK_MOVES; k++) moveBreak(breakMonths.first, breakMonths.last);
      posterior.breakMonth = breakMonth;
      // the step is tuned on full steps alone
      return isCareful ? WANTED_ACCEPTANCE : acceptance;
    },
  };
}
