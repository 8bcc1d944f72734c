'use client';

/**
 * The comparison of the push being tried with no push, on the fetched draws. Deferred, so that a slider under the hand
 * moves first and its figures follow.
 */
import { useDeferredValue, useMemo } from 'react';
import type { Push } from '@/lib/dynamics/push';
import type { DrawSet } from '@/lib/estimate/types';
import type { ScenarioComparison } from '@/lib/scenario/comparison';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';

export interface ComparisonOptions {
  horizonMonths: number;
  seed: number;
}

/** null until the draws are there. A push of null compares nothing with nothing: all differences are 0. */
export function useComparison(
  draws: DrawSet | null,
  push: Push | null,
  { horizonMonths, seed }: ComparisonOptions,
): ScenarioComparison | null {
  const prepared = useMemo(
    () => (draws ? prepareScenario(draws, { horizonMonths, seed }) : null),
    [draws, horizonMonths, seed],
  );
  const settled = useDeferredValue(push);
  return useMemo(() => prepared?.compare(settled ? [settled] : []) ?? null, [prepared, settled]);
}
