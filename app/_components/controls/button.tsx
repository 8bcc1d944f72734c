'use client';

/**
 * Buttons: `main` for the one step a page asks for, `plain` beside it, `text` inside a line. A link that acts as the next
 * step takes the same classes through `buttonClass`.
 */
import type { ComponentPropsWithRef } from 'react';
import styles from './button.module.css';

export type ButtonKind = 'main' | 'plain' | 'text';

export function buttonClass(kind: ButtonKind): string {
  return `${styles.button} ${styles[kind]}`;
}

interface ButtonProps extends ComponentPropsWithRef<'button'> {
  kind?: ButtonKind;
  /** Busy: says so and ignores presses, but stays focusable. */
  isBusy?: boolean;
  busyLabel?: string;
}

export function Button({
  kind = 'plain',
  isBusy = false,
  busyLabel,
  children,
  onClick,
  type = 'button',
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      className={buttonClass(kind)}
      aria-disabled={isBusy || undefined}
      onClick={(event) => {
        if (isBusy) event.preventDefault();
        else onClick?.(event);
      }}
    >
      {isBusy && busyLabel ? busyLabel : children}
    </button>
  );
}
