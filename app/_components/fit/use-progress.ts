'use client';

/** Asks the server how far some work is until it has ended, then has the page read anew. */
import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';

const POLL_MS = 700;
/** After a failed request the next one waits longer. */
const RETRY_MS = 3000;
const ENDED = ['done', 'failed', 'cancelled'];

interface ProgressPoll<View> {
  view: View;
  /** The last request did not get an answer. */
  isOffline: boolean;
}

/** @param url answers with a `View` as JSON */
export function useProgress<View extends { state: string }>(url: string, start: View): ProgressPoll<View> {
  const router = useRouter();
  const [poll, setPoll] = useState<ProgressPoll<View>>({ view: start, isOffline: false });

  useEffect(() => {
    const abort = new AbortController();
    let timer: ReturnType<typeof setTimeout>;

    async function ask() {
      const view = await fetchView<View>(url, abort.signal);
      if (abort.signal.aborted) return;
      if (view) setPoll({ view, isOffline: false });
      else setPoll((known) => ({ ...known, isOffline: true }));
      if (view && ENDED.includes(view.state)) router.refresh();
      else timer = setTimeout(ask, view ? POLL_MS : RETRY_MS);
    }

    timer = setTimeout(ask, POLL_MS);
    return () => {
      abort.abort();
      clearTimeout(timer);
    };
  }, [url, router]);

  return poll;
}

async function fetchView<View>(url: string, signal: AbortSignal): Promise<View | null> {
  try {
    const answer = await fetch(url, { signal });
    return answer.ok ? ((await answer.json()) as View) : null;
  } catch {
    return null;
  }
}
