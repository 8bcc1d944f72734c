'use client';

/** Asks for a fit of the newest revision. */
import { useState, useTransition } from 'react';
import { requestFitAction } from '@/app/_actions/request-fit';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';

export function FitButton({ marketId, label = 'Fit again' }: { marketId: string; label?: string }) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  return (
    <>
      <Button
        kind="main"
        isBusy={isPending}
        busyLabel="Asking for a fit"
        onClick={() => startTransition(async () => setExplanation(await requestFitAction(marketId)))}
      >
        {label}
      </Button>
      <ProblemNote explanation={explanation} />
    </>
  );
}
