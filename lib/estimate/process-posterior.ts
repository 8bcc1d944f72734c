/**
 * The posterior with process noise: the log state wanders from the path and is observed with independent errors (`kalman-filter.ts`).
 *
 * q = (eight log parameters, ln size of the observation error of firm 1 and 2, ln process noise of firm 1 and 2);
 * observation sd^2 = floor^2 + size^2 (ln users), process noise in ln users per root month.
 */
import type { RandomStream } from '../numeric/random';
import { logSizeBeyondFloor, SMALLEST_ERROR } from './ar1-posterior';
import { createKalmanFilter, type FilterGradient, type FilterVariances, orImpossible } from './kalman-filter';
import type { Observations } from './observations';
import { PARAMETERS } from './parameters';
import type { Posterior } from './posterior';
import { createLogPrior, type Priors } from './priors';
import type { FitOptions } from './types';

export const PROCESS_COLUMNS = [
  'r1',
  'r2',
  'k1',
  'k2',
  'alpha',
  'beta',
  'n1Start',
  'n2Start',
  'n1',
  'n2',
  'size1',
  'size2',
  'noise1',
  'noise2',
] as const;

const SIZE = PARAMETERS.length;
const NOISE = SIZE + 2;
const DIMENSION = NOISE + 2;

export function createProcessPosterior(
  observations: Observations,
  priors: Priors,
  measurementFloor: FitOptions['measurementFloor'],
): Posterior {
  const filter = createKalmanFilter(observations);
  const logPrior = createLogPrior(priors);
  const floors = [measurementFloor.focal, measurementFloor.rival].map((floor) =>
    Math.max(floor, SMALLEST_ERROR),
  );
  const variances: FilterVariances = { observation: new Float64Array(2), process: new Float64Array(2) };
  const slopes: FilterGradient = {
    theta: new Float64Array(PARAMETERS.length),
    observation: new Float64Array(2),
    process: new Float64Array(2),
  };
  const errorPriors = [priors.errorSize, priors.processNoise];
  let evaluations = 0;

  const readVariances = (q: Float64Array) => {
    for (let i = 0; i < 2; i++) {
      variances.observation[i] = Math.exp(2 * q[SIZE + i]) + floors[i] * floors[i];
      variances.process[i] = Math.exp(2 * q[NOISE + i]);
    }
  };

  const logDensity = (q: Float64Array, gradient: Float64Array | null): number => {
    evaluations++;
    gradient?.fill(0);
    readVariances(q);
    let value = filter.run(q, variances);
    if (!(value > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
    value += logPrior(q, gradient);
    for (let j = SIZE; j < DIMENSION; j++) {
      const prior = errorPriors[j < NOISE ? 0 : 1];
      const distance = (q[j] - prior.meanLog) / prior.sdLog;
      value -= 0.5 * distance * distance;
      if (gradient) gradient[j] = -distance / prior.sdLog;
    }
    if (gradient) addFilterGradient(q, gradient);
    return orImpossible(value);
  };

  const addFilterGradient = (q: Float64Array, gradient: Float64Array) => {
    slopes.theta.fill(0);
    slopes.observation.fill(0);
    slopes.process.fill(0);
    filter.sweepBack(variances, slopes);
    for (let j = 0; j < SIZE; j++) gradient[j] += slopes.theta[j];
    for (let i = 0; i < 2; i++) {
      gradient[SIZE + i] += slopes.observation[i] * 2 * Math.exp(2 * q[SIZE + i]);
      gradient[NOISE + i] += slopes.process[i] * 2 * variances.process[i];
    }
  };

  const fillDraw = (q: Float64Array, stream: RandomStream, out: Float64Array, offset: number): boolean => {
    readVariances(q);
    if (!(filter.run(q, variances) > Number.NEGATIVE_INFINITY)) return false;
    for (let j = 0; j < SIZE; j++) out[offset + j] = Math.exp(q[j]);
    const [p11, p12, p22] = filter.covariance;
    const sd1 = Math.sqrt(Math.max(p11, 0));
    const slope = p11 > 0 ? p12 / p11 : 0;
    const deviation1 = sd1 * stream.normal();
    const deviation2 = slope * deviation1 + Math.sqrt(Math.max(p22 - slope * p12, 0)) * stream.normal();
    out[offset + 8] = Math.exp(filter.mean[0] + deviation1);
    out[offset + 9] = Math.exp(filter.mean[1] + deviation2);
    for (let i = 0; i < 2; i++) {
      out[offset + 10 + i] = Math.sqrt(variances.observation[i]);
      out[offset + 12 + i] = Math.sqrt(variances.process[i]);
    }
    return true;
  };

  /** Persistent residuals of the path are mostly process noise: it starts with that share of them. */
  const placeErrors: Posterior['placeErrors'] = (theta, guesses) => {
    const q = new Float64Array(DIMENSION);
    q.set(theta);
    guesses.forEach((guess, i) => {
      const independent = guess.size * Math.sqrt(1 - guess.persistence);
      q[SIZE + i] = logSizeBeyondFloor(independent, floors[i]);
      q[NOISE + i] = priors.processNoise.meanLog;
    });
    return q;
  };

  const errorInformation = (): Float64Array =>
    Float64Array.from({ length: DIMENSION - SIZE }, (_, j) =>
      j < 2
        ? observations.firms[j].months.length + priors.errorSize.sdLog ** -2
        : 2 * priors.processNoise.sdLog ** -2,
    );

  return {
    dimension: DIMENSION,
    observations,
    priors,
    columns: PROCESS_COLUMNS,
    get evaluations() {
      return evaluations;
    },
    logDensity,
    placeErrors,
    errorInformation,
    fillDraw,
  };
}
