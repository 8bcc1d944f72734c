/**
 * The odds of the four outcomes: shares of draws in the four quarters of the (alpha, beta) plane, and of the prior.
 */
import { computePriorCells, type Priors } from '../estimate/priors';
import { OUTCOMES, type Outcome } from './outcomes';
import type { Odds } from './report';

/** An outcome is called decided when its odds pass this ("likely" on the IPCC scale); below it the data do not decide yet. */
export const DECIDED_ABOVE = 0.66;

/** alpha = 1 or beta = 1 exactly has no chance among draws; it counts with the side above. */
export function outcomeOf(alpha: number, beta: number): Outcome {
  if (alpha < 1) return beta < 1 ? 'coexistence' : 'exclusionByFocal';
  return beta < 1 ? 'exclusionByRival' : 'headStartDecides';
}

export function computeOdds(alpha: Float64Array, beta: Float64Array): Odds {
  const odds: Odds = { coexistence: 0, exclusionByFocal: 0, exclusionByRival: 0, headStartDecides: 0 };
  for (let i = 0; i < alpha.length; i++) odds[outcomeOf(alpha[i], beta[i])] += 1;
  for (const outcome of OUTCOMES) odds[outcome] /= alpha.length;
  return odds;
}

export function computePriorOdds(priors: Priors): Odds {
  const cells = computePriorCells(priors);
  return {
    coexistence: cells.bothBelow,
    exclusionByFocal: cells.alphaBelow,
    exclusionByRival: cells.betaBelow,
    headStartDecides: cells.bothAbove,
  };
}

/** The outcome that passes DECIDED_ABOVE, or null. */
export function decideOutcome(odds: Odds): Outcome | null {
  return OUTCOMES.find((outcome) => odds[outcome] > DECIDED_ABOVE) ?? null;
}
