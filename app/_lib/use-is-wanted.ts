'use client';

/**
 * Whether what lies below the first screen is wanted yet: once its place is near the window, or the reader has moved, typed, touched,
 * scrolled or prints. Until then its code is not fetched, so the first screen does not wait for it.
 */
import { type RefObject, useEffect, useState, useSyncExternalStore } from 'react';

const SIGNS = ['scroll', 'pointermove', 'pointerdown', 'touchstart', 'keydown', 'beforeprint'] as const;
/** A place this far below the window counts as near. */
const NEAR = '200px';

let isReaderSeen = false;

/** Tells when the first sign of a reader comes; each listener hears it once. */
function listenForReader(onSeen: () => void): () => void {
  const hear = () => {
    isReaderSeen = true;
    onSeen();
    stop();
  };
  const stop = () => {
    for (const sign of SIGNS) window.removeEventListener(sign, hear);
  };
  for (const sign of SIGNS) window.addEventListener(sign, hear, { passive: true });
  return stop;
}

export function useIsWanted(place: RefObject<Element | null>): boolean {
  const isSeen = useSyncExternalStore(
    listenForReader,
    () => isReaderSeen,
    () => false,
  );
  const [isNear, setIsNear] = useState(false);
  useEffect(() => {
    const element = place.current;
    if (!element || isNear) return;
    const observer = new IntersectionObserver(
      (entries) => {
        if (entries.some((entry) => entry.isIntersecting)) setIsNear(true);
      },
      { rootMargin: NEAR },
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, [place, isNear]);
  return isSeen || isNear;
}
