/**
 * Fit of the competitive growth system with competition coefficients of either sign, negative ones being help:
 *
 *   ln N_i(t; phi) - ln count_i(t), made independent with persistent errors of given size and persistence, and one row per prior
 *   phi = (ln r1, ln r2, ln K1, ln K2, alpha, beta, ln N1(start), ln N2(start));   alpha, beta ~ N(0, 1), the rest as in `priors.ts`
 *
 * Half the sum of squares is minus the log posterior density of phi. Derivatives by central differences: the path is cheap.
 */
import { createMonthFlow } from '../../dynamics/month-flow';
import type { FirmObservations, Observations } from '../../estimate/observations';
import { INDEX, PARAMETERS } from '../../estimate/parameters';
import type { ErrorGuess } from '../../estimate/penalised-problem';
import type { Priors } from '../../estimate/priors';
import type { LeastSquaresProblem } from '../../numeric/least-squares-problem';

/** sd of the prior of a signed coefficient around 0: help is as likely as harm. */
export const SIGNED_PRIOR_SD = 1;

const COUNT = PARAMETERS.length;
const DIFFERENCE = 1e-5;

export interface SignedProblem extends LeastSquaresProblem {
  /** ln level minus ln count at the last point evaluated, per firm in the order of its observed months. */
  readonly errors: readonly [Float64Array, Float64Array];
}

export function createSignedProblem(
  observations: Observations,
  priors: Priors,
  guesses: readonly [ErrorGuess, ErrorGuess],
): SignedProblem {
  const { months, firms } = observations;
  const flow = createMonthFlow(1);
  const logLevels = [new Float64Array(months), new Float64Array(months)] as const;
  const errors = [
    new Float64Array(firms[0].months.length),
    new Float64Array(firms[1].months.length),
  ] as const;
  const residualCount = errors[0].length + errors[1].length + COUNT;
  const means = PARAMETERS.map(({ id }, j) => (isCoefficient(j) ? 0 : priors.parameters[id].meanLog));
  const sds = PARAMETERS.map(({ id }, j) =>
    isCoefficient(j) ? SIGNED_PRIOR_SD : priors.parameters[id].sdLog,
  );
  const above = new Float64Array(residualCount);
  const below = new Float64Array(residualCount);

  const followPath = (phi: Float64Array): boolean => {
    const { state } = flow;
    flow.setParameters(Math.exp(phi[0]), Math.exp(phi[1]), phi[4], phi[5]);
    state.fill(0);
    for (let t = 0; t < months; t++) {
      for (let i = 0; i < 2; i++) if (firms[i].entry === t) state[i] = Math.exp(phi[6 + i] - phi[2 + i]);
      for (let i = 0; i < 2; i++) {
        const exit = firms[i].exit ?? months;
        if (t === exit) state[i] = 0;
        logLevels[i][t] = Math.log(state[i]) + phi[2 + i];
        if (t >= firms[i].entry && t < exit && !Number.isFinite(logLevels[i][t])) return false;
      }
      if (t < months - 1 && !flow.advance(0)) return false;
    }
    return true;
  };

  const fillResiduals = (phi: Float64Array, residuals: Float64Array): boolean => {
    if (!followPath(phi)) return false;
    let row = 0;
    for (let i = 0; i < 2; i++) {
      whiten(firms[i], logLevels[i], guesses[i], errors[i], residuals, row);
      row += errors[i].length;
    }
    for (let j = 0; j < COUNT; j++) residuals[row + j] = (phi[j] - means[j]) / sds[j];
    return residuals.every(Number.isFinite);
  };

  /** By central differences. @returns false where a neighbour cannot be followed */
  const fillJacobian = (phi: Float64Array, jacobian: Float64Array): boolean => {
    const at = phi.slice();
    for (let j = 0; j < COUNT; j++) {
      at[j] = phi[j] + DIFFERENCE;
      if (!fillResiduals(at, above)) return false;
      at[j] = phi[j] - DIFFERENCE;
      if (!fillResiduals(at, below)) return false;
      at[j] = phi[j];
      for (let row = 0; row < residualCount; row++) {
        jacobian[row * COUNT + j] = (above[row] - below[row]) / (2 * DIFFERENCE);
      }
    }
    return true;
  };

  return {
    parameterCount: COUNT,
    residualCount,
    errors,
    evaluate: (phi, residuals, jacobian) =>
      (jacobian === null || fillJacobian(phi, jacobian)) && fillResiduals(phi, residuals),
  };
}

function isCoefficient(j: number): boolean {
  return j === INDEX.alpha || j === INDEX.beta;
}

/** Errors and their independent parts: (e_k - rho e_{k-1}) / (s sqrt(1 - rho^2)), rho = persistence^gap; the first e_1 / s. */
function whiten(
  { months, logCounts }: FirmObservations,
  logLevel: Float64Array,
  { size, persistence }: ErrorGuess,
  errors: Float64Array,
  residuals: Float64Array,
  row: number,
): void {
  for (let k = 0; k < errors.length; k++) {
    errors[k] = logLevel[months[k]] - logCounts[k];
    const rho = k === 0 ? 0 : persistence ** (months[k] - months[k - 1]);
    const carried = k === 0 ? 0 : rho * errors[k - 1];
    residuals[row + k] = (errors[k] - carried) / (size * Math.sqrt(1 - rho * rho));
  }
}
