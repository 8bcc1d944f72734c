'use client';

/** Runs a long question in slices between frames, so that the page stays awake; it can be stopped, and its answer knows when it is out of date. */
import { useCallback, useEffect, useRef, useState } from 'react';
import type { AnswerRun } from '@/lib/scenario/answer-run';

export type AnswerState<T> =
  | { state: 'nothing' }
  | { state: 'running'; progress: number }
  | { state: 'done'; answer: T };

/** The page gets a turn after so many milliseconds. */
const TURN_MS = 12;

interface AnswerControl<T> {
  answer: AnswerState<T>;
  /** The subject has changed since the answer was asked for. */
  isOld: boolean;
  ask: (run: AnswerRun<T>) => void;
  stop: () => void;
}

/** @param subject what the answer depends on, compared one by one */
export function useAnswerRun<T>(subject: readonly unknown[]): AnswerControl<T> {
  const [asked, setAsked] = useState(subject);
  const [answer, setAnswer] = useState<AnswerState<T>>({ state: 'nothing' });
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const halt = useCallback(() => {
    if (timer.current !== null) clearTimeout(timer.current);
    timer.current = null;
  }, []);
  useEffect(() => halt, [halt]);

  const ask = (run: AnswerRun<T>) => {
    halt();
    setAsked(subject);
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
  };
  const stop = useCallback(() => {
    halt();
    setAnswer({ state: 'nothing' });
  }, [halt]);
  const isOld = asked.length !== subject.length || asked.some((part, index) => part !== subject[index]);
  return { answer, isOld, ask, stop };
}
