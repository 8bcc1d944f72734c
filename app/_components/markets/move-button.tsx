'use client';

/** A quiet button that moves a market on or off the list and says so when it could not. */
import { type ReactNode, useState, useTransition } from 'react';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';

interface MoveButtonProps {
  children: ReactNode;
  /** Names the button apart from its likes. */
  label: string;
  busyLabel: string;
  /** null: moved. */
  move: () => Promise<Explanation | null>;
}

export function MoveButton({ children, label, busyLabel, move }: MoveButtonProps) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  return (
    <>
      <Button
        kind="text"
        aria-label={label}
        isBusy={isPending}
        busyLabel={busyLabel}
        onClick={() => startTransition(async () => setExplanation(await move()))}
      >
        {children}
      </Button>
      <ProblemNote explanation={explanation} />
    </>
  );
}
