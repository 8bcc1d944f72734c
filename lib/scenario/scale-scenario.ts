/**
 * Scenarios with users counted in other units. Growth rates, competition, shares, odds and relative pushes do not change; money and prices
 * are left out, since together with a margin per user they would give the counts away.
 */
import type { Bands, Interval } from '../forecast/report';
import type { Answers } from './answers';
import type { Checkpoint, ScenarioBands, ScenarioComparison } from './comparison';
import type { PricedPush } from './spend';

export function scalePush(push: PricedPush, factor: number): PricedPush {
  const { spendPerMonth: _price, response: _response, ...plain } = push;
  return push.kind === 'recruits' ? { ...plain, size: push.size * factor } : plain;
}

export function scaleComparison(comparison: ScenarioComparison, factor: number): ScenarioComparison {
  const { money: _money, ...plain } = comparison;
  return {
    ...plain,
    pushes: comparison.pushes.map((push) => scalePush(push, factor)),
    baseline: scaleScenarioBands(comparison.baseline, factor),
    pushed: scaleScenarioBands(comparison.pushed, factor),
    difference: scaleScenarioBands(comparison.difference, factor),
    checkpoints: comparison.checkpoints.map((one) => scaleCheckpoint(one, factor)),
  };
}

/** Without the break-even spend, which is money. */
export function scaleAnswers({ smallestPush, lastUsefulMonth, chanceMap }: Answers, factor: number): Answers {
  return {
    ...(smallestPush && {
      smallestPush:
        'push' in smallestPush
          ? { ...smallestPush, push: scalePush(smallestPush.push, factor) }
          : smallestPush,
    }),
    ...(lastUsefulMonth && {
      lastUsefulMonth: { ...lastUsefulMonth, push: scalePush(lastUsefulMonth.push, factor) },
    }),
    ...(chanceMap && {
      chanceMap: {
        ...chanceMap,
        push: scalePush(chanceMap.push, factor),
        sizes:
          chanceMap.push.kind === 'recruits' ? chanceMap.sizes.map((size) => size * factor) : chanceMap.sizes,
      },
    }),
  };
}

export function scaleInterval({ q05, q50, q95 }: Interval, factor: number): Interval {
  return { q05: q05 * factor, q50: q50 * factor, q95: q95 * factor };
}

export function scaleBands({ q05, q25, q50, q75, q95 }: Bands, factor: number): Bands {
  const scale = (row: number[]) => row.map((users) => users * factor);
  return { q05: scale(q05), q25: scale(q25), q50: scale(q50), q75: scale(q75), q95: scale(q95) };
}

function scaleScenarioBands({ focal, rival, share }: ScenarioBands, factor: number): ScenarioBands {
  return { focal: scaleBands(focal, factor), rival: scaleBands(rival, factor), share };
}

function scaleCheckpoint(checkpoint: Checkpoint, factor: number): Checkpoint {
  const scale = ({ focal, rival, share }: Checkpoint['pushed']) => ({
    focal: scaleInterval(focal, factor),
    rival: scaleInterval(rival, factor),
    share,
  });
  return {
    monthsAhead: checkpoint.monthsAhead,
    difference: scale(checkpoint.difference),
    pushed: scale(checkpoint.pushed),
    baseline: scale(checkpoint.baseline),
  };
}
