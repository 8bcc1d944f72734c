/**
 * The posterior of the eight log parameters, for given errors, as a least-squares problem.
 *
 * Residuals: for each firm the errors e_k = ln level - ln count made independent, (e_k - rho_k e_{k-1}) / (s sqrt(1 - rho_k^2)), the
 * first one e_1 / s; then one pseudo-residual (theta_j - mean_j) / sd_j per parameter for its prior. Half their sum of squares is the
 * penalised objective.
 */
import { createTrajectory } from '../dynamics/trajectory';
import type { LeastSquaresProblem } from '../numeric/least-squares-problem';
import { type FirmObservations, gridOf, type Observations } from './observations';
import { INDEX, PARAMETERS } from './parameters';
import type { Priors } from './priors';

/** Error of one firm: sd of ln users, month-to-month correlation. */
export interface ErrorGuess {
  size: number;
  persistence: number;
}

/** Which part of the prior of the competition coefficients holds. */
export type CompetitionPart = 'competition' | 'no-competition';

const COUNT = PARAMETERS.length;

export interface PenalisedProblem extends LeastSquaresProblem {
  /** ln level minus ln count at the last point evaluated, per firm in the order of its observed months. */
  readonly errors: readonly [Float64Array, Float64Array];
}

export function createPenalisedProblem(
  observations: Observations,
  priors: Priors,
  guesses: readonly [ErrorGuess, ErrorGuess],
  part: CompetitionPart,
): PenalisedProblem {
  const { months, firms } = observations;
  const trajectory = createTrajectory(gridOf(observations));
  const sensitivities = new Float64Array(2 * months * COUNT);
  const errors = [
    new Float64Array(firms[0].months.length),
    new Float64Array(firms[1].months.length),
  ] as const;
  const priorOf = (j: number) => {
    const isCoefficient = j === INDEX.alpha || j === INDEX.beta;
    return isCoefficient && part === 'no-competition'
      ? priors.noCompetition
      : priors.parameters[PARAMETERS[j].id];
  };
  const means = Float64Array.from(PARAMETERS, (_, j) => priorOf(j).meanLog);
  const sds = Float64Array.from(PARAMETERS, (_, j) => priorOf(j).sdLog);
  const whitening = firms.map((firm, i) => createWhitening(firm, guesses[i]));
  const counted = firms[0].months.length + firms[1].months.length;

  const evaluate = (theta: Float64Array, residuals: Float64Array, jacobian: Float64Array | null): boolean => {
    const isFollowed = jacobian ? trajectory.fillSensitivities(theta, sensitivities) : trajectory.run(theta);
    if (!isFollowed) return false;
    let row = 0;
    for (let i = 0; i < 2; i++) {
      const logLevel = i === 0 ? trajectory.logLevel1 : trajectory.logLevel2;
      fillErrors(firms[i], logLevel, errors[i]);
      whiten(errors[i], whitening[i], residuals, row);
      if (jacobian) whitenRows(firms[i], sensitivities, i * months, whitening[i], jacobian, row);
      row += firms[i].months.length;
    }
    for (let j = 0; j < COUNT; j++) residuals[row + j] = (theta[j] - means[j]) / sds[j];
    if (jacobian) {
      jacobian.fill(0, row * COUNT);
      for (let j = 0; j < COUNT; j++) jacobian[(row + j) * COUNT + j] = 1 / sds[j];
    }
    for (let k = 0; k < residuals.length; k++) if (!Number.isFinite(residuals[k])) return false;
    return true;
  };

  return { parameterCount: COUNT, residualCount: counted + COUNT, evaluate, errors };
}

function fillErrors(firm: FirmObservations, logLevel: Float64Array, errors: Float64Array): void {
  for (let k = 0; k < errors.length; k++) errors[k] = logLevel[firm.months[k]] - firm.logCounts[k];
}

/** How errors of a firm are made independent: share of the error before that is taken off, and what the rest is multiplied by. */
interface Whitening {
  carried: Float64Array;
  scale: Float64Array;
}

function createWhitening({ months }: FirmObservations, { size, persistence }: ErrorGuess): Whitening {
  const carried = Float64Array.from(months, (month, k) =>
    k === 0 ? 0 : persistence ** (month - months[k - 1]),
  );
  return { carried, scale: carried.map((rho) => 1 / (size * Math.sqrt(1 - rho * rho))) };
}

function whiten(
  errors: Float64Array,
  { carried, scale }: Whitening,
  residuals: Float64Array,
  row: number,
): void {
  residuals[row] = errors[0] * scale[0];
  for (let k = 1; k < errors.length; k++) {
    residuals[row + k] = (errors[k] - carried[k] * errors[k - 1]) * scale[k];
  }
}

function whitenRows(
  { months }: FirmObservations,
  sensitivities: Float64Array,
  firstMonth: number,
  { carried, scale }: Whitening,
  jacobian: Float64Array,
  row: number,
): void {
  for (let k = 0; k < months.length; k++) {
    const to = (row + k) * COUNT;
    const from = (firstMonth + months[k]) * COUNT;
    const before = k === 0 ? from : (firstMonth + months[k - 1]) * COUNT;
    for (let j = 0; j < COUNT; j++) {
      jacobian[to + j] = (sensitivities[from + j] - carried[k] * sensitivities[before + j]) * scale[k];
    }
  }
}

/** Fewest second differences for a guess from them. */
const MIN_DIFFERENCES = 3;
const SIZE_WITHOUT_DATA = 0.05;
const SMALLEST_SIZE = 0.01;
const LARGEST_SIZE = 0.5;

/**
 * Error size before any fit: median |second difference| of ln counts, which a smooth path leaves near 0. For independent normal
 * errors it is 0.6745 sqrt(6) s.
 */
export function guessError(firm: FirmObservations): ErrorGuess {
  const sizes: number[] = [];
  const { months, logCounts } = firm;
  for (let k = 2; k < months.length; k++) {
    if (months[k] - months[k - 2] !== 2) continue;
    sizes.push(Math.abs(logCounts[k] - 2 * logCounts[k - 1] + logCounts[k - 2]));
  }
  if (sizes.length < MIN_DIFFERENCES) return { size: SIZE_WITHOUT_DATA, persistence: 0 };
  sizes.sort((a, b) => a - b);
  const size = sizes[sizes.length >> 1] / (0.6745 * Math.sqrt(6));
  return { size: Math.min(Math.max(size, SMALLEST_SIZE), LARGEST_SIZE), persistence: 0 };
}

const LARGEST_PERSISTENCE = 0.9;
/** Pseudo-observations of the size guess: keeps a firm with few counts near it. */
const GUESS_WEIGHT = 2;

/** Error size and persistence from the errors of a fit: their root mean square and lag-1 correlation. */
export function refineError(
  firm: FirmObservations,
  errors: Float64Array,
  before: ErrorGuess,
  floor: number,
): ErrorGuess {
  let squares = GUESS_WEIGHT * before.size * before.size;
  let products = 0;
  let pairs = 0;
  for (let k = 0; k < errors.length; k++) {
    squares += errors[k] * errors[k];
    if (k > 0 && firm.months[k] - firm.months[k - 1] === 1) {
      products += errors[k] * errors[k - 1];
      pairs++;
    }
  }
  const variance = squares / (errors.length + GUESS_WEIGHT);
  const correlation = pairs > 0 ? products / pairs / variance : 0;
  return {
    size: Math.max(Math.sqrt(variance), floor),
    persistence: Math.min(Math.max(correlation, 0), LARGEST_PERSISTENCE),
  };
}
