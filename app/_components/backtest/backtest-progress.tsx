'use client';

/** The test of past forecasts on its way: how many forecasts are made, as counted by the worker. */
import { useState, useTransition } from 'react';
import { cancelBacktestAction } from '@/app/_actions/cancel-backtest';
import type { AnalysisStanding } from '@/lib/services/read-analysis';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import { useProgress } from '../fit/use-progress';
import styles from './backtest.module.css';

type View = Pick<AnalysisStanding, 'state' | 'progress' | 'isCancelling'>;

interface BacktestProgressProps {
  marketId: string;
  start: View;
  canCancel: boolean;
}

export function BacktestProgress({ marketId, start, canCancel }: BacktestProgressProps) {
  const { view, isOffline } = useProgress(`/markets/${marketId}/backtest`, start);
  return (
    <>
      <p>Testing this model on past months, against simple methods.</p>
      <p>
        <span role="status">{wordState(view)}</span> {wordCount(view)}
      </p>
      {view.progress ? <ProgressBar {...view.progress} /> : null}
      {isOffline ? (
        <p className={styles.offline}>The server does not answer. The test goes on; we keep asking.</p>
      ) : null}
      {canCancel && view.state !== 'absent' ? (
        <CancelButton marketId={marketId} isCancelling={view.isCancelling} />
      ) : null}
    </>
  );
}

function ProgressBar({ done, total }: { done: number; total: number }) {
  return (
    <div
      className={styles.bar}
      role="progressbar"
      aria-label="Past forecasts made"
      aria-valuemin={0}
      aria-valuemax={total}
      aria-valuenow={done}
    >
      <span style={{ inlineSize: `${(100 * done) / total}%` }} />
    </div>
  );
}

function wordState({ state, progress, isCancelling }: View): string {
  if (isCancelling) return 'Stopping at the next report.';
  if (state === 'queued' || state === 'absent') return 'Waiting for a worker.';
  return progress ? 'Running.' : 'Starting.';
}

/** Not part of the status: it changes too often to be read out. */
function wordCount({ state, progress }: View): string {
  return progress && state === 'running' ? `${progress.done} of ${progress.total} forecasts made.` : '';
}

function CancelButton({ marketId, isCancelling }: { marketId: string; isCancelling: boolean }) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  return (
    <>
      <Button
        isBusy={isPending || isCancelling}
        busyLabel="Stopping"
        onClick={() => startTransition(async () => setExplanation(await cancelBacktestAction(marketId)))}
      >
        Cancel the test
      </Button>
      <ProblemNote explanation={explanation} />
    </>
  );
}
