'use client';

/** A button for what cannot be undone: it asks first, in a dialog that keeps the keyboard inside. */
import type { ReactNode } from 'react';
import { Button as PressButton } from 'react-aria-components/Button';
import { Dialog, DialogTrigger, Heading } from 'react-aria-components/Dialog';
import { Modal, ModalOverlay } from 'react-aria-components/Modal';
import { buttonClass } from './button-class';
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
  return (
    <DialogTrigger>
      <PressButton className={buttonClass('text')} aria-label={label}>
        {children}
      </PressButton>
      <ModalOverlay className={styles.overlay!} isDismissable>
        <Modal className={styles.modal!}>
          <Dialog role="alertdialog" className={styles.dialog}>
            {({ close }) => (
              <>
                <Heading slot="title" className={styles.question!}>
                  {question}
                </Heading>
                <p>{consequence}</p>
                <div className={styles.choices}>
                  <PressButton
                    className={buttonClass('main')}
                    onPress={() => {
                      close();
                      onConfirm();
                    }}
                  >
                    {confirmLabel}
                  </PressButton>
                  <PressButton className={buttonClass('plain')} onPress={close}>
                    Keep it
                  </PressButton>
                </div>
              </>
            )}
          </Dialog>
        </Modal>
      </ModalOverlay>
    </DialogTrigger>
  );
}
