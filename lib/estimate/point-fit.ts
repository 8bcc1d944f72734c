/**
 * The best single point and every mode worth starting a chain from: penalised least squares from many starts.
 *
 * 1. Every start, with a first guess of the errors, to a loose tolerance: one row each for the report.
 * 2. Distinct ends, best first: errors guessed again from the residuals, then polished to a tight tolerance.
 * 3. The best of them once more under the part of the prior without competition: a mode the starts may miss.
 */
import { type DescentEnd, descend } from '../numeric/damped-descent';
import { columnNorms, conditionNumber, factorise } from '../numeric/linear';
import type { Observations } from './observations';
import { PARAMETERS } from './parameters';
import {
  type CompetitionPart,
  createPenalisedProblem,
  type ErrorGuess,
  guessError,
  refineError,
} from './penalised-problem';
import type { Priors } from './priors';
import type { Start } from './starts';

export interface StartResult {
  origin: Start['origin'];
  /** Penalised objective, null when no finite value was found. */
  value: number | null;
  iterations: number;
  stopped: string;
  theta: Float64Array;
}

export interface Mode {
  theta: Float64Array;
  errors: readonly [ErrorGuess, ErrorGuess];
  /** Penalised objective under this mode's own errors. */
  value: number;
  /** Of the penalised residuals, prior rows included; rows x 8. */
  jacobian: Float64Array;
  evaluations: number;
}

type Pair = readonly [ErrorGuess, ErrorGuess];

/** First pass: a value to 1e-6 of itself tells the basins apart; the polish follows. */
const FIRST_PASS = { gradientTolerance: 1e-3, maxEvaluations: 80 };
const SECOND_PASS = { gradientTolerance: 1e-6, maxEvaluations: 200 };
/** Rounds of guessing the errors again. */
const ERROR_ROUNDS = 2;

/** Ends whose objectives differ by less are the same mode. */
export const SAME_VALUE = 0.02;

/** Fits one start with the first guess of the errors. */
export function fitStart(observations: Observations, priors: Priors, start: Start): StartResult {
  const guesses = firstGuesses(observations);
  const fit = descend(
    createPenalisedProblem(observations, priors, guesses, 'competition'),
    start.theta,
    FIRST_PASS,
  );
  return {
    origin: start.origin,
    value: Number.isFinite(fit.cost) ? fit.cost : null,
    iterations: fit.iterations,
    stopped: fit.status,
    theta: fit.theta,
  };
}

/** Polishes an end with errors guessed from its residuals; null when it is not finite. */
export function polishMode(
  observations: Observations,
  priors: Priors,
  floors: readonly [number, number],
  theta: Float64Array,
  part: CompetitionPart,
): Mode | null {
  let guesses: Pair = firstGuesses(observations);
  let point = theta;
  let fit: DescentEnd | null = null;
  let evaluations = 0;
  for (let round = 0; round < ERROR_ROUNDS; round++) {
    guesses = refineGuesses(observations, priors, guesses, floors, point);
    const problem = createPenalisedProblem(observations, priors, guesses, part);
    fit = descend(problem, point, SECOND_PASS);
    evaluations += fit.evaluations;
    if (!Number.isFinite(fit.cost)) return null;
    point = fit.theta;
  }
  return {
    theta: point,
    errors: guesses,
    value: fit!.cost,
    jacobian: fit!.jacobian,
    evaluations,
  };
}

/** Starts that ended in different places, best first, at most `limit`. */
export function distinctEnds(results: readonly StartResult[], limit: number): StartResult[] {
  const usable = results.filter((result) => result.value !== null).sort((a, b) => a.value! - b.value!);
  const distinct: StartResult[] = [];
  for (const result of usable) {
    if (distinct.length === limit) break;
    if (distinct.every((other) => result.value! - other.value! > SAME_VALUE)) distinct.push(result);
  }
  return distinct;
}

function firstGuesses(observations: Observations): Pair {
  return [guessError(observations.firms[0]), guessError(observations.firms[1])];
}

function refineGuesses(
  observations: Observations,
  priors: Priors,
  guesses: Pair,
  floors: readonly [number, number],
  theta: Float64Array,
): Pair {
  const problem = createPenalisedProblem(observations, priors, guesses, 'competition');
  const residuals = new Float64Array(problem.residualCount);
  if (!problem.evaluate(theta, residuals, null)) return guesses;
  const refine = (i: 0 | 1) => refineError(observations.firms[i], problem.errors[i], guesses[i], floors[i]);
  return [refine(0), refine(1)];
}

/** J'J of a mode over the log parameters, 8 x 8 row-major. */
export function fitInformation({ jacobian }: Mode): Float64Array {
  const p = PARAMETERS.length;
  const information = new Float64Array(p * p);
  for (let row = 0; row < jacobian.length; row += p) {
    for (let i = 0; i < p; i++) {
      for (let j = 0; j < p; j++) information[i * p + j] += jacobian[row + i] * jacobian[row + j];
    }
  }
  return information;
}

/** Condition number of a mode's Jacobian with its columns scaled to norm 1; Infinity when a direction is flat. */
export function measureConditioning({ jacobian }: Mode): number {
  const n = PARAMETERS.length;
  const m = jacobian.length / n;
  const scale = columnNorms(jacobian, m, n).map((norm) => norm || 1);
  return conditionNumber(factorise(jacobian, new Float64Array(m), scale));
}
