/**
 * What monthly counts tell about the eight log parameters near a point: the Fisher information of independent lognormal errors,
 *
 *   J = d ln N_i(t) / d theta / s_i,   covariance = (J'J)^-1          (errors of ln counts with sd s_i, theta the log parameters)
 *
 * from which standard errors of any function g follow by the delta method, se(g)^2 = grad' (J'J)^-1 grad.
 */

import { createTrajectory, type TrajectoryGrid } from '../../dynamics/trajectory';
import { PARAMETERS } from '../../estimate/parameters';
import { columnNorms, type Factorisation, factorise, inverseNormalMatrix } from '../../numeric/linear';

const COUNT = PARAMETERS.length;

export interface ObservedMonths extends TrajectoryGrid {
  /** Month indices with a count, per firm. */
  observed: readonly [ArrayLike<number>, ArrayLike<number>];
}

/** Rows of J for the observed months, firm 1 first; null where the path cannot be followed. */
export function fillInformationRows(
  theta: Float64Array,
  months: ObservedMonths,
  errorSizes: readonly [number, number],
): Float64Array | null {
  const trajectory = createTrajectory(months);
  const sensitivities = new Float64Array(2 * months.months * COUNT);
  if (!trajectory.fillSensitivities(theta, sensitivities)) return null;
  const rows = months.observed[0].length + months.observed[1].length;
  const jacobian = new Float64Array(rows * COUNT);
  let to = 0;
  for (let firm = 0; firm < 2; firm++) {
    for (const month of Array.from(months.observed[firm])) {
      const from = (firm * months.months + month) * COUNT;
      for (let j = 0; j < COUNT; j++) jacobian[to++] = sensitivities[from + j] / errorSizes[firm];
    }
  }
  return jacobian.every(Number.isFinite) ? jacobian : null;
}

/** Factor of J with columns of unit length; null when a parameter has no effect on any count. */
export function factoriseInformation(jacobian: Float64Array): Factorisation | null {
  const rows = jacobian.length / COUNT;
  const norms = columnNorms(jacobian, rows, COUNT);
  if (!norms.every((norm) => norm > 0)) return null;
  return factorise(jacobian, new Float64Array(rows), norms);
}

/**
 * Standard error of a function of the log parameters with this gradient.
 * @returns null where the information is singular
 */
export function standardErrorOf(factor: Factorisation, gradient: ArrayLike<number>): number | null {
  if (factor.rank < COUNT) return null;
  const covariance = inverseNormalMatrix(factor);
  let sum = 0;
  for (let i = 0; i < COUNT; i++) {
    for (let j = 0; j < COUNT; j++) sum += gradient[i] * covariance[i * COUNT + j] * gradient[j];
  }
  return Math.sqrt(sum);
}
