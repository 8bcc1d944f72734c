'use client';

/** Brings an earlier revision back as the next one, after asking. */
import { useState, useTransition } from 'react';
import { restoreRevisionAction } from '@/app/_actions/restore-revision';
import { ConfirmButton } from '../controls/confirm-button';
import { type Explanation, ProblemNote } from '../controls/problem-note';

interface RestoreButtonProps {
  marketId: string;
  number: number;
  newestNumber: number;
}

export function RestoreButton({ marketId, number, newestNumber }: RestoreButtonProps) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [, startTransition] = useTransition();
  const restore = () =>
    startTransition(async () =>
      setExplanation(await restoreRevisionAction(marketId, { number, basedOn: newestNumber })),
    );
  return (
    <>
      <ConfirmButton
        label={`Bring it back as revision ${newestNumber + 1}`}
        question={`Bring revision ${number} back?`}
        consequence={`Its counts become revision ${newestNumber + 1} and are fitted. Revision ${newestNumber} and all others stay on record.`}
        confirmLabel="Bring it back"
        onConfirm={restore}
      >
        Bring it back as revision {newestNumber + 1}
      </ConfirmButton>
      <ProblemNote explanation={explanation} />
    </>
  );
}
