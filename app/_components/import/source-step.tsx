'use client';

/** Where the counts come from: a file dropped or chosen, or a table pasted from a spreadsheet. */
import { useId, useState } from 'react';
import { Button as PressButton } from 'react-aria-components/Button';
import { DropZone } from 'react-aria-components/DropZone';
import { FileTrigger } from 'react-aria-components/FileTrigger';
import { MAX_UPLOAD_BYTES } from '@/app/_lib/upload-limit';
import { decodeText } from '@/lib/series/decode-text';
import { buttonClass } from '../controls/button-class';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import styles from './source-step.module.css';

export interface SourceText {
  fileName: string | null;
  text: string;
}

const FILE_TYPES = ['.csv', '.tsv', '.txt', 'text/csv', 'text/tab-separated-values', 'text/plain'];

const TOO_LARGE: Explanation = {
  what: 'This file is too large.',
  why: `It has more than ${MAX_UPLOAD_BYTES / 1_000_000} MB; a century of months has a few kilobytes.`,
  tryThis: 'Keep one row a month and the three columns.',
};
const UNREADABLE: Explanation = {
  what: 'This file could not be opened.',
  why: 'The browser was not given its content.',
  tryThis: 'Choose it again, or paste the table.',
};

interface SourceStepProps {
  source: SourceText;
  onChange: (source: SourceText) => void;
}

export function SourceStep({ source, onChange }: SourceStepProps) {
  const id = useId();
  const [problem, setProblem] = useState<Explanation | null>(null);

  async function readFile(file: File | null | undefined) {
    if (!file) return;
    if (file.size > MAX_UPLOAD_BYTES) return setProblem(TOO_LARGE);
    try {
      const text = decodeText(new Uint8Array(await file.arrayBuffer()));
      setProblem(null);
      onChange({ fileName: file.name, text });
    } catch {
      setProblem(UNREADABLE);
    }
  }

  return (
    <div className={styles.step}>
      <DropZone
        aria-label="Drop a CSV or TSV file"
        className={styles.drop!}
        getDropOperation={() => 'copy'}
        onDrop={async (event) => {
          const item = event.items.find((dropped) => dropped.kind === 'file');
          await readFile(await item?.getFile());
        }}
      >
        <FileTrigger acceptedFileTypes={FILE_TYPES} onSelect={(files) => readFile(files?.[0])}>
          <PressButton className={buttonClass('main')}>Choose a file</PressButton>
        </FileTrigger>
        <span>or drop a CSV or TSV file here{source.fileName ? '. ' : ', or paste the table below.'}</span>
        {source.fileName ? <strong className={styles.fileName}>{source.fileName}</strong> : null}
      </DropZone>
      <ProblemNote explanation={problem} />
      <label htmlFor={id} className={styles.label}>
        The table, with its header
      </label>
      <textarea
        id={id}
        className={styles.paste}
        value={source.text}
        rows={8}
        spellCheck={false}
        maxLength={MAX_UPLOAD_BYTES}
        placeholder={'Month\tUs\tThem\n2024-01\t120400\t88000'}
        onChange={(event) => onChange({ fileName: null, text: event.target.value })}
      />
    </div>
  );
}
