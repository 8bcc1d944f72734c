/**
 * Half-life of return: months until half of a small disturbance around a sink has gone, ln 2 / |slowest eigenvalue|.
 * The slowest eigenvalue rules the late part of the return; a large disturbance may move faster or slower at first.
 */
import type { Equilibrium } from './equilibria';

/** Months, or null where nothing returns (the equilibrium is not a sink). */
export function halfLifeOfReturn(equilibrium: Equilibrium): number | null {
  if (equilibrium.kind !== 'sink') return null;
  const slowest = Math.min(...equilibrium.eigenvalues.map(Math.abs));
  return Math.LN2 / slowest;
}
