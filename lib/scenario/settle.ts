/**
 * Where a draw ends under pushes, and who is left there.
 *
 * Without lasting recruits the destination follows from the system in force once every lasting push is at full strength: the shared
 * equilibrium when alpha, beta < 1; (K1, 0) or (0, K2) when one of them is above 1; with both above 1 the side of the separatrix on which
 * the market stands when the temporary pushes have faded. The side is told by going forward: once one firm grows while the other
 * shrinks it stays so for ever (a competitive system of two is monotone), lasting recruits or not.
 * Lasting recruits keep a firm above zero, so then the path is followed until it rests.
 */

import { ForcedIntegrator } from '../dynamics/forced-trajectory';
import type { Forcing } from '../dynamics/forcing';
import type { Push } from '../dynamics/push';
import { type CompetitionSystem, fillGrowth, type State } from '../dynamics/system';
import { outcomeOf } from '../forecast/odds';

export type Survivors = 'shared' | 'focalAlone' | 'rivalAlone';

export interface Destination {
  survivors: Survivors;
  /** Users of both firms there. */
  n1: number;
  n2: number;
}

/** Half-lives after which a carry-over is spent: 2^-12 of the push is left. */
const SPENT_HALF_LIVES = 12;
/** A path that has not left the separatrix by then is given to the firm that is further from the shared equilibrium. */
const MAX_MONTHS = 1200;
/** The market rests when a month changes neither firm by more than this share of its saturation level. */
const REST_PER_MONTH = 1e-6;

export interface SettlingPushes {
  /** The draw's system once every lasting push is at full strength. */
  forcing: Forcing;
  /** Users per month that arrive for ever, per firm. */
  lastingRecruits: readonly [number, number];
  /** Month from which only lasting pushes, at full strength, are in force. */
  steadyFrom: number;
}

export function describeSettling(pushes: readonly Push[], forcing: Forcing): SettlingPushes {
  const active = pushes.filter((push) => push.size > 0);
  const recruits = (firm: 1 | 2) =>
    active
      .filter((push) => push.firm === firm && push.kind === 'recruits' && push.lengthMonths === null)
      .reduce((sum, push) => sum + push.size, 0);
  return {
    forcing,
    lastingRecruits: [recruits(1), recruits(2)],
    steadyFrom: Math.ceil(Math.max(0, ...active.map(steadyMonth))),
  };
}

function steadyMonth(push: Push): number {
  if (push.lengthMonths === null) return push.startMonth + push.rampMonths;
  return push.startMonth + push.lengthMonths + SPENT_HALF_LIVES * push.carryOverHalfLifeMonths;
}

/** A state of the pushed market and the whole month in which it is reached. */
export interface MonthState {
  month: number;
  state: State;
}

/**
 * @param system without pushes
 * @param lasting the same with every lasting push at full strength
 * @param from any month of the pushed path; the later, the less is left to follow
 */
export function findDestination(
  system: CompetitionSystem,
  lasting: CompetitionSystem,
  from: MonthState,
  settling: SettlingPushes,
): Destination {
  const outcome = outcomeOf(lasting.alpha, lasting.beta);
  const [u1, u2] = settling.lastingRecruits;
  if (u1 > 0 || u2 > 0) return followToRest(system, lasting, from, settling);
  if (outcome === 'coexistence') return sharedDestination(lasting);
  if (outcome !== 'headStartDecides') return aloneDestination(lasting, outcome === 'exclusionByFocal');
  return aloneDestination(lasting, isFocalAhead(system, lasting, from, settling));
}

function sharedDestination({ k1, k2, alpha, beta }: CompetitionSystem): Destination {
  const determinant = 1 - alpha * beta;
  return {
    survivors: 'shared',
    n1: (k1 * (1 - alpha)) / determinant,
    n2: (k2 * (1 - beta)) / determinant,
  };
}

function aloneDestination({ k1, k2 }: CompetitionSystem, isFocal: boolean): Destination {
  return isFocal ? { survivors: 'focalAlone', n1: k1, n2: 0 } : { survivors: 'rivalAlone', n1: 0, n2: k2 };
}

const growth = new Float64Array(2);
const state = new Float64Array(2);

/** Which firm wins a market that the head start decides; there are no lasting recruits. */
function isFocalAhead(
  system: CompetitionSystem,
  lasting: CompetitionSystem,
  from: MonthState,
  { forcing, steadyFrom }: SettlingPushes,
): boolean {
  const path = new ForcedIntegrator(system, from.state, forcing);
  for (let { month } = from; month < MAX_MONTHS; month++) {
    if (month >= steadyFrom) {
      state[0] = path.users1;
      state[1] = path.users2;
      fillGrowth(lasting, state, growth);
      if (growth[0]! > 0 && growth[1]! < 0) return true;
      if (growth[0]! < 0 && growth[1]! > 0) return false;
    }
    if (path.advanceFrom(month) !== 'complete') break;
  }
  const shared = sharedDestination(lasting);
  return path.users1 / shared.n1 > path.users2 / shared.n2;
}

/** The state in which a market with lasting recruits rests; who is left is told by the coefficients, or by who is fuller. */
function followToRest(
  system: CompetitionSystem,
  lasting: CompetitionSystem,
  from: MonthState,
  { forcing, lastingRecruits, steadyFrom }: SettlingPushes,
): Destination {
  const path = new ForcedIntegrator(system, from.state, forcing);
  for (let { month } = from; month < MAX_MONTHS; month++) {
    if (month >= steadyFrom && isAtRest(lasting, path, lastingRecruits)) break;
    if (path.advanceFrom(month) !== 'complete') break;
  }
  return { survivors: survivorsWithRecruits(lasting, path), n1: path.users1, n2: path.users2 };
}

function isAtRest(
  system: CompetitionSystem,
  path: ForcedIntegrator,
  [u1, u2]: readonly [number, number],
): boolean {
  state[0] = path.users1;
  state[1] = path.users2;
  fillGrowth(system, state, growth);
  return (
    Math.abs(growth[0]! + u1) <= REST_PER_MONTH * system.k1 &&
    Math.abs(growth[1]! + u2) <= REST_PER_MONTH * system.k2
  );
}

function survivorsWithRecruits(system: CompetitionSystem, path: ForcedIntegrator): Survivors {
  const outcome = outcomeOf(system.alpha, system.beta);
  if (outcome === 'coexistence') return 'shared';
  if (outcome === 'headStartDecides') {
    return path.users1 / system.k1 > path.users2 / system.k2 ? 'focalAlone' : 'rivalAlone';
  }
  return outcome === 'exclusionByFocal' ? 'focalAlone' : 'rivalAlone';
}
