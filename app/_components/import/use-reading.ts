'use client';

/** A file or a paste, read in a worker; its state for the page. The last thing given wins; reading can be cancelled. */
import { useCallback, useEffect, useRef, useState } from 'react';
import { MAX_FILE_BYTES } from '@/app/_lib/upload-limit';
import { makeMonth } from '@/lib/series/month';
import type { ProblemFix } from '@/lib/series/types';
import type { ReadingAnswer, ReadingRequest } from './reading-messages';
import { NO_CHOICES, type ReadingChoices, type Understood } from './understood';

export interface GivenSource {
  /** null: pasted or typed. */
  fileName: string | null;
  /** Bytes of a file, characters of a text. */
  size: number;
}

export type ReadingState = 'nothing' | 'reading' | 'read' | 'too-large' | 'unreadable' | 'cancelled';

export interface Reading {
  state: ReadingState;
  source: GivenSource | null;
  /** Another one for each source. */
  sourceNumber: number;
  choices: ReadingChoices;
  /** Stays while other choices are read. */
  understood: Understood | null;
  fileHash: string | null;
  canFit: boolean;
  giveFile(file: File): void;
  giveText(text: string): void;
  choose(choices: ReadingChoices): void;
  /** What is done about one problem of the table. */
  chooseFix(key: string, fix: ProblemFix): void;
  cancel(): void;
}

interface Standing {
  state: ReadingState;
  source: GivenSource | null;
  sourceNumber: number;
  choices: ReadingChoices;
  understood: Understood | null;
  fileHash: string | null;
}

const NOTHING: Standing = {
  state: 'nothing',
  source: null,
  sourceNumber: 0,
  choices: NO_CHOICES,
  understood: null,
  fileHash: null,
};

export function useReading(): Reading {
  const [standing, setStanding] = useState<Standing>(NOTHING);
  const worker = useRef<Worker | null>(null);
  const lastNumber = useRef(0);

  const stop = useCallback(() => {
    worker.current?.terminate();
    worker.current = null;
    lastNumber.current += 1;
  }, []);
  useEffect(() => stop, [stop]);

  const ask = useCallback((request: OpenRequest | ChooseRequest) => {
    worker.current ??= startWorker((answer) => {
      if (answer.number === lastNumber.current) setStanding((before) => takeAnswer(before, answer));
    });
    lastNumber.current += 1;
    const message = { ...request, number: lastNumber.current, thisMonth: readThisMonth() };
    worker.current.postMessage(message satisfies ReadingRequest);
  }, []);

  const give = useCallback(
    (given: File | string) => {
      const source =
        typeof given === 'string'
          ? { fileName: null, size: given.length }
          : { fileName: given.name, size: given.size };
      // A reading under way is of no use any more, and may be long.
      stop();
      if (source.size > MAX_FILE_BYTES) return setStanding({ ...NOTHING, state: 'too-large', source });
      if (typeof given === 'string' && given.trim() === '') return setStanding(NOTHING);
      setStanding(({ sourceNumber }) => ({
        ...NOTHING,
        state: 'reading',
        source,
        sourceNumber: sourceNumber + 1,
      }));
      ask({ kind: 'open', source: given, choices: NO_CHOICES });
    },
    [ask, stop],
  );

  const { understood } = standing;

  function choose(choices: ReadingChoices) {
    setStanding((before) => ({ ...before, state: 'reading', choices }));
    ask({ kind: 'choose', choices });
  }

  return {
    ...standing,
    canFit: standing.state === 'read' && (understood?.canFit ?? false),
    giveFile: give,
    giveText: give,
    choose,
    chooseFix(key, fix) {
      if (!understood?.mapping) return;
      const { sheet, mapping } = understood;
      choose({ sheet, mapping: { ...mapping, fixes: { ...mapping.fixes, [key]: fix } } });
    },
    cancel() {
      stop();
      setStanding({ ...NOTHING, state: 'cancelled', source: standing.source });
    },
  };
}

type OpenRequest = Pick<Extract<ReadingRequest, { kind: 'open' }>, 'kind' | 'source' | 'choices'>;
type ChooseRequest = Pick<Extract<ReadingRequest, { kind: 'choose' }>, 'kind' | 'choices'>;

function startWorker(onAnswer: (answer: ReadingAnswer) => void): Worker {
  const worker = new Worker(new URL('./reading-worker.ts', import.meta.url), { type: 'module' });
  worker.addEventListener('message', (event: MessageEvent<ReadingAnswer>) => onAnswer(event.data));
  return worker;
}

function takeAnswer(before: Standing, answer: ReadingAnswer): Standing {
  if (answer.kind === 'unreadable') return { ...NOTHING, state: 'unreadable', source: before.source };
  const { understood, fileHash } = answer;
  return { ...before, state: 'read', understood, fileHash };
}

function readThisMonth(): number {
  const now = new Date();
  return makeMonth(now.getFullYear(), now.getMonth() + 1);
}
