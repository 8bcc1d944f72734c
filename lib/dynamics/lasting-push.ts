/**
 * What a lasting push at full strength u makes of the system. In the crowding form dN_i/dt = N_i (r_i - b_ii N_i - b_ij N_j),
 * with K_i = r_i/b_ii, alpha = r2 b12/(r1 b22), beta = r1 b21/(r2 b11), a push of firm 1 gives
 *
 *   growth lift  r1 (1 + u)     r1 x (1 + u), K1 x (1 + u), alpha / (1 + u), beta x (1 + u)
 *   pull         b21 (1 + u)    beta x (1 + u)
 *   room         b11 / (1 + u)  K1 x (1 + u), beta x (1 + u)
 *   recruits     + u            no coefficient changes; while it lasts the levels move and the firm cannot reach zero
 *
 * and of firm 2 the same with the firms exchanged. A push that ends leaves the system as it was.
 */
import { assertPush } from './forcing';
import type { Push } from './push';
import { type CompetitionSystem, swapFirms } from './system';

/** The system in force once every lasting push is at full strength; pushes with an end and recruits change nothing here. */
export function applyLastingPushes(system: CompetitionSystem, pushes: readonly Push[]): CompetitionSystem {
  return pushes.reduce((changed, push) => applyLastingPush(changed, push), system);
}

/** @throws RangeError when the push has a negative or non-finite number */
export function applyLastingPush(system: CompetitionSystem, push: Push): CompetitionSystem {
  assertPush(push);
  if (push.lengthMonths !== null) return system;
  if (push.firm === 2) return swapFirms(applyToFirst(swapFirms(system), push));
  return applyToFirst(system, push);
}

function applyToFirst(system: CompetitionSystem, push: Push): CompetitionSystem {
  const factor = 1 + push.size;
  switch (push.kind) {
    case 'growth-lift':
      return {
        ...system,
        r1: system.r1 * factor,
        k1: system.k1 * factor,
        alpha: system.alpha / factor,
        beta: system.beta * factor,
      };
    case 'pull':
      return { ...system, beta: system.beta * factor };
    case 'room':
      return { ...system, k1: system.k1 * factor, beta: system.beta * factor };
    case 'recruits':
      return system;
  }
}
