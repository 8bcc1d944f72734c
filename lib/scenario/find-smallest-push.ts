/**
 * The smallest counter-push that keeps a share with a wished chance. In every draw the share is monotone in the size, so the chance is
 * too and is bisected on common random numbers; draws whose side is settled by a smaller or a larger size are not followed again.
 */
import { type AnswerRun, WorkMeter } from './answer-run';
import type { SmallestPush } from './answers';
import type { PreparedScenario } from './prepare-scenario';
import { MAX_RELATIVE_SIZE } from './push-bounds';
import { roundUpToThreeDigits } from './round-digits';
import { MOST_OF_RESPONSE, type PricedPush, recruitsForSpend, resizePush } from './spend';
import { TargetCheck, type TargetQuestion } from './target-check';

export interface SmallestPushQuestion extends TargetQuestion {
  /** Largest size looked at; without it MAX_RELATIVE_SIZE, or for recruits a part of both firms' users. */
  maxSize?: number;
}

/** Recruits a month up to this part of both firms' users in the last observed month are looked at. */
const MOST_RECRUITS_OF_MARKET = 0.5;
/** The bisection ends when the two sizes differ by less than this part. */
const SIZE_TOLERANCE = 1e-3;
/** Passes over all draws that a search takes, about. */
const EXPECTED_PASSES = 4;

export function* findSmallestPush(
  prepared: PreparedScenario,
  question: SmallestPushQuestion,
): AnswerRun<SmallestPush> {
  const { target, counter } = question;
  const check = new TargetCheck(prepared, target, question.pushes);
  yield* check.prepare();
  const baseShares = check.listBaseShares();
  const base = check.reachOf(baseShares);
  if (base.chance * check.count >= check.needed) return { code: 'not-needed', target, reach: base };

  const search = new SizeSearch(check, counter);
  const largest = pushOfSize(counter, question.maxSize ?? largestSize(prepared, counter));
  const mostShares = yield* search.followAll(largest);
  const most = check.reachOf(mostShares);
  if (most.chance * check.count < check.needed) {
    return { code: 'no-size-does', target, push: largest, reach: most };
  }
  const size = yield* search.bisect(largest.size, baseShares, mostShares);
  const push = roundPush(counter, size, largest.size);
  const reach = check.reachOf(yield* search.followAll(push));
  return { code: 'found', target, push, reach };
}

function largestSize({ followed }: PreparedScenario, { kind, response }: PricedPush): number {
  if (kind !== 'recruits') return MAX_RELATIVE_SIZE;
  const [n1, n2] = followed.starts[0]!;
  const ofMarket = roundUpToThreeDigits(MOST_RECRUITS_OF_MARKET * (n1 + n2));
  const bought = response?.mostPerMonth ?? null;
  return bought === null ? ofMarket : Math.min(ofMarket, MOST_OF_RESPONSE * bought);
}

function pushOfSize(counter: PricedPush, size: number): PricedPush {
  const push = resizePush(counter, size);
  if (!push) throw new RangeError(`no money buys a push of size ${size}`);
  return push;
}

/** To three digits of what people set: the spend where it buys the recruits, else the size. */
function roundPush(counter: PricedPush, size: number, largest: number): PricedPush {
  const exact = pushOfSize(counter, size);
  if (!counter.response) return { ...exact, size: Math.min(roundUpToThreeDigits(size), largest) };
  const spendPerMonth = roundUpToThreeDigits(exact.spendPerMonth!);
  return { ...exact, spendPerMonth, size: recruitsForSpend(spendPerMonth, counter.response) };
}

class SizeSearch {
  private readonly months: number;
  private readonly meter: WorkMeter;

  constructor(
    private readonly check: TargetCheck,
    private readonly counter: PricedPush,
  ) {
    this.months = Math.max(1, check.target.month - Math.floor(counter.startMonth));
    this.meter = new WorkMeter(EXPECTED_PASSES * check.count * this.months);
  }

  /** Share of every draw. */
  *followAll(push: PricedPush): AnswerRun<Float64Array> {
    const forcing = this.check.forcingWith(push);
    const shares = new Float64Array(this.check.count);
    for (let i = 0; i < shares.length; i++) {
      shares[i] = this.check.shareUnder(forcing, i, push.startMonth);
      if (this.meter.add(this.months)) yield this.meter.progress;
    }
    return shares;
  }

  /**
   * Smallest size with enough draws keeping the share, from above and to SIZE_TOLERANCE.
   * @param atZero shares without the counter-push: too few keep the share
   * @param atMost shares at size `high`: enough do
   */
  *bisect(high: number, atZero: Float64Array, atMost: Float64Array): AnswerRun<number> {
    const { check } = this;
    let low = 0;
    let surelyKept = atZero.reduce((sum, share) => sum + (check.keeps(share) ? 1 : 0), 0);
    let open: number[] = [];
    atMost.forEach((share, i) => {
      if (check.keeps(share) && !check.keeps(atZero[i]!)) open.push(i);
    });
    let found = high;
    while (found - low > SIZE_TOLERANCE * found) {
      const middle = (low + found) / 2;
      const [kept, lost] = yield* this.split(open, middle);
      if (surelyKept + kept.length >= check.needed) {
        found = middle;
        open = kept;
      } else {
        low = middle;
        surelyKept += kept.length;
        open = lost;
      }
    }
    return found;
  }

  private *split(open: readonly number[], size: number): AnswerRun<[number[], number[]]> {
    const forcing = this.check.forcingWith({ ...this.counter, size });
    const kept: number[] = [];
    const lost: number[] = [];
    for (const i of open) {
      const share = this.check.shareUnder(forcing, i, this.counter.startMonth);
      (this.check.keeps(share) ? kept : lost).push(i);
      if (this.meter.add(this.months)) yield this.meter.progress;
    }
    return [kept, lost];
  }
}
