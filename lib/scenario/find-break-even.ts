/**
 * Break-even spend: the most money a month at which a push is expected to return what it costs, the other pushes of the scenario being
 * as they are. With G the discounted margin that the push gains (mean over draws) and D the discounted months that it is paid for,
 *
 *   spend = G / D                      a push whose effect is given
 *   largest s with G(u(s)) = s D       recruits bought by spending, u(s) of `spend.ts`
 *
 * The second is bisected below G(R)/D, which no spend can return since G rises with the recruits.
 */
import { createForcing } from '../dynamics/forcing';
import { intervalOf } from '../forecast/interval';
import { type AnswerRun, WorkMeter } from './answer-run';
import type { BreakEven } from './answers';
import type { FollowedDraws, Levels } from './follow-draws';
import type { Money } from './money';
import type { PreparedScenario } from './prepare-scenario';
import { roundDownToThreeDigits } from './round-digits';
import { type PricedPush, recruitsForSpend, type SpendResponse } from './spend';
import { listDiscounts, listPaidMonths, sumGains } from './value-pushes';

export interface BreakEvenQuestion {
  /** The push whose price is asked for. */
  push: PricedPush;
  /** The other pushes of the scenario. */
  pushes: readonly PricedPush[];
  money: Money;
}

/** Spends tried, each half the one above, before it is said that none pays. */
const HALVINGS = 14;
/** Halvings of the last step of a factor 2: 0.4 %, below what three digits show. */
const BISECTIONS = 8;
/** Recruits a month that are tried where no limit is given, as parts of both firms' users: doubled from the first to the last. */
const FIRST_RECRUITS = 1 / 64;
const LAST_RECRUITS = 1;

/** @throws RangeError when the margin of the pushing firm is not given */
export function* findBreakEven(
  prepared: PreparedScenario,
  question: BreakEvenQuestion,
): AnswerRun<BreakEven> {
  const { push, money } = question;
  const found = yield* findSpend(prepared, question);
  return { ...found, push, money };
}

type Found =
  | Pick<Extract<BreakEven, { code: 'found' }>, 'code' | 'spendPerMonth' | 'interval'>
  | Pick<Extract<BreakEven, { code: 'never-pays' }>, 'code'>
  | Pick<Extract<BreakEven, { code: 'always-pays' }>, 'code' | 'spendPerMonth'>;

function* findSpend(
  prepared: PreparedScenario,
  { push, pushes, money }: BreakEvenQuestion,
): AnswerRun<Found> {
  const months = Math.min(money.months ?? prepared.horizonMonths, prepared.followed.months);
  const gains = new GainCounter(prepared.followed, { push, pushes, money }, months);
  yield* gains.prepare();
  if (!(gains.paidMonths > 0)) return { code: 'never-pays' };
  return push.response ? yield* findByResponse(gains, push.response) : yield* findBySize(gains, push.size);
}

function* findBySize(gains: GainCounter, size: number): AnswerRun<Found> {
  const perDraw = yield* gains.ofSize(size);
  const expected = mean(perDraw) / gains.paidMonths;
  if (!(expected > 0)) return { code: 'never-pays' };
  return {
    code: 'found',
    spendPerMonth: roundDownToThreeDigits(expected),
    interval: intervalOf(perDraw.map((gain) => gain / gains.paidMonths)),
  };
}

function* findByResponse(gains: GainCounter, response: SpendResponse): AnswerRun<Found> {
  const pays = function* (spend: number): AnswerRun<boolean> {
    const gained = mean(yield* gains.ofSize(recruitsForSpend(spend, response)));
    return gained >= spend * gains.paidMonths;
  };
  const top = yield* findTopSpend(gains, response, pays);
  if (yield* pays(top)) return { code: 'always-pays', spendPerMonth: top };
  let high = top;
  let low = high / 2;
  let halvings = 1;
  while (!(yield* pays(low))) {
    if (++halvings > HALVINGS) return { code: 'never-pays' };
    high = low;
    low /= 2;
  }
  for (let k = 0; k < BISECTIONS; k++) {
    const middle = (low + high) / 2;
    if (yield* pays(middle)) low = middle;
    else high = middle;
  }
  return { code: 'found', spendPerMonth: roundDownToThreeDigits(low), interval: null };
}

/** A spend that does not return; where every recruit costs the same and none is found, the largest looked at. */
function* findTopSpend(
  gains: GainCounter,
  { costPerRecruit, mostPerMonth }: SpendResponse,
  pays: (spend: number) => AnswerRun<boolean>,
): AnswerRun<number> {
  if (mostPerMonth !== null) {
    const most = mean(yield* gains.ofSize(mostPerMonth)) / gains.paidMonths;
    return Math.max(most * (1 + 1e-9), Number.MIN_VALUE);
  }
  let recruits = FIRST_RECRUITS * gains.marketUsers;
  while (recruits < LAST_RECRUITS * gains.marketUsers && (yield* pays(recruits * costPerRecruit)))
    recruits *= 2;
  return recruits * costPerRecruit;
}

/** Discounted margin that one push gains in each draw, at any size. */
class GainCounter {
  /** Discounted months that the push is paid for. */
  readonly paidMonths: number;
  private readonly discounts: Float64Array;
  private readonly baseline: Levels;
  private readonly pushed: Levels;
  private readonly meter: WorkMeter;

  constructor(
    private readonly followed: FollowedDraws,
    private readonly question: BreakEvenQuestion,
    private readonly months: number,
  ) {
    const { push, money } = question;
    this.discounts = listDiscounts(money.discountRatePerYear, months);
    this.paidMonths = listPaidMonths(push, months).reduce(
      (sum, part, h) => sum + part * this.discounts[h]!,
      0,
    );
    this.baseline = followed.createLevels();
    this.pushed = followed.createLevels();
    const passes = push.response ? BISECTIONS + HALVINGS / 2 : 2;
    this.meter = new WorkMeter(passes * followed.count * followed.months);
  }

  /** Users of both firms in the last observed month. */
  get marketUsers(): number {
    const [n1, n2] = this.followed.starts[0]!;
    return n1 + n2;
  }

  *prepare(): AnswerRun<void> {
    yield* this.fill([...this.question.pushes], this.baseline);
  }

  *ofSize(size: number): AnswerRun<Float64Array> {
    const { push, pushes, money } = this.question;
    yield* this.fill([...pushes, { ...push, size }], this.pushed);
    const key = push.firm === 1 ? 'focal' : 'rival';
    return sumGains(
      {
        firm: push.firm,
        money,
        months: this.months,
        draws: this.followed.count,
        pushed: this.pushed[key],
        baseline: this.baseline[key],
      },
      this.discounts,
    );
  }

  private *fill(pushes: PricedPush[], out: Levels): AnswerRun<void> {
    const forcing = createForcing(pushes);
    const { followed, months, meter } = this;
    for (let i = 0; i < followed.count; i++) {
      followed.fillDraw(forcing, i, months, out);
      if (meter.add(months)) yield meter.progress;
    }
  }
}

function mean(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
