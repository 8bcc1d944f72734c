/**
 * A market's draws made ready to answer pushes while a slider moves: the path of every draw without a push, its counts and its
 * destination are worked out once; `compare` follows every draw under the pushes with the same code and the same random numbers, so a push
 * of size 0 gives the baseline to the last digit.
 */
import { ForcedIntegrator } from '../dynamics/forced-trajectory';
import { createForcing, type Forcing } from '../dynamics/forcing';
import { applyLastingPushes } from '../dynamics/lasting-push';
import type { Push } from '../dynamics/push';
import type { CompetitionSystem, State } from '../dynamics/system';
import type { DrawSet } from '../estimate/types';
import { shareOf } from '../forecast/bands';
import { intervalOf } from '../forecast/interval';
import type { Bands, Interval, Odds } from '../forecast/report';
import type { Checkpoint, ScenarioBands, ScenarioComparison, ScenarioEffect } from './comparison';
import { findReason, findReturnMonth, findWorstMonth, isLastingPush, nameDestinationEffect } from './effect';
import { BandMaker } from './scenario-bands';
import {
  drawErrorFactors,
  drawShockFactors,
  REPLICATES,
  readScenarioDraws,
  type ScenarioDraws,
} from './scenario-draws';
import { type Destination, describeSettling, findDestination, type SettlingPushes } from './settle';
import { measureReturn, tallyDestinations, tallyOdds } from './tally';

export interface ScenarioOptions {
  /** How far the bands reach, months after the last observed one. */
  horizonMonths: number;
  seed: number;
}

export interface PreparedScenario {
  readonly horizonMonths: number;
  readonly draws: number;
  compare(pushes: readonly Push[]): ScenarioComparison;
}

/** Months ahead at which the difference is told in numbers. */
const CHECKPOINTS = [6, 12, 24];
/** How far the return of the difference is followed, even beyond the horizon. */
const LOOK_AHEAD_MONTHS = 60;

/** Levels per future month and draw, month-major; share is the focal firm's. */
interface Levels {
  focal: Float64Array;
  rival: Float64Array;
  share: Float64Array;
}

/**
 * @throws RangeError when there is no draw or the horizon is no positive integer
 */
export function prepareScenario(draws: DrawSet, options: ScenarioOptions): PreparedScenario {
  const { horizonMonths, seed } = options;
  if (!(Number.isInteger(horizonMonths) && horizonMonths >= 1)) {
    throw new RangeError(`horizonMonths must be a positive integer, got ${horizonMonths}`);
  }
  if (!(draws.count >= 1)) throw new RangeError(`draws must hold at least one draw, got ${draws.count}`);
  return new PreparedDraws(draws, horizonMonths, seed);
}

class PreparedDraws implements PreparedScenario {
  readonly draws: number;
  private readonly months: number;
  private readonly ready: ScenarioDraws;
  private readonly shocks: Float64Array | null;
  private readonly baseline: Levels;
  private readonly pushed: Levels;
  private readonly difference: Levels;
  private readonly counts: Levels;
  private readonly factors: { focal: Float64Array; rival: Float64Array };
  private readonly levelBands: BandMaker;
  private readonly countBands: BandMaker;
  private readonly baselineCounts: ScenarioBands;
  private readonly oddsBefore: Odds;
  private readonly destinations: Destination[];
  private readonly returnHalfLife: Interval | null;

  constructor(
    draws: DrawSet,
    readonly horizonMonths: number,
    seed: number,
  ) {
    this.draws = draws.count;
    this.months = Math.max(horizonMonths, LOOK_AHEAD_MONTHS);
    this.ready = readScenarioDraws(draws);
    this.shocks = drawShockFactors(draws, this.months, seed);
    this.baseline = createLevels(this.months * draws.count);
    this.pushed = createLevels(this.months * draws.count);
    this.difference = createLevels(this.months * draws.count);
    this.counts = createLevels(horizonMonths * draws.count * REPLICATES);
    this.factors = {
      focal: drawErrorFactors(draws, 1, horizonMonths, seed),
      rival: drawErrorFactors(draws, 2, horizonMonths, seed),
    };
    this.levelBands = new BandMaker(draws.count);
    this.countBands = new BandMaker(draws.count * REPLICATES);
    const unforced = createForcing([]);
    this.fillLevels(unforced, this.baseline);
    this.baselineCounts = this.bandCounts(this.baseline);
    this.destinations = this.findDestinations(
      this.ready.systems,
      this.baseline,
      describeSettling([], unforced),
    );
    this.oddsBefore = tallyOdds(this.ready.systems);
    this.returnHalfLife = measureReturn(this.ready.systems, this.destinations);
  }

  compare(pushes: readonly Push[]): ScenarioComparison {
    const forcing = createForcing(pushes);
    this.fillLevels(forcing, this.pushed);
    this.fillDifference();
    const lasting = this.ready.systems.map((system) => applyLastingPushes(system, pushes));
    const after = this.findDestinations(lasting, this.pushed, describeSettling(pushes, forcing));
    const difference = this.bandDifference();
    return {
      horizonMonths: this.horizonMonths,
      draws: this.draws,
      pushes: [...pushes],
      baseline: this.baselineCounts,
      pushed: this.bandCounts(this.pushed),
      difference: this.cutToHorizon(difference),
      checkpoints: CHECKPOINTS.filter((month) => month <= this.horizonMonths).map((month) =>
        this.checkpoint(month),
      ),
      odds: { before: this.oddsBefore, after: tallyOdds(lasting) },
      destinations: { before: tallyDestinations(this.destinations), after: tallyDestinations(after) },
      effect: this.describeEffect(pushes, after, difference.share),
    };
  }

