/**
 * Is it competition at all? Odds of the sign patterns from a fit with coefficients of either sign (`signed-path.ts`).
 *
 * A coefficient below NONE_WITHIN in size is none: that firm hardly touches the other's room. Patterns (Pistorius & Utterback 1997,
 * Research Policy 26:67, with the one-sided ones of ecology): both take competition, one takes and one gives predator and prey, both give
 * mutual help, one takes or gives and the other leaves alone one-sided, both leave alone none.
 *
 * Posterior by adaptive importance sampling (Cappe et al. 2004, population Monte Carlo): draws from a multivariate t around the best fit with
 * its Gauss-Newton covariance, weighted by posterior over proposal; mean and covariance of the weighted draws make the next proposal. While few draws carry the weight, these are
 * taken with the weights to a power below 1 that leaves ADAPT_EFFECTIVE draws, so that the proposal walks towards the posterior.
 */
import type { Observations } from '../../estimate/observations';
import { type ErrorGuess, guessError, refineError } from '../../estimate/penalised-problem';
import type { Priors } from '../../estimate/priors';
import { choleskyOrNull } from '../../numeric/cholesky';
import { fitLeastSquaresInSteps, type LeastSquaresFit } from '../../numeric/least-squares';
import { halfSumOfSquares } from '../../numeric/linear';
import { normalCdf } from '../../numeric/normal';
import { createStream, type RandomStream } from '../../numeric/random';
import { runToEnd } from '../../numeric/run-to-end';
import { EFFECTS, type Effect, SIGN_PATTERNS, type SignPattern, type SignPatternId } from './report';
import { createSignedProblem, SIGNED_PRIOR_SD, type SignedProblem } from './signed-path';

/** A coefficient smaller than this is no effect: less than a tenth of the other's room when full. */
export const NONE_WITHIN = 0.1;

const ROUNDS = 8;
const ADAPT_EFFECTIVE = 250;
const POWER_STEPS = 25;
const DRAWS = 6000;
/** Degrees of freedom of the proposal: tails heavy enough to cover a posterior that is no normal. */
const TAIL = 5;
/** The first proposal is wider than the curvature says. */
const FIRST_WIDENING = 1.5;
/** Fewer effective draws give no odds. */
const MIN_EFFECTIVE = 60;
const ERROR_ROUNDS = 2;
/** Coefficients that the fit starts from, beside those given. */
const FURTHER_STARTS = [
  [0, 0],
  [-0.3, -0.3],
] as const;
const STREAM = 60;
const FIT = { bursts: 0, maxIterations: 100, gradientTolerance: 1e-5 } as const;
const WIDTH = 8;

export interface SignInput {
  observations: Observations;
  priors: Priors;
  /** Smallest errors of ln users. */
  floors: readonly [number, number];
  /** r1, r2, K1, K2, alpha, beta, N1(start), N2(start) of a fit, natural units. */
  point: readonly number[];
  seed: number;
}

/** @returns null when no fit is finite, or too few draws carry the weight */
export function computeSignPattern(input: SignInput): SignPattern | null {
  return runToEnd(computeSignPatternInSteps(input));
}

/** The same as a generator that yields after every round of draws. */
export function* computeSignPatternInSteps(input: SignInput): Generator<void, SignPattern | null> {
  const fitted = yield* fitSigned(input);
  if (!fitted?.fit.covariance) return null;
  const { fit, problem } = fitted;
  const residuals = new Float64Array(problem.residualCount);
  const logDensity = (phi: Float64Array) =>
    problem.evaluate(phi, residuals, null) ? -halfSumOfSquares(residuals) : Number.NEGATIVE_INFINITY;
  const covariance = fit.covariance!.map((value) => value * FIRST_WIDENING ** 2);
  yield;
  const sample = yield* sampleAdaptively(logDensity, fit.theta, covariance, createStream(input.seed, STREAM));
  return sample && sample.effective >= MIN_EFFECTIVE ? describe(sample) : null;
}

interface SignedFit {
  fit: LeastSquaresFit;
  problem: SignedProblem;
}

