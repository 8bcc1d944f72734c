/**
 * Single draws with and without pushes as paths in the plane of both firms' users, for the phase map. Shocks are left out: a crossing is
 * one of the market's own dynamics, and so is told as the destination is.
 */
import { fillForcedTrajectory } from '../dynamics/forced-trajectory';
import { createForcing } from '../dynamics/forcing';
import { applyLastingPushes } from '../dynamics/lasting-push';
import type { Push } from '../dynamics/push';
import type { CompetitionSystem, State } from '../dynamics/system';
import { outcomeOf } from '../forecast/odds';
import { describeSettling, findDestination } from './settle';

export interface PushedPath {
  /** The head start decides, with and without the pushes. */
  isHeadStart: boolean;
  /** It does, and the pushes carry the market to the other side of the separatrix. */
  hasCrossed: boolean;
  /** Users [focal, rival] in months 0 .. `months`; shorter where the path cannot be followed. */
  baseline: State[];
  pushed: State[];
}

export function tracePushedPath(
  system: CompetitionSystem,
  start: State,
  pushes: readonly Push[],
  months: number,
): PushedPath {
  const lasting = applyLastingPushes(system, pushes);
  const isHeadStart = decidesByHeadStart(system) && decidesByHeadStart(lasting);
  return {
    isHeadStart,
    hasCrossed: isHeadStart && endsElsewhere(system, lasting, start, pushes),
    baseline: tracePath(system, start, [], months),
    pushed: tracePath(system, start, pushes, months),
  };
}

export function decidesByHeadStart({ alpha, beta }: CompetitionSystem): boolean {
  return outcomeOf(alpha, beta) === 'headStartDecides';
}

function endsElsewhere(
  system: CompetitionSystem,
  lasting: CompetitionSystem,
  start: State,
  pushes: readonly Push[],
): boolean {
  const from = { month: 0, state: start };
  const before = findDestination(system, system, from, describeSettling([], createForcing([])));
  const after = findDestination(system, lasting, from, describeSettling(pushes, createForcing(pushes)));
  return before.survivors !== after.survivors;
}

function tracePath(
  system: CompetitionSystem,
  start: State,
  pushes: readonly Push[],
  months: number,
): State[] {
  const out = new Float64Array(2 * (months + 1));
  fillForcedTrajectory(system, start, createForcing(pushes), months, out);
  const path: State[] = [];
  for (let month = 0; month <= months && !Number.isNaN(out[2 * month]!); month++) {
    path.push([out[2 * month]!, out[2 * month + 1]!]);
  }
  return path;
}
