'use client';

/** A choice of one among a few views, set as words in a row; the chosen word is underlined. The browser's own radio buttons. */
import { useId } from 'react';
import styles from './view-switch.module.css';

interface ViewSwitchProps<Id extends string> {
  /** Read to screen readers only. */
  label: string;
  views: readonly { id: Id; label: string }[];
  value: Id;
  onChange: (id: Id) => void;
}

export function ViewSwitch<Id extends string>({ label, views, value, onChange }: ViewSwitchProps<Id>) {
  const name = useId();
  return (
    <div role="radiogroup" aria-label={label} className={styles.group}>
      {views.map((view) => (
        <label key={view.id} className={styles.choice}>
          <input
            type="radio"
            className={styles.input}
            name={name}
            value={view.id}
            checked={view.id === value}
            onChange={() => onChange(view.id)}
          />
          <span className={styles.word}>{view.label}</span>
        </label>
      ))}
    </div>
  );
}
