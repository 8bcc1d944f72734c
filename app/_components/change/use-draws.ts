'use client';

/** The draws of a fit, fetched once. */
import { useCallback, useEffect, useState } from 'react';
import type { DrawSet } from '@/lib/estimate/types';

export type DrawsState = { state: 'fetching' } | { state: 'failed' } | { state: 'ready'; draws: DrawSet };

export function useDraws(marketId: string, fitId: string): [DrawsState, retry: () => void] {
  const [draws, setDraws] = useState<DrawsState>({ state: 'fetching' });
  const [attempt, setAttempt] = useState(0);

  // biome-ignore lint/correctness/useExhaustiveDependencies: an attempt is a reason to fetch again
  useEffect(() => {
    const abort = new AbortController();
    setDraws({ state: 'fetching' });
    fetchDraws(marketId, fitId, abort.signal).then((found) => {
      if (!abort.signal.aborted) setDraws(found ? { state: 'ready', draws: found } : { state: 'failed' });
    });
    return () => abort.abort();
  }, [marketId, fitId, attempt]);

  return [draws, useCallback(() => setAttempt((count) => count + 1), [])];
}

async function fetchDraws(marketId: string, fitId: string, signal: AbortSignal): Promise<DrawSet | null> {
  try {
    const answer = await fetch(`/markets/${marketId}/draws?fit=${encodeURIComponent(fitId)}`, { signal });
    return answer.ok ? ((await answer.json()) as DrawSet) : null;
  } catch {
    return null;
  }
}