function* fitSigned({ observations, priors, floors, point }: SignInput): Generator<void, SignedFit | null> {
  const { firms } = observations;
  let guesses: readonly [ErrorGuess, ErrorGuess] = [guessError(firms[0]), guessError(firms[1])];
  const first = Float64Array.from(point, (value, j) => (j === 4 || j === 5 ? value : Math.log(value)));
  let starts: Float64Array[] = [
    first,
    ...FURTHER_STARTS.map((pair) => first.map((value, j) => (j === 4 || j === 5 ? pair[j - 4] : value))),
  ];
  let best: SignedFit | null = null;
  for (let round = 0; round < ERROR_ROUNDS + 1; round++) {
    const problem = createSignedProblem(observations, priors, guesses);
    const fits: LeastSquaresFit[] = [];
    for (const start of starts) fits.push(yield* fitLeastSquaresInSteps(problem, start, FIT));
    const fit = fits.reduce((a, b) => (b.cost < a.cost ? b : a));
    if (!Number.isFinite(fit.cost)) return null;
    best = { fit, problem };
    starts = [fit.theta];
    problem.evaluate(fit.theta, new Float64Array(problem.residualCount), null);
    const refine = (i: 0 | 1) => refineError(firms[i], problem.errors[i], guesses[i], floors[i]);
    if (round < ERROR_ROUNDS) guesses = [refine(0), refine(1)];
  }
  return best;
}

interface WeightedSample {
  /** DRAWS x WIDTH. */
  values: Float64Array;
  weights: Float64Array;
  effective: number;
}

function* sampleAdaptively(
  logDensity: (phi: Float64Array) => number,
  start: Float64Array,
  startCovariance: Float64Array,
  stream: RandomStream,
): Generator<void, WeightedSample | null> {
  let mean: Float64Array = start;
  let covariance: Float64Array = startCovariance;
  let best: WeightedSample | null = null;
  for (let round = 0; round < ROUNDS; round++) {
    const root = choleskyOrNull(covariance, WIDTH);
    if (!root) return best;
    const sample = drawWeighted(logDensity, mean, root, stream);
    yield;
    if (!sample) return best;
    if (!best || sample.effective > best.effective) best = sample;
    ({ mean, covariance } = momentsOf(temper(sample)));
  }
  return best;
}

/** Draws of a multivariate t with location and root of its scale matrix; null when none has a density. */
function drawWeighted(
  logDensity: (phi: Float64Array) => number,
  mean: Float64Array,
  root: Float64Array,
  stream: RandomStream,
): WeightedSample | null {
  const values = new Float64Array(DRAWS * WIDTH);
  const logWeights = new Float64Array(DRAWS);
  const z = new Float64Array(WIDTH);
  for (let d = 0; d < DRAWS; d++) {
    let chiSquare = 0;
    for (let k = 0; k < TAIL; k++) chiSquare += stream.normal() ** 2;
    const stretch = Math.sqrt(TAIL / chiSquare);
    let square = 0;
    for (let j = 0; j < WIDTH; j++) {
      z[j] = stream.normal() * stretch;
      square += z[j] * z[j];
    }
    const phi = values.subarray(d * WIDTH, (d + 1) * WIDTH);
    for (let j = 0; j < WIDTH; j++) {
      let sum = mean[j];
      for (let k = 0; k <= j; k++) sum += root[j * WIDTH + k] * z[k];
      phi[j] = sum;
    }
    logWeights[d] = logDensity(phi) + ((TAIL + WIDTH) / 2) * Math.log1p(square / TAIL);
  }
  const largest = logWeights.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  if (largest === Number.NEGATIVE_INFINITY) return null;
  return normalise(
    values,
    logWeights.map((value) => Math.exp(value - largest)),
  );
}

/** The same draws with weights to the largest power, at most 1, that leaves ADAPT_EFFECTIVE of them. */
function temper(sample: WeightedSample): WeightedSample {
  if (sample.effective >= ADAPT_EFFECTIVE) return sample;
  let low = 0;
  let high = 1;
  let tempered = sample;
  for (let step = 0; step < POWER_STEPS; step++) {
    const power = (low + high) / 2;
    const candidate = normalise(
      sample.values,
      sample.weights.map((weight) => weight ** power),
    );
    if (candidate.effective < ADAPT_EFFECTIVE) high = power;
    else {
      low = power;
      tempered = candidate;
    }
  }
  return tempered;
}

