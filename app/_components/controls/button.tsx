'use client';

/**
 * Buttons: `main` for the one step a page asks for, `plain` beside it, `text` inside a line.
 */
import type { ComponentPropsWithRef } from 'react';
import { type ButtonKind, buttonClass } from './button-class';

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
