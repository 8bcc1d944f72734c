/** A labelled choice from a list, as the browser's own control. */
import { type ComponentPropsWithRef, type ReactNode, useId } from 'react';
import styles from './text-field.module.css';

interface ChoiceFieldProps extends Omit<ComponentPropsWithRef<'select'>, 'id'> {
  label: string;
  help?: ReactNode;
  options: readonly { value: string; label: string }[];
}

export function ChoiceField({ label, help, options, ...select }: ChoiceFieldProps) {
  const id = useId();
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {label}
      </label>
      <select {...select} id={id} className={styles.input} aria-describedby={help ? `${id}-help` : undefined}>
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
      {help ? (
        <p id={`${id}-help`} className={styles.help}>
          {help}
        </p>
      ) : null}
    </div>
  );
}
