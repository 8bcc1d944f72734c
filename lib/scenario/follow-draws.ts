/**
 * Every draw followed month by month under pushes, with the same shocks whatever is pushed (common random numbers): the one place in
 * which scenarios and answers get their paths from.
 */
import { ForcedIntegrator } from '../dynamics/forced-trajectory';
import type { Forcing } from '../dynamics/forcing';
import type { CompetitionSystem, State } from '../dynamics/system';
import type { DrawSet } from '../estimate/types';
import { shareOf } from '../forecast/bands';
import { drawShockFactors, readScenarioDraws } from './scenario-draws';

/** Underlying levels per future month and draw: month h (1 ..) of draw i at (h - 1) count + i. Share is the focal firm's. */
export interface Levels {
  focal: Float64Array;
  rival: Float64Array;
  share: Float64Array;
}

export class FollowedDraws {
  readonly count: number;
  readonly systems: readonly CompetitionSystem[];
  /** Users in the last observed month. */
  readonly starts: readonly State[];
  /** Null when the error model has no process noise. */
  readonly shocks: Float64Array | null;

  constructor(
    draws: DrawSet,
    /** How far they can be followed. */
    readonly months: number,
    seed: number,
  ) {
    const ready = readScenarioDraws(draws);
    this.count = ready.count;
    this.systems = ready.systems;
    this.starts = ready.starts;
    this.shocks = drawShockFactors(draws, months, seed);
  }

  createLevels(): Levels {
    return createLevels(this.months * this.count);
  }

  fillLevels(forcing: Forcing, out: Levels): void {
    for (let i = 0; i < this.count; i++) this.fillDraw(forcing, i, this.months, out);
  }

  /** Months 1 .. months of draw i. A draw that cannot be followed on stays where it is, with and without pushes. */
  fillDraw(forcing: Forcing, i: number, months: number, out: Levels): void {
    const { count } = this;
    const path = new ForcedIntegrator(this.systems[i]!, this.starts[i]!, forcing);
    let [n1, n2] = this.starts[i]!;
    let isFollowed = true;
    for (let h = 0; h < months; h++) {
      isFollowed = isFollowed && this.advance(path, i, h);
      if (isFollowed) {
        n1 = path.users1;
        n2 = path.users2;
      }
      const at = h * count + i;
      out.focal[at] = n1;
      out.rival[at] = n2;
      out.share[at] = shareOf(n1, n2);
    }
  }

  /** Moves the path of draw i from month h to the next, shock included; false when it cannot be followed. */
  advance(path: ForcedIntegrator, i: number, h: number): boolean {
    if (path.advanceFrom(h) !== 'complete') return false;
    if (this.shocks) {
      const at = 2 * (h * this.count + i);
      path.users1 *= this.shocks[at]!;
      path.users2 *= this.shocks[at + 1]!;
    }
    return true;
  }
}

export function createLevels(length: number): Levels {
  return {
    focal: new Float64Array(length),
    rival: new Float64Array(length),
    share: new Float64Array(length),
  };
}
