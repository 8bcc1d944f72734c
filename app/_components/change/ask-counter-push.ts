/** The questions about a counter-push one after another, as one run: smallest size, last useful month at that size, map of chances. */
import type { AnswerRun } from '@/lib/scenario/answer-run';
import type { ChanceMap, LastUsefulMonth, SmallestPush } from '@/lib/scenario/answers';
import { findLastUsefulMonth } from '@/lib/scenario/find-last-month';
import { findSmallestPush, type SmallestPushQuestion } from '@/lib/scenario/find-smallest-push';
import { chooseMapAxes, mapChances } from '@/lib/scenario/map-chances';
import type { PreparedScenario } from '@/lib/scenario/prepare-scenario';
import type { MarketScale } from '@/lib/scenario/push-limits';

export interface CounterAnswers {
  smallest: SmallestPush;
  /** null when no counter-push is needed. */
  lastMonth: LastUsefulMonth | null;
  chanceMap: ChanceMap;
}

/** Parts of the whole work, about: the map follows the draws most often. */
const SHARES = { smallest: 0.25, lastMonth: 0.3, map: 0.45 };

export function* askCounterPush(
  prepared: PreparedScenario,
  question: SmallestPushQuestion,
  scale: MarketScale,
): AnswerRun<CounterAnswers> {
  const { target, pushes } = question;
  const smallest = yield* within(findSmallestPush(prepared, question), 0, SHARES.smallest);
  const counter = smallest.code === 'not-needed' ? question.counter : smallest.push;
  const asked = { target, counter, pushes };
  const lastMonth =
    smallest.code === 'not-needed'
      ? null
      : yield* within(findLastUsefulMonth(prepared, asked), SHARES.smallest, SHARES.lastMonth);
  const axes = chooseMapAxes(counter, target, scale);
  const map = mapChances(prepared, { ...asked, ...axes });
  const chanceMap = yield* within(map, SHARES.smallest + SHARES.lastMonth, SHARES.map);
  return { smallest, lastMonth, chanceMap };
}

function* within<T>(run: AnswerRun<T>, from: number, share: number): AnswerRun<T> {
  for (;;) {
    const step = run.next();
    if (step.done) return step.value;
    yield from + share * step.value;
  }
}