function normalise(values: Float64Array, weights: Float64Array): WeightedSample {
  const sum = weights.reduce((a, b) => a + b, 0);
  const squares = weights.reduce((a, b) => a + b * b, 0);
  return { values, weights: weights.map((weight) => weight / sum), effective: (sum * sum) / squares };
}

function momentsOf({ values, weights }: WeightedSample): { mean: Float64Array; covariance: Float64Array } {
  const mean = new Float64Array(WIDTH);
  const covariance = new Float64Array(WIDTH * WIDTH);
  for (let d = 0; d < DRAWS; d++)
    for (let j = 0; j < WIDTH; j++) mean[j] += weights[d] * values[d * WIDTH + j];
  for (let d = 0; d < DRAWS; d++) {
    for (let i = 0; i < WIDTH; i++) {
      const weighted = weights[d] * (values[d * WIDTH + i] - mean[i]);
      for (let j = 0; j < WIDTH; j++)
        covariance[i * WIDTH + j] += weighted * (values[d * WIDTH + j] - mean[j]);
    }
  }
  return { mean, covariance };
}

function describe(sample: WeightedSample): SignPattern {
  const { values, weights } = sample;
  const odds = new Map<string, number>();
  for (let d = 0; d < DRAWS; d++) {
    const key = `${effectOf(values[d * WIDTH + 4])} ${effectOf(values[d * WIDTH + 5])}`;
    odds.set(key, (odds.get(key) ?? 0) + weights[d]);
  }
  const cells = EFFECTS.flatMap((onFocal) =>
    EFFECTS.map((onRival) => ({
      onFocal,
      onRival,
      odds: Math.min(1, odds.get(`${onFocal} ${onRival}`) ?? 0),
      prior: priorOf(onFocal) * priorOf(onRival),
    })),
  );
  const patterns = SIGN_PATTERNS.map((id) => {
    const members = cells.filter((cell) => patternOf(cell.onFocal, cell.onRival) === id);
    const total = (key: 'odds' | 'prior') =>
      Math.min(
        1,
        members.reduce((sum, cell) => sum + cell[key], 0),
      );
    return { id, odds: total('odds'), prior: total('prior') };
  });
  return {
    cells,
    patterns,
    alpha: weightedInterval(sample, 4),
    beta: weightedInterval(sample, 5),
    effectiveDraws: sample.effective,
  };
}

function effectOf(coefficient: number): Effect {
  if (coefficient > NONE_WITHIN) return 'takes';
  return coefficient < -NONE_WITHIN ? 'gives' : 'none';
}

function priorOf(effect: Effect): number {
  const outside = normalCdf(-NONE_WITHIN / SIGNED_PRIOR_SD);
  return effect === 'none' ? 1 - 2 * outside : outside;
}

export function patternOf(onFocal: Effect, onRival: Effect): SignPatternId {
  const effects = [onFocal, onRival];
  const count = (effect: Effect) => effects.filter((one) => one === effect).length;
  if (count('takes') === 2) return 'competition';
  if (count('gives') === 2) return 'mutualHelp';
  if (count('none') === 2) return 'none';
  if (count('none') === 0) return 'predatorPrey';
  return count('takes') === 1 ? 'oneSided' : 'oneSidedHelp';
}

function weightedInterval({ values, weights }: WeightedSample, column: number) {
  const order = Array.from(weights.keys()).sort(
    (a, b) => values[a * WIDTH + column] - values[b * WIDTH + column],
  );
  const at = (p: number) => {
    let sum = 0;
    for (const d of order) {
      sum += weights[d];
      if (sum >= p) return values[d * WIDTH + column];
    }
    return values[order[order.length - 1] * WIDTH + column];
  };
  return { q05: at(0.05), q50: at(0.5), q95: at(0.95) };
}
