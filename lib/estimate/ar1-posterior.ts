/**
 * The posterior with persistent observation errors: ln count_i(t) = ln N_i(t; theta) + e_i(t), e first-order autoregressive.
 *
 * q = (eight log parameters, ln size of the error of firm 1 and 2, logit persistence of firm 1 and 2).
 */
import { createTrajectory } from '../dynamics/trajectory';
import type { RandomStream } from '../numeric/random';
import { ar1LogLikelihood, type ErrorGradient } from './ar1-errors';
import { type FirmObservations, gridOf, type Observations } from './observations';
import { PARAMETERS } from './parameters';
import type { Posterior } from './posterior';
import { createLogPrior, type Priors } from './priors';
import type { FitOptions } from './types';

export const AR1_COLUMNS = [
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
  'persistence1',
  'persistence2',
  'residual1',
  'residual2',
] as const;

/** Smallest error of ln users that is believed, whatever the data say: counts are never known better than to 0.3 %. */
export const SMALLEST_ERROR = 0.003;

const ABOVE_FLOOR = 1.2;
/** A chain does not start at no persistence at all, where the logit runs away. */
const SMALLEST_FIRST_PERSISTENCE = 0.05;

const SIZE = PARAMETERS.length;
const PERSISTENCE = SIZE + 2;
const DIMENSION = PERSISTENCE + 2;

export function createAr1Posterior(
  observations: Observations,
  priors: Priors,
  measurementFloor: FitOptions['measurementFloor'],
): Posterior {
  const { months, firms } = observations;
  const trajectory = createTrajectory(gridOf(observations));
  const logPrior = createLogPrior(priors);
  const floors = [measurementFloor.focal, measurementFloor.rival].map((floor) =>
    Math.max(floor, SMALLEST_ERROR),
  );
  const errors: ErrorGradient[] = firms.map(() => ({
    level: new Float64Array(months),
    logSize: 0,
    logitPersistence: 0,
  }));
  const { errorSize, persistence } = priors;
  let evaluations = 0;

  const logDensity = (q: Float64Array, gradient: Float64Array | null): number => {
    evaluations++;
    gradient?.fill(0);
    if (!trajectory.run(q)) return Number.NEGATIVE_INFINITY;
    let value = logPrior(q, gradient);
    for (let i = 0; i < 2; i++) {
      const size = q[SIZE + i];
      const logit = q[PERSISTENCE + i];
      const logLevel = i === 0 ? trajectory.logLevel1 : trajectory.logLevel2;
      const error = errors[i];
      value += ar1LogLikelihood(firms[i], logLevel, size, logit, floors[i], gradient ? error : null);
      const sizeZ = (size - errorSize.meanLog) / errorSize.sdLog;
      const logitZ = (logit - persistence.meanLogit) / persistence.sdLogit;
      value -= 0.5 * (sizeZ * sizeZ + logitZ * logitZ);
      if (gradient) {
        gradient[SIZE + i] = error.logSize - sizeZ / errorSize.sdLog;
        gradient[PERSISTENCE + i] = error.logitPersistence - logitZ / persistence.sdLogit;
      }
    }
    if (!(value > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
    if (gradient) trajectory.pullBack(errors[0].level, errors[1].level, gradient);
    return value;
  };

  const fillDraw = (q: Float64Array, stream: RandomStream, out: Float64Array, offset: number): boolean => {
    if (!trajectory.run(q)) return false;
    const last = months - 1;
    for (let j = 0; j < SIZE; j++) out[offset + j] = Math.exp(q[j]);
    for (let i = 0; i < 2; i++) {
      const logLevel = i === 0 ? trajectory.logLevel1 : trajectory.logLevel2;
      const size = Math.sqrt(Math.exp(2 * q[SIZE + i]) + floors[i] * floors[i]);
      const phi = 1 / (1 + Math.exp(-q[PERSISTENCE + i]));
      out[offset + 8 + i] = Math.exp(logLevel[last]);
      out[offset + 10 + i] = size;
      out[offset + 12 + i] = phi;
      out[offset + 14 + i] = drawLastError(firms[i], logLevel, last, size, phi, stream);
    }
    return true;
  };

  const place: Posterior['place'] = (theta, guesses) => {
    const q = new Float64Array(DIMENSION);
    q.set(theta);
    guesses.forEach((guess, i) => {
      q[SIZE + i] = logSizeBeyondFloor(guess.size, floors[i]);
      const phi = Math.max(guess.persistence, SMALLEST_FIRST_PERSISTENCE);
      q[PERSISTENCE + i] = Math.log(phi / (1 - phi));
    });
    return q;
  };

  /** Expected information of a stationary autoregression (Hamilton 1994, section 5.2), for ln size and logit phi. */
  const addInformation: Posterior['addInformation'] = (q, information) => {
    const add = (j: number, value: number) => {
      information[j * (DIMENSION + 1)] += value;
    };
    firms.forEach((firm, i) => {
      const count = firm.months.length;
      const phi = 1 / (1 + Math.exp(-q[PERSISTENCE + i]));
      add(SIZE + i, 2 * count + errorSize.sdLog ** -2);
      add(
        PERSISTENCE + i,
        (count * phi * phi * (1 + phi * phi)) / (1 + phi) ** 2 + persistence.sdLogit ** -2,
      );
    });
  };

  const fillPath: Posterior['fillPath'] = (q, _, out) => {
    if (!trajectory.run(q)) return false;
    out.set(trajectory.logLevel1, 0);
    out.set(trajectory.logLevel2, months);
    return true;
  };

  return {
    dimension: DIMENSION,
    observations,
    priors,
    segments: [0],
    errors: [SIZE, SIZE + 1, PERSISTENCE, PERSISTENCE + 1],
    columns: AR1_COLUMNS,
    breakMonth: null,
    get evaluations() {
      return evaluations;
    },
    get steps() {
      return trajectory.steps;
    },
    logDensity,
    place,
    addInformation,
    fillDraw,
    fillPath,
  };
}

/** ln size such that floor^2 + size^2 is the guess squared; a guess at the floor starts a little above it. */
export function logSizeBeyondFloor(guess: number, floor: number): number {
  const above = Math.max(guess, ABOVE_FLOOR * floor);
  return Math.log(above * above - floor * floor) / 2;
}

/** The error in the last month of the grid: known when that month is observed, else drawn given the last one that is. */
function drawLastError(
  firm: FirmObservations,
  logLevel: Float64Array,
  last: number,
  size: number,
  phi: number,
  stream: RandomStream,
): number {
  const at = firm.months.length - 1;
  const month = firm.months[at];
  const carried = phi ** (last - month);
  const known = carried * (firm.logCounts[at] - logLevel[month]);
  return month === last ? known : known + size * Math.sqrt(1 - carried * carried) * stream.normal();
}
