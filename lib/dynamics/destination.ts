/**
 * Where one market ends up from one state: the sink its path runs into. There are no closed orbits, so every path ends at an equilibrium.
 */
import { type Equilibrium, findEquilibria } from './equilibria';
import { classifyOutcome } from './outcome';
import { sideOfSeparatrix } from './separatrix';
import type { CompetitionSystem, State } from './system';

/**
 * The equilibrium that the path from `state` approaches. A firm with no users stays without. Null where the linear test cannot tell
 * (outcome 'boundary' with both firms present) and on the separatrix itself.
 * @throws RangeError when a parameter or the state is out of its range
 */
export function findDestination(system: CompetitionSystem, state: State): Equilibrium | null {
  if (!(state[0] >= 0 && state[1] >= 0 && state[0] + state[1] < Number.POSITIVE_INFINITY)) {
    throw new RangeError(`findDestination: state must be finite and not negative, got ${state}`);
  }
  const [empty, firstAlone, secondAlone, shared] = findEquilibria(system);
  if (state[0] === 0) return state[1] === 0 ? empty : secondAlone;
  if (state[1] === 0) return firstAlone;
  switch (classifyOutcome(system)) {
    case 'coexistence':
      return shared;
    case 'exclusionByFirst':
      return firstAlone;
    case 'exclusionBySecond':
      return secondAlone;
    case 'headStartDecides': {
      const side = sideOfSeparatrix(system, state);
      if (side === 'onSeparatrix') return null;
      return side === 'firstWins' ? firstAlone : secondAlone;
    }
    case 'boundary':
      return null;
  }
}
