'use client';

/** A number that may be left empty, typed in the reader's spelling of numbers. */
import { Input, Label, NumberField } from 'react-aria-components/NumberField';
import styles from './change.module.css';

interface NumberInputProps {
  label: string;
  /** null: empty. */
  value: number | null;
  min?: number;
  max: number;
  format?: Intl.NumberFormatOptions;
  isRequired?: boolean;
  /** null: emptied. */
  onChange: (value: number | null) => void;
}

export function NumberInput({
  label,
  value,
  min = 0,
  max,
  format,
  isRequired = false,
  onChange,
}: NumberInputProps) {
  return (
    <NumberField
      className={styles.number!}
      value={value ?? Number.NaN}
      minValue={min}
      maxValue={max}
      formatOptions={format ?? { maximumSignificantDigits: 9 }}
      isWheelDisabled
      isRequired={isRequired}
      onChange={(typed) => onChange(Number.isFinite(typed) ? typed : null)}
    >
      <Label className={styles.numberLabel!}>{label}</Label>
      <Input className={styles.numberInput!} />
    </NumberField>
  );
}
