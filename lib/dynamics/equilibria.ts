/**
 * The points where both firms stop growing, with the eigenvalues of the Jacobian per month (Murray, Mathematical Biology I, 3.5):
 *
 *   point      exists                          eigenvalues
 *   (0, 0)     always                          r1, r2
 *   (K1, 0)    always                          -r1, r2 (1 - beta)
 *   (0, K2)    always                          -r2, r1 (1 - alpha)
 *   shared     alpha, beta both < 1 or both > 1
 *              x = (1 - alpha)/(1 - alpha beta), y = (1 - beta)/(1 - alpha beta), N = (K1 x, K2 y)
 *              [-(p + q) -+ sqrt((p - q)^2 + 4 p q alpha beta)]/2,   p = r1 x, q = r2 y: always real
 *
 * There are no closed orbits (Dulac function 1/(N1 N2)), so every market ends at one of the sinks.
 */
import { isOnBoundary } from './outcome';
import { assertSystem, type CompetitionSystem, type State } from './system';

type EquilibriumPlace = 'empty' | 'firstAlone' | 'secondAlone' | 'shared';
type EquilibriumKind = 'source' | 'saddle' | 'sink' | 'non-hyperbolic';

export interface Equilibrium {
  place: EquilibriumPlace;
  /** Users of both firms. */
  point: State;
  /** Per month, the smaller first. */
  eigenvalues: readonly [number, number];
  kind: EquilibriumKind;
}

/**
 * Every equilibrium with no negative users: empty, firstAlone, secondAlone, then shared where it exists. With alpha = beta = 1 a whole
 * line of points stands still; its two ends are listed, as non-hyperbolic.
 * @throws RangeError when a parameter is out of its range
 */
export function findEquilibria(system: CompetitionSystem): Equilibrium[] {
  assertSystem(system);
  const { r1, r2, k1, k2, alpha, beta } = system;
  const found: Equilibrium[] = [
    { place: 'empty', point: [0, 0], eigenvalues: sortPair(r1, r2), kind: 'source' },
    {
      place: 'firstAlone',
      point: [k1, 0],
      eigenvalues: sortPair(-r1, r2 * (1 - beta)),
      kind: kindWhenAlone(beta),
    },
    {
      place: 'secondAlone',
      point: [0, k2],
      eigenvalues: sortPair(-r2, r1 * (1 - alpha)),
      kind: kindWhenAlone(alpha),
    },
  ];
  const shared = findSharedEquilibrium(system);
  if (shared) found.push(shared);
  return found;
}

/** The equilibrium with both firms in it, or null where there is none. */
export function findSharedEquilibrium(system: CompetitionSystem): Equilibrium | null {
  const { r1, r2, k1, k2, alpha, beta } = system;
  if (isOnBoundary(alpha) || isOnBoundary(beta) || alpha < 1 !== beta < 1) return null;
  const determinant = 1 - alpha * beta;
  const x = (1 - alpha) / determinant;
  const y = (1 - beta) / determinant;
  return {
    place: 'shared',
    point: [k1 * x, k2 * y],
    eigenvalues: sharedEigenvalues(r1 * x, r2 * y, alpha * beta),
    kind: alpha < 1 ? 'sink' : 'saddle',
  };
}

/** The firm that is there alone is safe from the newcomer when its pressure on it, the coefficient, is above 1. */
function kindWhenAlone(pressureOnNewcomer: number): EquilibriumKind {
  if (isOnBoundary(pressureOnNewcomer)) return 'non-hyperbolic';
  return pressureOnNewcomer > 1 ? 'sink' : 'saddle';
}

/** The second root comes from the product of the two, pq (1 - alpha beta), so that it does not suffer from cancellation. */
function sharedEigenvalues(p: number, q: number, alphaBeta: number): readonly [number, number] {
  const fast = -(p + q + Math.sqrt((p - q) ** 2 + 4 * p * q * alphaBeta)) / 2;
  return sortPair(fast, (p * q * (1 - alphaBeta)) / fast);
}

function sortPair(a: number, b: number): readonly [number, number] {
  return a <= b ? [a, b] : [b, a];
}
