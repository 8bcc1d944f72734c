/** What a scenario does in one answer: destination or path, how far at its worst, and when it is over. */

import type { Push } from '../dynamics/push';
import { DECIDED_ABOVE } from '../forecast/odds';
import type { EffectReason, ScenarioEffect } from './comparison';

/** Who is left changes in fewer draws than this: the destination stays. */
export const STAYS_BELOW = 0.01;
/** Who is left changes in more draws than this: the destination moves. */
export const MOVES_ABOVE = DECIDED_ABOVE;
/** Half a point of share. */
export const HALF_POINT = 0.005;

export function isLastingPush(push: Push): boolean {
  return push.size > 0 && push.lengthMonths === null;
}

export function nameDestinationEffect(probabilityMoves: number): ScenarioEffect['destination'] {
  if (probabilityMoves < STAYS_BELOW) return 'stays';
  return probabilityMoves > MOVES_ABOVE ? 'moves' : 'may-move';
}

export function findReason(
  pushes: readonly Push[],
  probabilityMoves: number,
  headStartChance: number,
): EffectReason {
  if (pushes.every((push) => push.size === 0)) return 'no-push';
  const crosses = probabilityMoves >= STAYS_BELOW;
  if (pushes.some(isLastingPush)) return crosses ? 'lasting-crosses' : 'lasting-same-outcome';
  if (crosses) return 'temporary-crosses';
  return headStartChance < STAYS_BELOW ? 'temporary-fades' : 'temporary-same-side';
}

/** Month (from 0) in which the median difference is largest in size; the first of equals. */
export function findWorstMonth(medians: ArrayLike<number>): number {
  let worst = 0;
  for (let h = 1; h < medians.length; h++) if (Math.abs(medians[h]!) > Math.abs(medians[worst]!)) worst = h;
  return worst;
}

/**
 * First month after `worst` (both from 0) from which the median difference stays within half a point to the end of what was looked at;
 * null when it does not come back, or never left.
 */
export function findReturnMonth(medians: ArrayLike<number>, worst: number): number | null {
  if (Math.abs(medians[worst]!) <= HALF_POINT) return null;
  let month = medians.length;
  while (month - 1 > worst && Math.abs(medians[month - 1]!) <= HALF_POINT) month--;
  return month < medians.length ? month : null;
}
