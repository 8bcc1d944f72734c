'use client';

/** Has past forecasts tested again. */
import { useState, useTransition } from 'react';
import { requestBacktestAction } from '@/app/_actions/request-backtest';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';

export function BacktestButton({ marketId }: { marketId: string }) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  return (
    <>
      <Button
        isBusy={isPending}
        busyLabel="Asking for the test"
        onClick={() => startTransition(async () => setExplanation(await requestBacktestAction(marketId)))}
      >
        Test past forecasts
      </Button>
      <ProblemNote explanation={explanation} />
    </>
  );
}
