/**
 * The chance of keeping a share against size and start of a counter-push. In every draw the share is monotone in the size, so the smallest
 * size of the map that keeps it is bisected draw by draw.
 */
import type { Forcing } from '../dynamics/forcing';
import { type AnswerRun, WorkMeter } from './answer-run';
import type { ChanceMap, Target } from './answers';
import type { PreparedScenario } from './prepare-scenario';
import { limitsForPush, type MarketScale } from './push-limits';
import { MOST_OF_RESPONSE, type PricedPush } from './spend';
import { TargetCheck, type TargetQuestion } from './target-check';

export interface ChanceMapQuestion extends TargetQuestion {
  /** Ascending, not negative. */
  sizes: readonly number[];
  startMonths: readonly number[];
}

/** Tenths of the control's range, so that the sizes are round. */
const SIZE_STEPS = 10;
/** Most start months. */
const MAP_MONTHS = 12;

/** Sizes over the range of the control, 0 included, and start months from now to the last that can matter. */
export function chooseMapAxes(
  counter: PricedPush,
  target: Target,
  scale: MarketScale,
): Pick<ChanceMapQuestion, 'sizes' | 'startMonths'> {
  const { max } = limitsForPush(counter.kind, scale).size;
  const most = Math.min(max, MOST_OF_RESPONSE * (counter.response?.mostPerMonth ?? Number.POSITIVE_INFINITY));
  const stride = Math.max(1, Math.ceil(target.month / MAP_MONTHS));
  return {
    sizes: Array.from({ length: SIZE_STEPS + 1 }, (_, k) => (most * k) / SIZE_STEPS),
    startMonths: Array.from({ length: Math.ceil(target.month / stride) }, (_, k) => k * stride),
  };
}

/** @throws RangeError when the sizes do not ascend */
export function* mapChances(
  prepared: PreparedScenario,
  { target, counter, pushes, sizes, startMonths }: ChanceMapQuestion,
): AnswerRun<ChanceMap> {
  if (!sizes.every((size, k) => size >= 0 && (k === 0 || size > sizes[k - 1]!))) {
    throw new RangeError(`sizes must ascend from 0 or above, got ${sizes.join(', ')}`);
  }
  const check = new TargetCheck(prepared, target, pushes);
  yield* check.prepare();
  const perDraw = Math.log2(sizes.length + 1) * startMonths.length;
  const meter = new WorkMeter((check.count * target.month * perDraw) / 2);
  const chances = sizes.map(() => new Array<number>(startMonths.length).fill(0));
  for (let j = 0; j < startMonths.length; j++) {
    const startMonth = startMonths[j]!;
    const forcings = sizes.map((size) => check.forcingWith({ ...counter, size, startMonth }));
    for (let i = 0; i < check.count; i++) {
      for (let k = findFirstKept(check, forcings, i, startMonth); k < sizes.length; k++) chances[k]![j]! += 1;
      if (meter.add(Math.max(1, target.month - startMonth) * Math.log2(sizes.length + 1)))
        yield meter.progress;
    }
  }
  return {
    target,
    push: counter,
    sizes: [...sizes],
    startMonths: [...startMonths],
    chances: chances.map((row) => row.map((kept) => kept / check.count)),
  };
}

/** Index of the smallest size at which draw i keeps the share; their number when none does. */
function findFirstKept(check: TargetCheck, forcings: Forcing[], i: number, startMonth: number): number {
  let low = 0;
  let high = forcings.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (check.keeps(check.shareUnder(forcings[middle]!, i, startMonth))) high = middle;
    else low = middle + 1;
  }
  return low;
}
