'use client';

/** One number of a prior: typed, kept in its range. */
import { useId } from 'react';
import { Input, NumberField } from 'react-aria-components/NumberField';
import styles from './priors.module.css';

interface PriorNumberProps {
  label: string;
  value: number;
  range: { min: number; max: number };
  format: Intl.NumberFormatOptions;
  onChange: (value: number) => void;
}

export function PriorNumber({ label, value, range, format, onChange }: PriorNumberProps) {
  const id = useId();
  return (
    <NumberField
      aria-labelledby={id}
      value={value}
      minValue={range.min}
      maxValue={range.max}
      formatOptions={format}
      isWheelDisabled
      onChange={(typed) => Number.isFinite(typed) && onChange(typed)}
      className={styles.number!}
    >
      <span id={id}>{label}</span>
      <Input className={styles.input!} />
    </NumberField>
  );
}
