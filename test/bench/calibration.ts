/**
 * Simulation-based calibration of the sampler (Talts, Betancourt, Simpson, Vehtari & Gelman 2018): parameters from the prior, a series
 * from the parameters, draws from the posterior of that series; over many repetitions the rank of each true parameter among its draws is uniform,
 * if likelihood, prior and sampler are right.
 *
 * The model is the default one without yearly cycle and break. The prior of levels is fixed here, not set by the largest count:
 * simulation must not look at data.
 */
import { createMonthFlow } from '@/lib/dynamics/month-flow';
import { HYPERCUBE_STARTS } from '@/lib/estimate/defaults';
import { climbFrom } from '@/lib/estimate/model-choice';
import { type Observations, readObservations } from '@/lib/estimate/observations';
import { PARAMETERS } from '@/lib/estimate/parameters';
import { distinctEnds, fitStart, type Mode, polishMode } from '@/lib/estimate/point-fit';
import { buildPriors, drawFromPrior, type Priors } from '@/lib/estimate/priors';
import { CHAINS, runSampler, type SamplerResult } from '@/lib/estimate/sampler';
import { createStarts } from '@/lib/estimate/starts';
import { createStatePosterior, STATE_COLUMNS } from '@/lib/estimate/state-posterior';
import { createStream, type RandomStream } from '@/lib/numeric/random';
import type { MonthlySeries } from '@/lib/series/types';

export const CALIBRATED = [...PARAMETERS.map(({ id }) => id), 'size1', 'size2', 'noise1', 'noise2'];
/** Ranks 0 .. RANKS - 1 among RANKS - 1 draws. */
export const RANKS = 100;
const FLOOR = { focal: 0.02, rival: 0.05 };
const MONTHS = 30;
const MODES = 4;
const SATURATION = { meanLog: Math.log(100_000), sdLog: 0.7 };
const START = { meanLog: Math.log(5000), sdLog: 0.7 };

/** Rank of each true parameter, in the order of CALIBRATED; null where no series could be simulated or fitted. */
export function rankTruth(seed: number): number[] | null {
  const stream = createStream(seed, 1_000);
  const truth = drawTruth(stream);
  const series = simulate(truth, stream);
  const reading = series && readObservations(series);
  if (!reading?.ok) return null;
  const result = sample(reading.observations, seed);
  if (!result) return null;
  const { store } = result;
  const every = store.count / (RANKS - 1);
  const rows = Array.from({ length: RANKS - 1 }, (_, i) => store.row(Math.floor(i * every)));
  // A draw tells the whole observation error, the floor included.
  const told = [...truth];
  told[8] = Math.hypot(truth[8], FLOOR.focal);
  told[9] = Math.hypot(truth[9], FLOOR.rival);
  return CALIBRATED.map((id, j) => {
    const column = (STATE_COLUMNS as readonly string[]).indexOf(id);
    return rows.filter((row) => row[column] < told[j]).length;
  });
}

/** The rules of the prior, with levels that no data have set. */
function fixPriors(observations: Observations): Priors {
  const priors = buildPriors(observations);
  const levels = { k1: SATURATION, k2: SATURATION, n1Start: START, n2Start: START };
  return { ...priors, parameters: { ...priors.parameters, ...levels } };
}

/** Natural units, in the order of CALIBRATED. */
function drawTruth(stream: RandomStream): number[] {
  const unit = { entry: 0, months: new Int32Array([0]), logCounts: new Float64Array([0]) };
  const priors = fixPriors({ months: 1, skippedMonths: 0, firms: [unit, unit] });
  const theta = new Float64Array(PARAMETERS.length);
  drawFromPrior(priors, stream, theta);
  const { errorSize, processNoise } = priors;
  const further = [errorSize, errorSize, processNoise, processNoise];
  return [...theta, ...further.map(({ meanLog, sdLog }) => meanLog + sdLog * stream.normal())].map(Math.exp);
}

function simulate(truth: number[], stream: RandomStream): MonthlySeries | null {
  const [r1, r2, k1, k2, alpha, beta, n1, n2, size1, size2, noise1, noise2] = truth;
  const flow = createMonthFlow(MONTHS);
  flow.setParameters(r1, r2, alpha, beta);
  flow.state.set([n1 / k1, n2 / k2]);
  const sd1 = Math.hypot(size1, FLOOR.focal);
  const sd2 = Math.hypot(size2, FLOOR.rival);
  const focal: number[] = [];
  const rival: number[] = [];
  for (let t = 0; t < MONTHS; t++) {
    focal.push(k1 * flow.state[0] * Math.exp(sd1 * stream.normal()));
    rival.push(k2 * flow.state[1] * Math.exp(sd2 * stream.normal()));
    if (!flow.advance(t)) return null;
    flow.state[0] *= Math.exp(noise1 * stream.normal());
    flow.state[1] *= Math.exp(noise2 * stream.normal());
  }
  return [...focal, ...rival].every((count) => count > 0) ? { firstMonth: 0, focal, rival } : null;
}

function sample(observations: Observations, seed: number): SamplerResult | null {
  const priors = fixPriors(observations);
  const starts = createStarts(observations, priors, HYPERCUBE_STARTS, createStream(seed, 0));
  const ends = distinctEnds(
    starts.map((start) => fitStart(observations, priors, start)),
    MODES,
  );
  const floors = [FLOOR.focal, FLOOR.rival] as const;
  const points = ends
    .map(({ theta }) => polishMode(observations, priors, floors, theta, 'competition'))
    .filter((mode): mode is Mode => mode !== null);
  if (ends[0]) {
    const alone = polishMode(observations, priors, floors, ends[0].theta, 'no-competition');
    if (alone) points.push(alone);
  }
  const posterior = createStatePosterior(observations, priors, FLOOR, { harmonics: 0, hasBreak: false });
  const modes = climbFrom(posterior, points);
  if (modes.length === 0) return null;
  const sampling = runSampler(
    { posterior, modes, weight: 1, breakMonths: null },
    { seed, firstStream: 10 + CHAINS, horizonMonths: 24, rHatLimit: 1.01, essLimit: 400 },
  );
  let step = sampling.next();
  while (!step.done) step = sampling.next();
  return step.value;
}

/** Pearson's statistic of ranks against the uniform, with `bins` bins (a divisor of RANKS); bins - 1 degrees of freedom. */
export function chiSquareOfRanks(ranks: readonly number[], bins: number): number {
  const counts = new Array<number>(bins).fill(0);
  for (const rank of ranks) counts[Math.floor((rank * bins) / RANKS)]++;
  const expected = ranks.length / bins;
  return counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
}
