'use client';

/**
 * The comparison of the pushes being tried with no push, on the draws. Deferred, so that a slider under the hand moves first and
 * its figures follow.
 */
import { useDeferredValue, useMemo } from 'react';
import type { DrawSet } from '@/lib/estimate/types';
import type { ScenarioComparison } from '@/lib/scenario/comparison';
import type { Money } from '@/lib/scenario/money';
import { type PreparedScenario, prepareScenario } from '@/lib/scenario/prepare-scenario';
import type { PricedPush } from '@/lib/scenario/spend';

/** null until the draws are there. */
export function usePrepared(
  draws: DrawSet | null,
  horizonMonths: number,
  seed: number,
): PreparedScenario | null {
  return useMemo(
    () => (draws ? prepareScenario(draws, { horizonMonths, seed }) : null),
    [draws, horizonMonths, seed],
  );
}

/** null until the draws are there. No push compares nothing with nothing: all differences are 0. */
export function useComparison(
  prepared: PreparedScenario | null,
  pushes: PricedPush[],
  money: Money | null,
): ScenarioComparison | null {
  const asked = useMemo(() => ({ pushes, money }), [pushes, money]);
  const settled = useDeferredValue(asked);
  return useMemo(
    () => prepared?.compare(settled.pushes, settled.money ?? undefined) ?? null,
    [prepared, settled],
  );
}
