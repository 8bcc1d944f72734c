/**
 * What is believed before the data speak. Weak on purpose, and stated so that it can be shown and edited.
 *
 *   ln r ~ N(ln 0.15, 0.8)      ln K ~ N(ln(largest count) + 0.5, 0.9)      ln N(start) ~ N(ln(first count), 1)
 *   (ln alpha, ln beta): with weight 1 - w both N(0, 0.8), so that each outcome starts at 25 %;
 *                        with weight w both N(ln 0.1, 1): hardly any competition. Without that part independent growth is nearly
 *                        excluded. Its centre is where it is so that the two parts touch and a sampler can pass between them.
 *   ln(error size) ~ N(ln 0.04, 1)      ln(process noise) ~ N(ln 0.005, 1.2)      logit(persistence) ~ N(-0.5, 1.2)
 * An estimate of the addressable market takes the place of the prior of K: ln K ~ N(ln users, ln(1 + relative error)). The rest can be set too
 * (`PriorSettings`). All from the method of the project; r, K and the coefficients are "common practice" ranges of monthly user counts.
 */
import { normalCdf } from '../numeric/normal';
import type { RandomStream } from '../numeric/random';
import type { Observations } from './observations';
import { INDEX, PARAMETERS } from './parameters';
import type { FitOptions, LogNormalPrior, ParameterId, PriorSettings } from './types';

export interface Priors {
  parameters: Readonly<Record<ParameterId, LogNormalPrior>>;
  /** The part of the prior of alpha and beta (both at once) that stands for hardly any competition. */
  noCompetition: LogNormalPrior & { weight: number };
  /** sd of the error of ln users, beyond the smallest error allowed. */
  errorSize: LogNormalPrior;
  /** sd of the process noise, ln users per root month. */
  processNoise: LogNormalPrior;
  /** Month-to-month correlation of the errors, on the logit scale. */
  persistence: { meanLogit: number; sdLogit: number };
}

const GROWTH: LogNormalPrior = { meanLog: Math.log(0.15), sdLog: 0.8 };
const SATURATION_ABOVE_LARGEST = 0.5;
const SATURATION_SD = 0.9;
const COMPETITION: LogNormalPrior = { meanLog: 0, sdLog: 0.8 };
const NO_COMPETITION = { weight: 0.2, meanLog: Math.log(0.1), sdLog: 1 };
const START_SD = 1;
const ERROR_SIZE: LogNormalPrior = { meanLog: Math.log(0.04), sdLog: 1 };
const PROCESS_NOISE: LogNormalPrior = { meanLog: Math.log(0.005), sdLog: 1.2 };
const PERSISTENCE = { meanLogit: -0.5, sdLogit: 1.2 };

/** The settings where nobody says otherwise. */
export const USUAL_PRIORS: Readonly<PriorSettings> = {
  growth: GROWTH,
  saturation: { meanLog: SATURATION_ABOVE_LARGEST, sdLog: SATURATION_SD },
  alpha: COMPETITION,
  beta: COMPETITION,
  noCompetition: NO_COMPETITION.weight,
};

export function buildPriors(
  observations: Observations,
  { priors: settings = USUAL_PRIORS, addressable }: Pick<FitOptions, 'priors' | 'addressable'> = {},
): Priors {
  const [focal, rival] = observations.firms;
  const saturation = (logCounts: Float64Array, room: number | null | undefined): LogNormalPrior =>
    room
      ? { meanLog: Math.log(room), sdLog: Math.log1p(addressable!.relativeError) }
      : {
          meanLog: logCounts.reduce((a, b) => Math.max(a, b)) + settings.saturation.meanLog,
          sdLog: settings.saturation.sdLog,
        };
  return {
    parameters: {
      r1: settings.growth,
      r2: settings.growth,
      k1: saturation(focal.logCounts, addressable?.focal),
      k2: saturation(rival.logCounts, addressable?.rival),
      alpha: settings.alpha,
      beta: settings.beta,
      n1Start: { meanLog: focal.logCounts[0], sdLog: START_SD },
      n2Start: { meanLog: rival.logCounts[0], sdLog: START_SD },
    },
    noCompetition: { ...NO_COMPETITION, weight: settings.noCompetition },
    errorSize: ERROR_SIZE,
    processNoise: PROCESS_NOISE,
    persistence: PERSISTENCE,
  };
}

