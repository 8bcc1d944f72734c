/** A labelled line of text with its help and its problem wired to it. Works before scripts load. */
import { type ComponentPropsWithRef, type ReactNode, useId } from 'react';
import styles from './text-field.module.css';

interface TextFieldProps extends Omit<ComponentPropsWithRef<'input'>, 'id'> {
  label: string;
  help?: ReactNode;
  problem?: string | null | undefined;
  /** After the input, on its line: a unit. */
  suffix?: ReactNode;
}

export function TextField({ label, help, problem, suffix, ...input }: TextFieldProps) {
  const id = useId();
  const described = [help ? `${id}-help` : '', problem ? `${id}-problem` : ''].filter(Boolean).join(' ');
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {label}
      </label>
      <span className={styles.line}>
        <input
          {...input}
          id={id}
          className={styles.input}
          aria-invalid={problem ? true : undefined}
          aria-describedby={described || undefined}
        />
        {suffix}
      </span>
      {help ? (
        <p id={`${id}-help`} className={styles.help}>
          {help}
        </p>
      ) : null}
      {problem ? (
        <p id={`${id}-problem`} className={styles.problem}>
          {problem}
        </p>
      ) : null}
    </div>
  );
}
