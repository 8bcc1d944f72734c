/**
 * A market's draws made ready to answer pushes while a slider moves: the path of every draw without a push, its counts and its
 * destination are worked out once; `compare` follows every draw under the pushes with the same code and the same random numbers, so a push
 * of size 0 gives the baseline to the last digit.
 */
import { createForcing } from '../dynamics/forcing';
import { applyLastingPushes } from '../dynamics/lasting-push';
import type { Push } from '../dynamics/push';
import type { CompetitionSystem, State } from '../dynamics/system';
import type { DrawSet } from '../estimate/types';
import { shareOf } from '../forecast/bands';
import { intervalOf } from '../forecast/interval';
import type { Bands, Interval, Odds } from '../forecast/report';
import type { Checkpoint, Crossing, ScenarioBands, ScenarioComparison, ScenarioEffect } from './comparison';
import { CountBands } from './count-bands';
import { decidesByHeadStart, type PushedPath, tracePushedPath } from './draw-paths';
import { findReason, findReturnMonth, findWorstMonth, isLastingPush, nameDestinationEffect } from './effect';
import { FollowedDraws, type Levels } from './follow-draws';
import type { Money, MoneyResult } from './money';
import { BandMaker } from './scenario-bands';
import { type Destination, describeSettling, findDestination, type SettlingPushes } from './settle';
import type { PricedPush } from './spend';
import { measureReturn, tallyDestinations, tallyOdds } from './tally';
import { valuePushes } from './value-pushes';

export interface ScenarioOptions {
  /** How far the bands reach, months after the last observed one. */
  horizonMonths: number;
  seed: number;
}

export interface PreparedScenario {
  readonly horizonMonths: number;
  readonly draws: number;
  /** The draws themselves, for answers that follow some of them under many pushes. */
  readonly followed: FollowedDraws;
  compare(pushes: readonly PricedPush[], money?: Money): ScenarioComparison;
  /** Paths of `count` draws, evenly taken, as far as the horizon. */
  samplePaths(pushes: readonly Push[], count: number): PushedPath[];
}

/** Months ahead at which the difference is told in numbers. */
const CHECKPOINTS = [6, 12, 24];
/** How far the return of the difference is followed, even beyond the horizon. */
const LOOK_AHEAD_MONTHS = 60;