/** Adds the gradient of the log prior density of the eight log parameters to `gradient` (unless null) and returns the density, up to a constant. */
export type LogPrior = (theta: Float64Array, gradient: Float64Array | null) => number;

export function createLogPrior(priors: Priors): LogPrior {
  const count = PARAMETERS.length;
  const mean = Float64Array.from(PARAMETERS, ({ id }) => priors.parameters[id].meanLog);
  const precision = Float64Array.from(PARAMETERS, ({ id }) => priors.parameters[id].sdLog ** -2);
  const { weight, meanLog, sdLog } = priors.noCompetition;
  const nonePrecision = sdLog ** -2;
  const { alpha: iAlpha, beta: iBeta } = INDEX;
  const logWeight = Math.log1p(-weight) + Math.log(precision[iAlpha] * precision[iBeta]) / 2;
  const logNoneWeight = Math.log(weight) + Math.log(nonePrecision);

  return (theta, gradient) => {
    let value = 0;
    for (let j = 0; j < count; j++) {
      if (j === iAlpha || j === iBeta) continue;
      const distance = theta[j] - mean[j];
      value -= 0.5 * precision[j] * distance * distance;
      if (gradient) gradient[j] -= precision[j] * distance;
    }
    const a = theta[iAlpha] - mean[iAlpha];
    const b = theta[iBeta] - mean[iBeta];
    const noneA = theta[iAlpha] - meanLog;
    const noneB = theta[iBeta] - meanLog;
    const logSome = logWeight - 0.5 * (precision[iAlpha] * a * a + precision[iBeta] * b * b);
    const logNone = logNoneWeight - 0.5 * nonePrecision * (noneA * noneA + noneB * noneB);
    const larger = Math.max(logSome, logNone);
    const some = Math.exp(logSome - larger);
    const none = Math.exp(logNone - larger);
    value += larger + Math.log(some + none);
    if (gradient) {
      const share = some / (some + none);
      gradient[iAlpha] -= share * precision[iAlpha] * a + (1 - share) * nonePrecision * noneA;
      gradient[iBeta] -= share * precision[iBeta] * b + (1 - share) * nonePrecision * noneB;
    }
    return value;
  };
}

/** Fills `out` (8) with one draw of the log parameters from the prior. */
export function drawFromPrior(priors: Priors, stream: RandomStream, out: Float64Array): void {
  const isNone = stream.uniform() < priors.noCompetition.weight;
  for (let j = 0; j < PARAMETERS.length; j++) {
    const isCoefficient = j === INDEX.alpha || j === INDEX.beta;
    const prior = isNone && isCoefficient ? priors.noCompetition : priors.parameters[PARAMETERS[j].id];
    out[j] = prior.meanLog + prior.sdLog * stream.normal();
  }
}

/** Prior chance that alpha < 1 and that beta < 1, jointly: the four cells of the odds, exact. */
export function computePriorCells(priors: Priors): {
  bothBelow: number;
  alphaBelow: number;
  betaBelow: number;
  bothAbove: number;
} {
  const { weight } = priors.noCompetition;
  const below = (prior: LogNormalPrior) => normalCdf(-prior.meanLog / prior.sdLog);
  const someAlpha = below(priors.parameters.alpha);
  const someBeta = below(priors.parameters.beta);
  const none = below(priors.noCompetition);
  const mix = (some: number, ofNone: number) => (1 - weight) * some + weight * ofNone;
  return {
    bothBelow: mix(someAlpha * someBeta, none * none),
    alphaBelow: mix(someAlpha * (1 - someBeta), none * (1 - none)),
    betaBelow: mix((1 - someAlpha) * someBeta, none * (1 - none)),
    bothAbove: mix((1 - someAlpha) * (1 - someBeta), (1 - none) * (1 - none)),
  };
}
