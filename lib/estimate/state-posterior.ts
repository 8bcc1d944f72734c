/**
 * The posterior of the state-space model: the log state wanders from the path and is observed with independent errors
 * (`kalman-filter.ts`); optionally with a yearly cycle (`season.ts`) and one break from which all rates and levels may differ.
 *
 * q = (eight log parameters, ln total of the noise of firm 1 and 2, logit share of process noise in it of firm 1 and 2,
 *      six log parameters after the break, seasonal coefficients of firm 1, of firm 2); the last two where the model has them.
 * observation sd^2 = floor^2 + size^2 (ln users), noise in ln users per root month, each log parameter after the break
 * ~ N(the one before, JUMP_SD). What the counts show is how much their second differences vary, 6 size^2 + 2 noise^2, and less of how it
 * splits: total^2 = 3 size^2 + noise^2 and share = noise^2 / total^2 make a box of what is an L in (ln size, ln noise), with a constant
 * change of volume.
 */
import type { RandomStream } from '../numeric/random';
import { logSizeBeyondFloor, SMALLEST_ERROR } from './ar1-posterior';
import {
  createKalmanFilter,
  type FilterGradient,
  type FilterInput,
  orImpossible,
  SEASON_MONTHS,
} from './kalman-filter';
import type { Observations } from './observations';
import { PARAMETERS } from './parameters';
import type { Posterior } from './posterior';
import { createLogPrior, type Priors } from './priors';
import { createSeasonBasis, type Harmonics } from './season';
import { sampleStatePath } from './state-path';
import type { FitOptions } from './types';

export interface StateModel {
  harmonics: Harmonics;
  hasBreak: boolean;
}

/** Columns of every draw of the state-space model; `breakMonth` is -1 without a break. */
export const STATE_COLUMNS = [
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
  'breakMonth',
] as const;

/** sd of the jump of a log parameter at a break: a factor of 1.6 either way is nothing special (common practice). */
const JUMP_SD = 0.5;

/** Months that each segment must have at least: fewer say nothing about its parameters. */
export const SEGMENT_MONTHS = 4;

const TOTAL = PARAMETERS.length;
const SHARE = TOTAL + 2;
const AFTER = SHARE + 2;
/** size^2 counts this much in the total. */
const SIZE_WEIGHT = 3;
const SEGMENT = 6;
/** Rough information of one month on a seasonal coefficient of unit prior sd, and of data and prior on a logit share. */
const SEASON_INFORMATION = 3;
const SHARE_INFORMATION = 0.5;

export interface StatePosterior extends Posterior {
  readonly model: StateModel;
  /** 1 where the count of a month is flagged, firm-major. */
  readonly flags: Uint8Array;
}

