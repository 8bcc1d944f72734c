/** Counts over draws: odds of the outcomes, who is left, and how fast the market returns to its destination. */
import { findEquilibria } from '../dynamics/equilibria';
import { halfLifeOfReturn } from '../dynamics/half-life';
import type { CompetitionSystem } from '../dynamics/system';
import { intervalOf } from '../forecast/interval';
import { computeOdds } from '../forecast/odds';
import type { Interval, Odds } from '../forecast/report';
import type { Destinations } from './comparison';
import type { Destination, Survivors } from './settle';

export function tallyOdds(systems: readonly CompetitionSystem[]): Odds {
  return computeOdds(
    Float64Array.from(systems, ({ alpha }) => alpha),
    Float64Array.from(systems, ({ beta }) => beta),
  );
}

export function tallyDestinations(found: Destination[]): Destinations {
  const chance = (survivors: Survivors) =>
    found.filter((one) => one.survivors === survivors).length / found.length;
  return { shared: chance('shared'), focalAlone: chance('focalAlone'), rivalAlone: chance('rivalAlone') };
}

const PLACES = { shared: 'shared', focalAlone: 'firstAlone', rivalAlone: 'secondAlone' } as const;

/** Half-life of return at the destination, months, over the draws that have one; null when none has. */
export function measureReturn(
  systems: readonly CompetitionSystem[],
  destinations: readonly Destination[],
): Interval | null {
  const halfLives = systems.flatMap((system, i) => {
    const place = PLACES[destinations[i]!.survivors];
    const rest = findEquilibria(system).find((one) => one.place === place);
    const halfLife = rest ? halfLifeOfReturn(rest) : null;
    return halfLife === null ? [] : [halfLife];
  });
  return halfLives.length > 0 ? intervalOf(halfLives) : null;
}
