/**
 * Whether draws keep a target share while one push, the counter-push, changes and the other pushes of the scenario stay. The months
 * before the counter-push starts are followed once for all.
 *
 * Pushing more never lowers the pushing firm's users nor raises the other's (the system is monotone in the competitive order), so in every
 * draw the share is monotone in the size of the counter-push: searches over sizes may bisect, and may drop draws that are decided.
 */
import { ForcedIntegrator } from '../dynamics/forced-trajectory';
import { createForcing, type Forcing } from '../dynamics/forcing';
import { shareOf } from '../forecast/bands';
import { type AnswerRun, WorkMeter } from './answer-run';
import type { Reach, Target } from './answers';
import type { FollowedDraws } from './follow-draws';
import type { PreparedScenario } from './prepare-scenario';
import type { PricedPush } from './spend';

export interface TargetQuestion {
  target: Target;
  /** The push that answers; what is asked for (its size, its start) is ignored. */
  counter: PricedPush;
  /** The other pushes of the scenario. */
  pushes: readonly PricedPush[];
}

/** Preparing is about a fifth of a question. */
const PREPARING_PART = 5;

export class TargetCheck {
  readonly count: number;
  /** Draws that must keep the share. */
  readonly needed: number;
  private readonly followed: FollowedDraws;
  /** Users under the other pushes alone, month 0 .. target.month: firm 1 of draw i in month m at 2 (m count + i). */
  private readonly base: Float64Array;

  /** @throws RangeError when the target lies beyond what is followed */
  constructor(
    prepared: PreparedScenario,
    readonly target: Target,
    private readonly pushes: readonly PricedPush[],
  ) {
    this.followed = prepared.followed;
    if (!(target.month <= this.followed.months)) {
      throw new RangeError(`target.month must be at most ${this.followed.months}, got ${target.month}`);
    }
    this.count = this.followed.count;
    // the tolerance takes back the rounding of a chance such as 0.9 times 1,000 draws
    this.needed = Math.ceil(target.chance * this.count - 1e-9);
    this.base = new Float64Array(2 * (target.month + 1) * this.count);
  }

  /** Follows the draws under the other pushes; nothing can be asked before. */
  *prepare(): AnswerRun<void> {
    const forcing = createForcing(this.pushes);
    const meter = new WorkMeter(PREPARING_PART * this.count * this.target.month);
    for (let i = 0; i < this.count; i++) {
      this.fillBase(i, forcing);
      if (meter.add(this.target.month)) yield meter.progress;
    }
  }

  forcingWith(counter: PricedPush): Forcing {
    return createForcing([...this.pushes, counter]);
  }

  /** Share of the target firm in the target month of draw i, under the other pushes alone. */
  baseShare(i: number): number {
    return this.shareAt(i, this.target.month);
  }

  /** The same under a forcing that differs from the other pushes from `startMonth` on only. */
  shareUnder(forcing: Forcing, i: number, startMonth: number): number {
    const from = Math.min(Math.floor(startMonth), this.target.month);
    const at = 2 * (from * this.count + i);
    const start = [this.base[at]!, this.base[at + 1]!] as const;
    const path = new ForcedIntegrator(this.followed.systems[i]!, start, forcing);
    let [n1, n2] = start;
    for (let month = from; month < this.target.month && this.followed.advance(path, i, month); month++) {
      n1 = path.users1;
      n2 = path.users2;
    }
    return this.shareOfFirm(n1, n2);
  }

  keeps(share: number): boolean {
    return share >= this.target.share;
  }

  /** @param shares one per draw */
  reachOf(shares: ArrayLike<number>): Reach {
    const sorted = Float64Array.from(shares).sort();
    const kept = sorted.reduce((sum, share) => sum + (this.keeps(share) ? 1 : 0), 0);
    return { chance: kept / this.count, shareKept: sorted[this.count - this.needed]! };
  }

  listBaseShares(): Float64Array {
    return Float64Array.from({ length: this.count }, (_, i) => this.baseShare(i));
  }

  private shareAt(i: number, month: number): number {
    const at = 2 * (month * this.count + i);
    return this.shareOfFirm(this.base[at]!, this.base[at + 1]!);
  }

  private shareOfFirm(n1: number, n2: number): number {
    return this.target.firm === 1 ? shareOf(n1, n2) : shareOf(n2, n1);
  }

  private fillBase(i: number, forcing: Forcing): void {
    const { followed, base, count } = this;
    const [n1, n2] = followed.starts[i]!;
    base[2 * i] = n1;
    base[2 * i + 1] = n2;
    const path = new ForcedIntegrator(followed.systems[i]!, followed.starts[i]!, forcing);
    let isFollowed = true;
    for (let month = 0; month < this.target.month; month++) {
      isFollowed = isFollowed && followed.advance(path, i, month);
      const [from, to] = [2 * (month * count + i), 2 * ((month + 1) * count + i)];
      base[to] = isFollowed ? path.users1 : base[from]!;
      base[to + 1] = isFollowed ? path.users2 : base[from + 1]!;
    }
  }
}
