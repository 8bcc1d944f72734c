'use client';

/** A plain range with its value beside it; the value can be typed. Both name themselves by the same label. */
import type { ReactNode } from 'react';
import { Input, NumberField } from 'react-aria-components/NumberField';
import { Slider, SliderThumb, SliderTrack } from 'react-aria-components/Slider';
import { LOCALE } from '@/app/_lib/locale';
import styles from './range-field.module.css';

interface RangeFieldProps {
  label: string;
  /** After the value: the unit, or what the value comes to. */
  suffix?: ReactNode;
  value: number;
  min: number;
  max: number;
  step: number;
  format?: Intl.NumberFormatOptions;
  isDisabled?: boolean;
  onChange: (value: number) => void;
}

export function RangeField({
  label,
  suffix,
  value,
  min,
  max,
  step,
  format,
  isDisabled = false,
  onChange,
}: RangeFieldProps) {
  const filled = max > min ? ((value - min) / (max - min)) * 100 : 0;
  return (
    <div className={styles.field}>
      <div className={styles.line}>
        <span aria-hidden="true">{label}</span>
        <span className={styles.value}>
          <NumberField
            aria-label={label}
            value={value}
            minValue={min}
            maxValue={max}
            step={step}
            formatOptions={format}
            isDisabled={isDisabled}
            isWheelDisabled
            onChange={(typed) => Number.isFinite(typed) && onChange(typed)}
          >
            <Input className={styles.input!} style={{ width: `${widthOf(max, format)}ch` }} />
          </NumberField>
          {suffix ? <span className={styles.suffix}>{suffix}</span> : null}
        </span>
      </div>
      <Slider
        aria-label={label}
        value={value}
        minValue={min}
        maxValue={max}
        step={step}
        formatOptions={format}
        isDisabled={isDisabled}
        onChange={onChange}
        className={styles.slider!}
      >
        <SliderTrack className={styles.track!}>
          <div className={styles.rail} />
          <div className={styles.filled} style={{ width: `${filled}%` }} />
          <SliderThumb className={styles.thumb!} />
        </SliderTrack>
      </Slider>
    </div>
  );
}

/** Letters that the widest value takes, with room for the caret. */
function widthOf(max: number, format: Intl.NumberFormatOptions | undefined): number {
  return new Intl.NumberFormat(LOCALE, format).format(max).length + 2;
}
