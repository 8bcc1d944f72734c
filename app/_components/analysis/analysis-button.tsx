'use client';

/** Has an analysis made again after it failed or was cancelled. */
import { useState, useTransition } from 'react';
import { requestAnalysisAction } from '@/app/_actions/request-analysis';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';

interface AnalysisButtonProps {
  marketId: string;
  kind: 'backtest' | 'identifiability';
}

export function AnalysisButton({ marketId, kind }: AnalysisButtonProps) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  return (
    <>
      <Button
        isBusy={isPending}
        busyLabel="Asking for it"
        onClick={() =>
          startTransition(async () => setExplanation(await requestAnalysisAction(marketId, kind)))
        }
      >
        Try again
      </Button>
      <ProblemNote explanation={explanation} />
    </>
  );
}
