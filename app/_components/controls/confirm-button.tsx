'use client';

/** A button for what cannot be undone: it asks first, in the browser's own modal dialog, which keeps the keyboard inside. */
import { type ReactNode, useId, useRef } from 'react';
import { Button } from './button';
import styles from './confirm-button.module.css';

interface ConfirmButtonProps {
  children: ReactNode;
  /** Names the button apart from its likes: "Revoke the link a1b2". */
  label: string;
  question: string;
  consequence: string;
  confirmLabel: string;
  onConfirm: () => void;
}

export function ConfirmButton({
  children,
  label,
  question,
  consequence,
  confirmLabel,
  onConfirm,
}: ConfirmButtonProps) {
  const id = useId();
  const dialog = useRef<HTMLDialogElement>(null);
  const close = () => dialog.current?.close();
  return (
    <>
      <Button kind="text" aria-label={label} onClick={() => dialog.current?.showModal()}>
        {children}
      </Button>
      <dialog
        ref={dialog}
        role="alertdialog"
        className={styles.dialog}
        aria-labelledby={`${id}-question`}
        aria-describedby={`${id}-consequence`}
      >
        <h3 id={`${id}-question`} className={styles.question}>
          {question}
        </h3>
        <p id={`${id}-consequence`}>{consequence}</p>
        <div className={styles.choices}>
          <Button
            kind="main"
            onClick={() => {
              close();
              onConfirm();
            }}
          >
            {confirmLabel}
          </Button>
          <Button onClick={close}>Keep it</Button>
        </div>
      </dialog>
    </>
  );
}
