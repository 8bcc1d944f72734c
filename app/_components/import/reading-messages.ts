/** What the page and the reading worker tell each other. Numbers tie an answer to what was asked; older answers are dropped. */
import type { Month } from '@/lib/series/types';
import type { ReadingChoices, Understood } from './understood';

export type ReadingRequest =
  /** A new source: it is read and kept for later choices. */
  | { kind: 'open'; number: number; source: File | string; choices: ReadingChoices; thisMonth: Month }
  /** Other choices for the source that is open. */
  | { kind: 'choose'; number: number; choices: ReadingChoices; thisMonth: Month };

export type ReadingAnswer =
  | {
      kind: 'understood';
      number: number;
      understood: Understood;
      /** SHA-256 of the file's bytes, hex; null: no file. */
      fileHash: string | null;
    }
  /** The browser was not given the file's content. */
  | { kind: 'unreadable'; number: number };