  /** Follows every draw. A draw that cannot be followed on stays where it is, with and without pushes. */
  private fillLevels(forcing: Forcing, out: Levels): void {
    const { count, systems, starts } = this.ready;
    const { shocks } = this;
    for (let i = 0; i < count; i++) {
      const path = new ForcedIntegrator(systems[i]!, starts[i]!, forcing);
      let [n1, n2] = starts[i]!;
      let isFollowed = true;
      for (let h = 0; h < this.months; h++) {
        const at = h * count + i;
        isFollowed = isFollowed && path.advanceFrom(h) === 'complete';
        if (isFollowed) {
          if (shocks) {
            path.users1 *= shocks[2 * at]!;
            path.users2 *= shocks[2 * at + 1]!;
          }
          n1 = path.users1;
          n2 = path.users2;
        }
        out.focal[at] = n1;
        out.rival[at] = n2;
        out.share[at] = shareOf(n1, n2);
      }
    }
  }

  private fillDifference(): void {
    const { baseline, pushed, difference } = this;
    for (const key of ['focal', 'rival', 'share'] as const) {
      const [with_, without, out] = [pushed[key], baseline[key], difference[key]];
      for (let at = 0; at < out.length; at++) out[at] = with_[at]! - without[at]!;
    }
  }

  /** Bands of future counts: level times error, the same errors for every scenario. */
  private bandCounts(levels: Levels): ScenarioBands {
    const { counts, factors, horizonMonths } = this;
    for (let at = 0; at < counts.focal.length; at++) {
      const level = Math.floor(at / REPLICATES);
      const focal = levels.focal[level]! * factors.focal[at]!;
      const rival = levels.rival[level]! * factors.rival[at]!;
      counts.focal[at] = focal;
      counts.rival[at] = rival;
      counts.share[at] = shareOf(focal, rival);
    }
    return bandsOf(counts, (values) => this.countBands.bands(values, horizonMonths));
  }

  /** Over all months that were followed, the horizon and beyond. */
  private bandDifference(): ScenarioBands {
    const { difference, horizonMonths, months, levelBands } = this;
    return {
      focal: levelBands.bands(difference.focal, horizonMonths),
      rival: levelBands.bands(difference.rival, horizonMonths),
      share: levelBands.bands(difference.share, months),
    };
  }

  private cutToHorizon({ focal, rival, share }: ScenarioBands): ScenarioBands {
    const cut = (row: number[]) => row.slice(0, this.horizonMonths);
    const { q05, q25, q50, q75, q95 } = share;
    return {
      focal,
      rival,
      share: { q05: cut(q05), q25: cut(q25), q50: cut(q50), q75: cut(q75), q95: cut(q95) },
    };
  }

  /**
   * From the last month followed on, as most draws have chosen their side by then; with process noise from the start, since a
   * destination is that of the system without shocks.
   */
  private findDestinations(
    lasting: CompetitionSystem[],
    levels: Levels,
    settling: SettlingPushes,
  ): Destination[] {
    const { count, systems, starts } = this.ready;
    const last = (this.months - 1) * count;
    return lasting.map((system, i) => {
      const state: State = [levels.focal[last + i]!, levels.rival[last + i]!];
      const from = this.shocks ? { month: 0, state: starts[i]! } : { month: this.months, state };
      return findDestination(systems[i]!, system, from, settling);
    });
  }

  private checkpoint(monthsAhead: number): Checkpoint {
    const at = (levels: Levels) => ({
      focal: this.levelBands.interval(levels.focal, monthsAhead - 1),
      rival: this.levelBands.interval(levels.rival, monthsAhead - 1),
      share: this.levelBands.interval(levels.share, monthsAhead - 1),
    });
    return {
      monthsAhead,
      difference: at(this.difference),
      pushed: at(this.pushed),
      baseline: at(this.baseline),
    };
  }

  private describeEffect(pushes: readonly Push[], after: Destination[], share: Bands): ScenarioEffect {
    const medians = share.q50;
    const worst = findWorstMonth(medians);
    const back = findReturnMonth(medians, worst);
    const moved = after.filter((one, i) => one.survivors !== this.destinations[i]!.survivors).length;
    const probabilityMoves = moved / this.draws;
    return {
      destination: nameDestinationEffect(probabilityMoves),
      probabilityMoves,
      reason: findReason(pushes, probabilityMoves, this.oddsBefore.headStartDecides),
      isLasting: pushes.some(isLastingPush),
      settledShareDifference: intervalOf(
        after.map(
          (one, i) => shareOf(one.n1, one.n2) - shareOf(this.destinations[i]!.n1, this.destinations[i]!.n2),
        ),
      ),
      worstShareDifference: {
        monthsAhead: worst + 1,
        q05: share.q05[worst]!,
        q50: medians[worst]!,
        q95: share.q95[worst]!,
      },
      followedMonths: this.months,
      backWithinHalfPointMonth: back === null ? null : back + 1,
      returnHalfLifeMonths: this.returnHalfLife,
    };
  }
}

function createLevels(length: number): Levels {
  return {
    focal: new Float64Array(length),
    rival: new Float64Array(length),
    share: new Float64Array(length),
  };
}

function bandsOf(levels: Levels, band: (values: Float64Array) => Bands): ScenarioBands {
  return { focal: band(levels.focal), rival: band(levels.rival), share: band(levels.share) };
}
