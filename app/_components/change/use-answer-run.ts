'use client';

/** Runs a long question in slices between frames, so that the page stays awake; it can be stopped. */
import { useCallback, useEffect, useRef, useState } from 'react';
import type { AnswerRun } from '@/lib/scenario/answer-run';

export type AnswerState<T> =
  | { state: 'nothing' }
  | { state: 'running'; progress: number }
  | { state: 'done'; answer: T };

/** The page gets a turn after so many milliseconds. */
const TURN_MS = 12;

export function useAnswerRun<T>(): [AnswerState<T>, ask: (run: AnswerRun<T>) => void, stop: () => void] {
  const [answer, setAnswer] = useState<AnswerState<T>>({ state: 'nothing' });
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const halt = useCallback(() => {
    if (timer.current !== null) clearTimeout(timer.current);
    timer.current = null;
  }, []);
  useEffect(() => halt, [halt]);

  const ask = useCallback(
    (run: AnswerRun<T>) => {
      halt();
      setAnswer({ state: 'running', progress: 0 });
      const work = () => {
        const end = performance.now() + TURN_MS;
        let step = run.next();
        while (!step.done && performance.now() < end) step = run.next();
        if (step.done) return setAnswer({ state: 'done', answer: step.value });
        setAnswer({ state: 'running', progress: step.value });
        timer.current = setTimeout(work, 0);
      };
      timer.current = setTimeout(work, 0);
    },
    [halt],
  );
  const stop = useCallback(() => {
    halt();
    setAnswer({ state: 'nothing' });
  }, [halt]);
  return [answer, ask, stop];
}
