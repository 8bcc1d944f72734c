'use client';

/**
 * Size of an element in whole CSS pixels, kept up to date. Charts are laid out for the size their frame has, so a phone
 * gets a chart of its own rather than a shrunken one. null until the first measurement.
 */
import { type RefObject, useLayoutEffect, useRef, useState } from 'react';

export interface ElementSize {
  width: number;
  height: number;
}

export function useElementSize<T extends HTMLElement>(): [RefObject<T | null>, ElementSize | null] {
  const ref = useRef<T>(null);
  const [size, setSize] = useState<ElementSize | null>(null);

  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return;
    const measure = () => {
      const width = Math.floor(element.clientWidth);
      const height = Math.floor(element.clientHeight);
      setSize((known) => (known?.width === width && known.height === height ? known : { width, height }));
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);

  return [ref, size];
}
