'use client';

/** Asks the server how far a fit is until it has ended, then has the page read anew. */
import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';
import type { FitProgressView } from '@/lib/services/read-fit-progress';

const POLL_MS = 700;
/** After a failed request the next one waits longer. */
const RETRY_MS = 3000;

interface FitProgressPoll {
  view: FitProgressView;
  /** The last request did not get an answer. */
  isOffline: boolean;
}

export function useFitProgress(marketId: string, fitId: string, start: FitProgressView): FitProgressPoll {
  const router = useRouter();
  const [poll, setPoll] = useState<FitProgressPoll>({ view: start, isOffline: false });

  useEffect(() => {
    const abort = new AbortController();
    let timer: ReturnType<typeof setTimeout>;

    async function ask() {
      const view = await fetchProgress(marketId, fitId, abort.signal);
      if (abort.signal.aborted) return;
      if (view) setPoll({ view, isOffline: false });
      else setPoll((known) => ({ ...known, isOffline: true }));
      if (view && view.state !== 'queued' && view.state !== 'running') router.refresh();
      else timer = setTimeout(ask, view ? POLL_MS : RETRY_MS);
    }

    timer = setTimeout(ask, POLL_MS);
    return () => {
      abort.abort();
      clearTimeout(timer);
    };
  }, [marketId, fitId, router]);

  return poll;
}

async function fetchProgress(
  marketId: string,
  fitId: string,
  signal: AbortSignal,
): Promise<FitProgressView | null> {
  try {
    const answer = await fetch(`/markets/${marketId}/progress?fit=${encodeURIComponent(fitId)}`, { signal });
    return answer.ok ? ((await answer.json()) as FitProgressView) : null;
  } catch {
    return null;
  }
}
