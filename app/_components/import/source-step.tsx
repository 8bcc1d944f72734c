'use client';

/** Where the counts come from: one zone to drop a file on, to choose one, or to paste cells into. Nothing is sent anywhere yet. */
import Link from 'next/link';
import { type ClipboardEvent, useEffect, useId, useState } from 'react';
import { Button as PressButton } from 'react-aria-components/Button';
import { DropZone } from 'react-aria-components/DropZone';
import { FileTrigger } from 'react-aria-components/FileTrigger';
import { MAX_FILE_BYTES } from '@/app/_lib/upload-limit';
import { Button } from '../controls/button';
import { buttonClass } from '../controls/button-class';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import styles from './source-step.module.css';
import type { Reading, ReadingState } from './use-reading';

/** What a file dialog offers; any other file can be dropped and is looked at by its content. */
const FILE_TYPES = ['.csv', '.tsv', '.txt', '.xlsx', 'text/csv', 'text/tab-separated-values', 'text/plain'];
/** A longer paste is read at once and not kept in the field, which would be slow. */
const LONG_PASTE = 50_000;
const TYPING_PAUSE_MS = 250;

const EXPLANATIONS: Partial<Record<ReadingState, Explanation>> = {
  'too-large': {
    what: 'This is too large.',
    why: `At most ${MAX_FILE_BYTES / 1_000_000} MB are read; a century of months has a few kilobytes.`,
    tryThis: 'Keep the month and the firms’ counts, and leave other columns and years out.',
  },
  unreadable: {
    what: 'This file could not be opened.',
    why: 'The browser was not given its content.',
    tryThis: 'Choose it again, or paste the cells.',
  },
};

export function SourceStep({ reading }: { reading: Reading }) {
  const id = useId();
  const [typed, setTyped] = useState('');
  const { giveFile, giveText } = reading;

  useEffect(() => {
    if (typed === '') return;
    const timer = setTimeout(() => giveText(typed), TYPING_PAUSE_MS);
    return () => clearTimeout(timer);
  }, [typed, giveText]);

  function takeFile(file: File | null | undefined) {
    if (!file) return;
    setTyped('');
    giveFile(file);
  }

  function pasteLong(event: ClipboardEvent) {
    const file = event.clipboardData.files[0];
    const text = event.clipboardData.getData('text/plain');
    if (text.length < LONG_PASTE && (text !== '' || !file)) return;
    event.preventDefault();
    if (text === '') return takeFile(file);
    setTyped('');
    giveText(text);
  }

  return (
    <div className={styles.step}>
      <DropZone
        aria-label="Counts: drop a file here"
        className={styles.drop!}
        getDropOperation={() => 'copy'}
        onDrop={async (event) => {
          const file = event.items.find((item) => item.kind === 'file');
          if (file) return takeFile(await file.getFile());
          const text = event.items.find((item) => item.kind === 'text' && item.types.has('text/plain'));
          if (text?.kind === 'text') giveText(await text.getText('text/plain'));
        }}
      >
        <div className={styles.choose}>
          <FileTrigger acceptedFileTypes={FILE_TYPES} onSelect={(files) => takeFile(files?.[0])}>
            <PressButton className={buttonClass('main')}>Choose a file</PressButton>
          </FileTrigger>
          <span>or drop it here: CSV, TSV, text or an Excel workbook.</span>
        </div>
        <label htmlFor={id} className={styles.label}>
          Or paste the cells, with their header
        </label>
        <textarea
          id={id}
          className={styles.paste}
          value={typed}
          rows={4}
          spellCheck={false}
          placeholder={'Month\tUs\tThem\n2024-01\t120400\t88000'}
          onPaste={pasteLong}
          onChange={(event) => {
            setTyped(event.target.value);
            if (event.target.value === '') giveText('');
          }}
        />
      </DropZone>
      <p className={styles.rules}>
        <Link href="/format" target="_blank">
          What a file may look like
        </Link>
        , with a template and a sample. Everything is read in your browser; nothing is sent before you store
        it.
      </p>
      <SourceStanding reading={reading} />
    </div>
  );
}

function SourceStanding({ reading }: { reading: Reading }) {
  const { state, source, cancel } = reading;
  return (
    <>
      <p className={styles.standing} aria-live="polite">
        {source && state !== 'nothing' ? (
          <>
            <strong className={styles.fileName}>{source.fileName ?? 'Pasted cells'}</strong>{' '}
            {describeSize(source.size)}
            {state === 'reading' ? ', being read' : ''}
            {state === 'cancelled' ? ', not read: you cancelled it' : ''}
          </>
        ) : null}
      </p>
      {state === 'reading' ? (
        <div>
          <Button onClick={cancel}>Cancel</Button>
        </div>
      ) : null}
      <ProblemNote explanation={EXPLANATIONS[state] ?? null} />
    </>
  );
}

function describeSize(size: number): string {
  if (size < 1000) return `${size} bytes`;
  return size < 1_000_000 ? `${Math.round(size / 1000)} kB` : `${(size / 1_000_000).toFixed(1)} MB`;
}