export function createStatePosterior(
  observations: Observations,
  priors: Priors,
  measurementFloor: FitOptions['measurementFloor'],
  model: StateModel,
): StatePosterior {
  const { months } = observations;
  const filter = createKalmanFilter(observations);
  const logPrior = createLogPrior(priors);
  const floors = [measurementFloor.focal, measurementFloor.rival].map((floor) =>
    Math.max(floor, SMALLEST_ERROR),
  );
  const basis = createSeasonBasis(model.harmonics);
  const season = AFTER + (model.hasBreak ? SEGMENT : 0);
  const dimension = season + 2 * basis.length;
  const input: FilterInput = {
    theta: new Float64Array(PARAMETERS.length),
    after: model.hasBreak ? new Float64Array(SEGMENT) : null,
    breakMonth: months,
    observation: new Float64Array(2),
    process: new Float64Array(2),
    season: basis.length > 0 ? new Float64Array(2 * SEASON_MONTHS) : null,
  };
  const slopes: FilterGradient = {
    theta: new Float64Array(PARAMETERS.length),
    after: new Float64Array(SEGMENT),
    observation: new Float64Array(2),
    process: new Float64Array(2),
    season: new Float64Array(2 * SEASON_MONTHS),
  };
  const sizeSquared = new Float64Array(2);
  const shares = new Float64Array(2);
  /** Slopes with respect to ln size and ln noise of one firm, carried over to ln total and logit share. */
  const addNoiseSlopes = (i: number, bySize: number, byNoise: number, gradient: Float64Array) => {
    gradient[TOTAL + i] += bySize + byNoise;
    gradient[SHARE + i] += 0.5 * ((1 - shares[i]) * byNoise - shares[i] * bySize);
  };
  let evaluations = 0;

  const readInput = (q: Float64Array) => {
    for (let j = 0; j < TOTAL; j++) input.theta[j] = q[j];
    for (let i = 0; i < 2; i++) {
      const share = 1 / (1 + Math.exp(-q[SHARE + i]));
      const total = Math.exp(2 * q[TOTAL + i]);
      sizeSquared[i] = (total * (1 - share)) / SIZE_WEIGHT;
      shares[i] = share;
      input.observation[i] = sizeSquared[i] + floors[i] * floors[i];
      input.process[i] = total * share;
    }
    if (input.after) for (let j = 0; j < SEGMENT; j++) input.after[j] = q[AFTER + j];
    if (input.season) fillSeason(q, input.season);
  };

  const fillSeason = (q: Float64Array, offsets: Float64Array) => {
    offsets.fill(0);
    for (let i = 0; i < 2; i++) {
      for (let k = 0; k < basis.length; k++) {
        const coefficient = q[season + i * basis.length + k];
        const wave = basis[k];
        for (let m = 0; m < SEASON_MONTHS; m++) offsets[i * SEASON_MONTHS + m] += coefficient * wave[m];
      }
    }
  };

  const addNormal = (
    at: number,
    mean: number,
    sd: number,
    q: Float64Array,
    gradient: Float64Array | null,
  ): number => {
    const z = (q[at] - mean) / sd;
    if (gradient) gradient[at] -= z / sd;
    return logNormalDensity(z, sd);
  };

  /** Log prior of everything beyond the eight log parameters. */
  const addFurtherPriors = (q: Float64Array, gradient: Float64Array | null): number => {
    const { errorSize, processNoise } = priors;
    let value = 0;
    for (let i = 0; i < 2; i++) {
      const sizeZ = (Math.log(sizeSquared[i]) / 2 - errorSize.meanLog) / errorSize.sdLog;
      const noiseZ = (Math.log(input.process[i]) / 2 - processNoise.meanLog) / processNoise.sdLog;
      value += logNormalDensity(sizeZ, errorSize.sdLog) + logNormalDensity(noiseZ, processNoise.sdLog);
      if (gradient) addNoiseSlopes(i, -sizeZ / errorSize.sdLog, -noiseZ / processNoise.sdLog, gradient);
    }
    for (let j = 0; input.after && j < SEGMENT; j++) {
      value += addNormal(AFTER + j, q[j], JUMP_SD, q, gradient);
      if (gradient) gradient[j] += (q[AFTER + j] - q[j]) / (JUMP_SD * JUMP_SD);
    }
    for (let j = season; j < dimension; j++) value += addNormal(j, 0, 1, q, gradient);
    return value;
  };

  const addLikelihoodGradient = (gradient: Float64Array) => {
    slopes.theta.fill(0);
    slopes.after.fill(0);
    slopes.observation.fill(0);
    slopes.process.fill(0);
    slopes.season.fill(0);
    filter.sweepBack(input, slopes);
    for (let j = 0; j < TOTAL; j++) gradient[j] += slopes.theta[j];
    for (let i = 0; i < 2; i++) {
      addNoiseSlopes(
        i,
        2 * sizeSquared[i] * slopes.observation[i],
        2 * input.process[i] * slopes.process[i],
        gradient,
      );
    }
    for (let j = 0; input.after && j < SEGMENT; j++) gradient[AFTER + j] += slopes.after[j];
    for (let i = 0; i < 2; i++) {
      for (let k = 0; k < basis.length; k++) {
        let sum = 0;
        for (let m = 0; m < SEASON_MONTHS; m++) sum += basis[k][m] * slopes.season[i * SEASON_MONTHS + m];
        gradient[season + i * basis.length + k] += sum;
      }
    }
  };

  const logDensity = (q: Float64Array, gradient: Float64Array | null): number => {
    evaluations++;
    gradient?.fill(0);
    readInput(q);
    const likelihood = filter.run(input);
    if (!(likelihood > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
    const prior = logPrior(q, gradient) + addFurtherPriors(q, gradient);
    if (gradient) addLikelihoodGradient(gradient);
    return orImpossible(likelihood + prior);
  };

  /** Persistent residuals of the path are mostly process noise: the observation error starts with the independent share. */
  const place: Posterior['place'] = (theta, guesses) => {
    const q = new Float64Array(dimension);
    q.set(theta);
    guesses.forEach((guess, i) => {
      const logSize = logSizeBeyondFloor(guess.size * Math.sqrt(1 - guess.persistence), floors[i]);
      const logNoise = priors.processNoise.meanLog;
      q[TOTAL + i] = Math.log(SIZE_WEIGHT * Math.exp(2 * logSize) + Math.exp(2 * logNoise)) / 2;
      q[SHARE + i] = 2 * (logNoise - logSize) - Math.log(SIZE_WEIGHT);
    });
    for (let j = 0; model.hasBreak && j < SEGMENT; j++) q[AFTER + j] = theta[j];
    return q;
  };

  const addInformation: Posterior['addInformation'] = (_, information) => {
    const n = dimension;
    const add = (i: number, j: number, value: number) => {
      information[i * n + j] += value;
    };
    for (let i = 0; i < 2; i++) {
      add(TOTAL + i, TOTAL + i, observations.firms[i].months.length + priors.errorSize.sdLog ** -2);
      add(SHARE + i, SHARE + i, SHARE_INFORMATION);
    }
    if (model.hasBreak) splitInformation(information, n, 1 - input.breakMonth / months);
    for (let j = season; j < n; j++) add(j, j, 1 + SEASON_INFORMATION * months);
  };

  const fillDraw = (q: Float64Array, stream: RandomStream, out: Float64Array, offset: number): boolean => {
    readInput(q);
    if (!(filter.run(input) > Number.NEGATIVE_INFINITY)) return false;
    for (let j = 0; j < TOTAL; j++) out[offset + j] = Math.exp(q[j]);
    for (let j = 0; input.after && j < SEGMENT; j++) out[offset + j] = Math.exp(q[AFTER + j]);
    const [p11, p12, p22] = filter.covariance;
    const slope = p11 > 0 ? p12 / p11 : 0;
    const deviation = Math.sqrt(Math.max(p11, 0)) * stream.normal();
    const rest = Math.sqrt(Math.max(p22 - slope * p12, 0)) * stream.normal();
    out[offset + 8] = Math.exp(filter.mean[0] + deviation);
    out[offset + 9] = Math.exp(filter.mean[1] + slope * deviation + rest);
    for (let i = 0; i < 2; i++) {
      if (observations.firms[i].exit !== undefined) out[offset + 8 + i] = 0;
      out[offset + 10 + i] = Math.sqrt(input.observation[i]);
      out[offset + 12 + i] = Math.sqrt(input.process[i]);
    }
    out[offset + 14] = model.hasBreak ? input.breakMonth : -1;
    for (let k = 0; input.season && k < 2 * SEASON_MONTHS; k++) {
      const firm = k < SEASON_MONTHS ? 0 : 1;
      out[offset + STATE_COLUMNS.length + k] =
        input.season[firm * SEASON_MONTHS + ((months + k) % SEASON_MONTHS)];
    }
    return true;
  };

  const fillPath = (q: Float64Array, stream: RandomStream, out: Float64Array): boolean => {
    readInput(q);
    if (!(filter.run(input) > Number.NEGATIVE_INFINITY)) return false;
    sampleStatePath(filter.history, months, stream, out);
    return true;
  };

  return {
    model,
    dimension,
    observations,
    priors,
    segments: model.hasBreak ? [0, AFTER] : [0],
    errors: [TOTAL, TOTAL + 1, SHARE, SHARE + 1],
    columns: model.harmonics === 0 ? STATE_COLUMNS : [...STATE_COLUMNS, ...seasonColumns()],
    flags: filter.flags,
    get evaluations() {
      return evaluations;
    },
    get steps() {
      return filter.steps;
    },
    get breakMonth() {
      return model.hasBreak ? input.breakMonth : null;
    },
    set breakMonth(month) {
      input.breakMonth = month ?? months;
    },
    logDensity,
    place,
    addInformation,
    fillDraw,
    fillPath,
  };
}

/**
 * Shares the information about the parameters of one segment out between the segments before and after a break, by their months, and
 * ties the two by the prior of the jump. The scaling is a congruence, so the matrix stays positive definite.
 */
function splitInformation(information: Float64Array, n: number, shareAfter: number): void {
  const tie = JUMP_SD ** -2;
  const scale = Math.sqrt(1 - shareAfter);
  for (let i = 0; i < SEGMENT; i++) {
    for (let j = 0; j < SEGMENT; j++)
      information[(AFTER + i) * n + AFTER + j] = shareAfter * information[i * n + j];
  }
  for (let i = 0; i < SEGMENT; i++) {
    for (let j = 0; j < n; j++) {
      information[i * n + j] *= scale;
      information[j * n + i] *= scale;
    }
  }
  for (let j = 0; j < SEGMENT; j++) {
    information[j * n + j] += tie;
    information[(AFTER + j) * n + AFTER + j] += tie;
    information[j * n + AFTER + j] -= tie;
    information[(AFTER + j) * n + j] -= tie;
  }
}

/** Columns of the seasonal offsets of ln counts: firm, then month ahead of the last one, 1 to 12, repeating. */
export function seasonColumn(firm: 1 | 2, monthAhead: number): string {
  return `season${firm}m${((monthAhead - 1) % SEASON_MONTHS) + 1}`;
}

function seasonColumns(): string[] {
  const ahead = Array.from({ length: SEASON_MONTHS }, (_, k) => k + 1);
  return ([1, 2] as const).flatMap((firm) => ahead.map((month) => seasonColumn(firm, month)));
}

const HALF_LOG_TWO_PI = Math.log(2 * Math.PI) / 2;

function logNormalDensity(z: number, sd: number): number {
  return -0.5 * z * z - Math.log(sd) - HALF_LOG_TWO_PI;
}
