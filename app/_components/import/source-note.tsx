'use client';

/** Where the rival's figures come from, in the analyst's words, beside what the law asks of them. */
import { useId } from 'react';
import { MAX_NOTE_LENGTH } from '@/lib/services/form-limits';
import styles from './source-note.module.css';

export function SourceNote({ value, onChange }: { value: string; onChange: (note: string) => void }) {
  const id = useId();
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        Where the rival’s figures come from
      </label>
      <textarea
        id={id}
        className={styles.input}
        rows={2}
        maxLength={MAX_NOTE_LENGTH}
        value={value}
        aria-describedby={`${id}-help`}
        onChange={(event) => onChange(event.target.value)}
        placeholder="Published quarterly figures, our web panel, a bought study"
      />
      <p id={`${id}-help`} className={styles.help}>
        Only from lawful sources, and never by exchange with the rival. Aggregate counts only: no personal
        data. Unpublished figures of a listed company may be inside information.
      </p>
    </div>
  );
}
