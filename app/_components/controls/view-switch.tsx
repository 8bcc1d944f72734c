'use client';

/** A choice of one among a few views, set as words in a row; the chosen word is underlined. */
import { Radio, RadioGroup } from 'react-aria-components/RadioGroup';
import styles from './view-switch.module.css';

interface ViewSwitchProps<Id extends string> {
  /** Read to screen readers only. */
  label: string;
  views: readonly { id: Id; label: string }[];
  value: Id;
  onChange: (id: Id) => void;
}

export function ViewSwitch<Id extends string>({ label, views, value, onChange }: ViewSwitchProps<Id>) {
  return (
    <RadioGroup
      aria-label={label}
      orientation="horizontal"
      value={value}
      onChange={(id) => onChange(id as Id)}
      className={styles.group!}
    >
      {views.map((view) => (
        <Radio key={view.id} value={view.id} className={styles.choice!}>
          {view.label}
        </Radio>
      ))}
    </RadioGroup>
  );
}
