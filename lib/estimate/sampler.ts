/**
 * Draws from one component of the posterior: several seeded chains of Hamiltonian Monte Carlo, started from its modes, in working
 * coordinates.
 *
 * Warm-up: windows of growing length; after each the coordinates and the metric are fitted anew to where all chains have been, and the
 * step is tuned all along. Sampling goes on in rounds until split R-hat and bulk ESS of the watched
 * quantities pass, or to a stated limit of draws or of work. Where parameters may jump, the month of the break moves by Metropolis steps between trajectories.
 * A generator: each `yield` ends a bounded slice of work; the driver owns the clock.
 */
import { choleskyOrNull, sampleCovariance } from '../numeric/cholesky';
import { createStream } from '../numeric/random';
import type { ModelComponent } from './break-choice';
import type { WorkingCoordinates } from './coordinate-map';
import { createDrawStore, type DrawStore } from './draw-store';
import { fitCoordinates } from './fitted-coordinates';
import type { Posterior } from './posterior';
import { createStepSizeTuner } from './step-size';
import { placeWalker } from './walker';

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
const WARM_UP_WINDOWS = [20, 40];
/** One more where parameters may jump: more of them to learn, and longer tails. */
const BREAK_WINDOW = 80;
const STEP_ONLY_WINDOW = 15;
/** Wanted ESS per draw and chain at the first look at convergence: half of what independent draws would have; and draws between later looks as a share. */
const FIRST_LOOK_SHARE = 0.5;
const LOOK_SHARE = 0.25;
/** Draws per chain at which a fit that has not converged stops. */
export const DRAW_LIMIT = 4000;
/** Draws that have brought a smaller share of the wanted ESS at a look are given up for what they teach, so many times at most. */
const HOPEFUL_SHARE = 0.4;
const MAX_LESSONS = 3;
const WANTED_ACCEPTANCE = 0.75;
const FIRST_STEP = 0.5;
/** Visited points that weigh as much as no correlation at all. */
const METRIC_SHRINKAGE = 40;
/** Fewest draws per chain, and visits of a warm-up window, that a fit at its limit still takes. */
const FEWEST_DRAWS = 100;
const FEWEST_VISITS = 10;
/** Integration steps of one slice: some 30 ms. */
const SLICE_STEPS = 100_000;
/** Integration steps after which a fit that has not converged stops: some three seconds. Shared out by weight; every component gets LEAST_SHARE. */
export const STEP_LIMIT = 12_000_000;
const LEAST_SHARE = 0.3;

export function* runSampler(
  component: ModelComponent,
  options: SamplerOptions,
): Generator<SamplerProgress, SamplerResult> {
  const { posterior, modes } = component;
  let { coordinates, metric } = modes[0];
  const walkers = Array.from({ length: CHAINS }, (_, c) => {
    const stream = createStream(options.seed, options.firstStream + c);
    return placeWalker(component, metric, coordinates, modes[c % modes.length], stream);
  });
  const firstStep = posterior.steps;
  const tuner = createStepSizeTuner(FIRST_STEP, WANTED_ACCEPTANCE);
  const stepLimit = STEP_LIMIT * Math.max(component.weight, LEAST_SHARE);
  const isOverspent = () => posterior.steps - firstStep > stepLimit;
  const slice = createSlice(posterior);
  const firstLook = Math.max(Math.ceil(options.essLimit / (CHAINS * FIRST_LOOK_SHARE)), FEWEST_DRAWS);
  const warmUp: SamplerProgress = {
    stage: 'warm-up',
    drawsKept: 0,
    drawsTarget: firstLook * CHAINS,
    rHat: null,
    ess: null,
  };
  const isWarmUpDear = () => posterior.steps - firstStep > stepLimit / 2;
  /** Coordinates and metric fitted to where all chains have been, the newest points last. */
  const learn = (visited: readonly Float64Array[]) => {
    coordinates = fitCoordinates(posterior, visited);
    metric = fitMetric(coordinates, visited) ?? metric;
    walkers.forEach((walker, c) => {
      walker.change(coordinates, visited[visited.length - CHAINS + c]);
    });
    tuner.restart();
  };
  function* tuneStep(): Generator<SamplerProgress> {
    for (let i = 0; i < STEP_ONLY_WINDOW; i++) {
      for (const walker of walkers) {
        tuner.update(walker.move(metric, tuner.current) ?? WANTED_ACCEPTANCE);
        walker.moveBreak();
      }
      if (slice.isOver()) yield warmUp;
    }
  }
  for (const length of component.breakMonths ? [...WARM_UP_WINDOWS, BREAK_WINDOW] : WARM_UP_WINDOWS) {
    const visited: Float64Array[] = [];
    for (let i = 0; i < length && !(isWarmUpDear() && i >= FEWEST_VISITS); i++) {
      for (const walker of walkers) {
        tuner.update(walker.move(metric, tuner.current) ?? WANTED_ACCEPTANCE);
        walker.moveBreak();
        const q = new Float64Array(posterior.dimension);
        walker.read(q);
        visited.push(q);
      }
      if (slice.isOver()) yield warmUp;
    }
    learn(visited);
  }
  yield* tuneStep();

  let store = createDrawStore(posterior, CHAINS, options.horizonMonths);
  let lessons = 0;
  const parameters = new Float64Array(posterior.dimension);
  let rHat = Number.POSITIVE_INFINITY;
  let ess = 0;
  const hasConverged = () => rHat <= options.rHatLimit && ess >= options.essLimit;
  while (
    store.perChain < FEWEST_DRAWS ||
    !(isOverspent() || store.perChain >= DRAW_LIMIT || hasConverged())
  ) {
    const until = Math.max(Math.ceil(store.perChain * (1 + LOOK_SHARE)), firstLook);
    while (store.perChain < until && !(isOverspent() && store.perChain >= FEWEST_DRAWS)) {
      walkers.forEach((walker, c) => {
        walker.move(metric, tuner.averaged);
        walker.moveBreak();
        walker.read(parameters);
        store.keep(c, parameters, walker.stream);
      });
      if (slice.isOver())
        yield { ...warmUp, stage: 'sampling', drawsKept: store.count, ...judged(rHat, ess) };
    }
    ({ rHat, ess } = store.judge());
    yield { ...warmUp, stage: 'sampling', drawsKept: store.count, ...judged(rHat, ess) };
    if (ess < HOPEFUL_SHARE * options.essLimit && lessons < MAX_LESSONS && !isWarmUpDear()) {
      lessons++;
      learn(Array.from({ length: store.count }, (_, i) => store.point(i)));
      store = createDrawStore(posterior, CHAINS, options.horizonMonths);
      yield* tuneStep();
    }
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

/** Lower factor of the covariance of visited points in these coordinates, its correlations shrunk; null when there is none. */
function fitMetric(coordinates: WorkingCoordinates, visited: readonly Float64Array[]): Float64Array | null {
  const n = coordinates.dimension;
  const points = visited.map((q) => {
    const u = new Float64Array(n);
    coordinates.fromParameters(q, u);
    return u;
  });
  const covariance = sampleCovariance(points, n);
  const kept = visited.length / (visited.length + METRIC_SHRINKAGE);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) if (i !== j) covariance[i * n + j] *= kept;
  return choleskyOrNull(covariance, n);
}
