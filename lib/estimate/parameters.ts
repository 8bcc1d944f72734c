/**
 * The estimated parameters as people read them, in the order in which every vector of the estimation holds their logarithms:
 * ln r1, ln r2, ln K1, ln K2, ln alpha, ln beta, ln N1(start), ln N2(start).
 */
import type { ParameterId } from './types';

export interface ParameterInfo {
  id: ParameterId;
  /** The symbol of the field. */
  symbol: string;
  unit: 'per month' | 'users' | 'none';
  /** One clause, no numbers. */
  meaning: string;
}

export const PARAMETERS: readonly ParameterInfo[] = [
  {
    id: 'r1',
    symbol: 'r₁',
    unit: 'per month',
    meaning: 'growth rate of the focal firm while small and alone',
  },
  { id: 'r2', symbol: 'r₂', unit: 'per month', meaning: 'growth rate of the rival while small and alone' },
  { id: 'k1', symbol: 'K₁', unit: 'users', meaning: 'saturation level of the focal firm when alone' },
  { id: 'k2', symbol: 'K₂', unit: 'users', meaning: 'saturation level of the rival when alone' },
  {
    id: 'alpha',
    symbol: 'α',
    unit: 'none',
    meaning: 'share of the focal firm’s room that the rival takes when full',
  },
  {
    id: 'beta',
    symbol: 'β',
    unit: 'none',
    meaning: 'share of the rival’s room that the focal firm takes when full',
  },
  {
    id: 'n1Start',
    symbol: 'N₁(0)',
    unit: 'users',
    meaning: 'users of the focal firm in its first observed month',
  },
  {
    id: 'n2Start',
    symbol: 'N₂(0)',
    unit: 'users',
    meaning: 'users of the rival in its first observed month',
  },
];

/** Positions in a log-parameter vector. */
export const INDEX: Readonly<Record<ParameterId, number>> = {
  r1: 0,
  r2: 1,
  k1: 2,
  k2: 3,
  alpha: 4,
  beta: 5,
  n1Start: 6,
  n2Start: 7,
};
