/**
 * Mixtures of log-normal distributions: moments of the logarithm and quantiles. What the prior of every reported parameter is.
 */
import { normalCdf } from '../numeric/normal';
import type { LogNormalPrior } from './types';

export interface MixturePart extends LogNormalPrior {
  /** Share of the mixture; the shares add to 1. */
  weight: number;
}

/** Variance of the logarithm. */
export function varianceOfLog(parts: readonly MixturePart[]): number {
  const mean = parts.reduce((sum, part) => sum + part.weight * part.meanLog, 0);
  return parts.reduce((sum, part) => sum + part.weight * (part.sdLog ** 2 + (part.meanLog - mean) ** 2), 0);
}

/** Halvings of the bracket: to the last digit of a logarithm. */
const HALVINGS = 60;
/** The bracket reaches so many sd beyond every part. */
const REACH = 10;

/** The value below which a share p of the distribution lies, by bisection on the logarithm. */
export function mixtureQuantile(parts: readonly MixturePart[], p: number): number {
  let low = Math.min(...parts.map((part) => part.meanLog - REACH * part.sdLog));
  let high = Math.max(...parts.map((part) => part.meanLog + REACH * part.sdLog));
  for (let i = 0; i < HALVINGS; i++) {
    const middle = (low + high) / 2;
    const below = parts.reduce(
      (sum, part) => sum + part.weight * normalCdf((middle - part.meanLog) / part.sdLog),
      0,
    );
    if (below < p) low = middle;
    else high = middle;
  }
  return Math.exp((low + high) / 2);
}
