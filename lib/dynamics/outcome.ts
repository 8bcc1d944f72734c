/**
 * Where the market must end up, from the two competition coefficients alone (Murray, Mathematical Biology I, section 3.5):
 *
 *   alpha < 1, beta < 1   coexistence            alpha < 1 < beta   exclusion by firm 1
 *   alpha > 1, beta > 1   head start decides     beta < 1 < alpha   exclusion by firm 2
 *
 * On alpha = 1 or beta = 1 an equilibrium is non-hyperbolic and the linear test says nothing: 'boundary', never a guess.
 * The growth rates change the speed and, when the head start decides, the separatrix, but never this answer.
 */
import { assertSystem, type CompetitionSystem } from './system';

export type Outcome =
  | 'coexistence'
  | 'exclusionByFirst'
  | 'exclusionBySecond'
  | 'headStartDecides'
  | 'boundary';

/**
 * A competition coefficient this close to 1 is on the boundary. The eigenvalue that decides is r (1 - alpha): at 1e-9 its
 * time scale is a thousand million months, and rounding in alpha = r2 b12/(r1 b22) is far smaller.
 */
export const BOUNDARY_TOLERANCE = 1e-9;

/** Whether a competition coefficient is on the boundary between two outcomes. */
export function isOnBoundary(coefficient: number): boolean {
  return !(Math.abs(coefficient - 1) > BOUNDARY_TOLERANCE);
}

/** @throws RangeError when a parameter is out of its range */
export function classifyOutcome(system: CompetitionSystem): Outcome {
  assertSystem(system);
  const { alpha, beta } = system;
  if (isOnBoundary(alpha) || isOnBoundary(beta)) return 'boundary';
  if (alpha < 1) return beta < 1 ? 'coexistence' : 'exclusionByFirst';
  return beta < 1 ? 'exclusionBySecond' : 'headStartDecides';
}