/** Months that are followed under a horizon: as far as targets and money may reach. */
export function followedMonthsOf(horizonMonths: number): number {
  return Math.max(horizonMonths, LOOK_AHEAD_MONTHS);
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
  readonly followed: FollowedDraws;
  private readonly baseline: Levels;
  private readonly pushed: Levels;
  private readonly difference: Levels;
  private readonly levelBands: BandMaker;
  private readonly countBands: CountBands;
  private readonly baselineCounts: ScenarioBands;
  private readonly oddsBefore: Odds;
  private readonly destinations: Destination[];
  private readonly returnHalfLife: Interval | null;
  /** Levels under the rival's pushes alone; made when first asked for. */
  private answered: Levels | null = null;

  constructor(
    draws: DrawSet,
    readonly horizonMonths: number,
    seed: number,
  ) {
    this.draws = draws.count;
    this.followed = new FollowedDraws(draws, followedMonthsOf(horizonMonths), seed);
    this.baseline = this.followed.createLevels();
    this.pushed = this.followed.createLevels();
    this.difference = this.followed.createLevels();
    this.levelBands = new BandMaker(draws.count);
    this.countBands = new CountBands(draws, horizonMonths, seed);
    const unforced = createForcing([]);
    this.followed.fillLevels(unforced, this.baseline);
    this.baselineCounts = this.countBands.of(this.baseline);
    const { systems } = this.followed;
    this.destinations = this.findDestinations(systems, this.baseline, describeSettling([], unforced));
    this.oddsBefore = tallyOdds(systems);
    this.returnHalfLife = measureReturn(systems, this.destinations);
  }

  compare(pushes: readonly PricedPush[], money?: Money): ScenarioComparison {
    const forcing = createForcing(pushes);
    this.followed.fillLevels(forcing, this.pushed);
    this.fillDifference();
    const lasting = this.followed.systems.map((system) => applyLastingPushes(system, pushes));
    const after = this.findDestinations(lasting, this.pushed, describeSettling(pushes, forcing));
    const difference = this.bandDifference();
    return {
      horizonMonths: this.horizonMonths,
      draws: this.draws,
      pushes: [...pushes],
      baseline: this.baselineCounts,
      pushed: this.countBands.of(this.pushed),
      difference: this.cutToHorizon(difference),
      checkpoints: CHECKPOINTS.filter((month) => month <= this.horizonMonths).map((month) =>
        this.checkpoint(month),
      ),
      odds: { before: this.oddsBefore, after: tallyOdds(lasting) },
      destinations: { before: tallyDestinations(this.destinations), after: tallyDestinations(after) },
      effect: this.describeEffect(pushes, after, difference.share),
      crossing: this.countCrossings(lasting, after),
      ...(money ? { money: this.countMoney(pushes, money) } : {}),
    };
  }

  samplePaths(pushes: readonly Push[], count: number): PushedPath[] {
    const { systems, starts } = this.followed;
    const taken = Math.min(count, this.draws);
    return Array.from({ length: taken }, (_, k) => {
      const i = Math.floor((k * this.draws) / taken);
      return tracePushedPath(systems[i]!, starts[i]!, pushes, this.horizonMonths);
    });
  }

  private fillDifference(): void {
    const { baseline, pushed, difference } = this;
    for (const key of ['focal', 'rival', 'share'] as const) {
      const [with_, without, out] = [pushed[key], baseline[key], difference[key]];
      for (let at = 0; at < out.length; at++) out[at] = with_[at]! - without[at]!;
    }
  }

  /** Share over all months that were followed, the horizon and beyond. */
  private bandDifference(): ScenarioBands {
    const { difference, horizonMonths, followed, levelBands } = this;
    return {
      focal: levelBands.bands(difference.focal, horizonMonths),
      rival: levelBands.bands(difference.rival, horizonMonths),
      share: levelBands.bands(difference.share, followed.months),
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
    lasting: readonly CompetitionSystem[],
    levels: Levels,
    settling: SettlingPushes,
  ): Destination[] {
    const { count, systems, starts, months, shocks } = this.followed;
    const last = (months - 1) * count;
    return lasting.map((system, i) => {
      const state: State = [levels.focal[last + i]!, levels.rival[last + i]!];
      const from = shocks ? { month: 0, state: starts[i]! } : { month: months, state };
      return findDestination(systems[i]!, system, from, settling);
    });
  }

  private countCrossings(lasting: readonly CompetitionSystem[], after: readonly Destination[]): Crossing {
    const crossing = { draws: 0, crossed: 0 };
    lasting.forEach((system, i) => {
      if (!decidesByHeadStart(system) || !decidesByHeadStart(this.followed.systems[i]!)) return;
      crossing.draws++;
      if (after[i]!.survivors !== this.destinations[i]!.survivors) crossing.crossed++;
    });
    return crossing;
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

  private countMoney(pushes: readonly PricedPush[], money: Money): MoneyResult {
    const { baseline, pushed, draws } = this;
    const months = Math.min(money.months ?? this.horizonMonths, this.followed.months);
    const common = { pushes, money, months, draws };
    return {
      assumed: money,
      months,
      focal: valuePushes({ ...common, firm: 1, pushed: pushed.focal, baseline: baseline.focal }),
      rival:
        money.marginPerUserMonth.rival === null
          ? null
          : valuePushes({ ...common, firm: 2, pushed: pushed.rival, baseline: baseline.rival }),
      focalAnswer: this.hasBothFirms(pushes)
        ? valuePushes({ ...common, firm: 1, pushed: pushed.focal, baseline: this.answerTo(pushes).focal })
        : null,
    };
  }

  private hasBothFirms(pushes: readonly PricedPush[]): boolean {
    return ([1, 2] as const).every((firm) => pushes.some((push) => push.firm === firm && push.size > 0));
  }

  private answerTo(pushes: readonly PricedPush[]): Levels {
    this.answered ??= this.followed.createLevels();
    this.followed.fillLevels(createForcing(pushes.filter(({ firm }) => firm === 2)), this.answered);
    return this.answered;
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
      followedMonths: this.followed.months,
      backWithinHalfPointMonth: back === null ? null : back + 1,
      returnHalfLifeMonths: this.returnHalfLife,
    };
  }
}
