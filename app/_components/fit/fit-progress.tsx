'use client';

/** A fit on its way: the numbers as they are, no invented percentage; it can be cancelled. */
import { useState, useTransition } from 'react';
import { cancelFitAction } from '@/app/_actions/cancel-fit';
import { LOCALE } from '@/app/_lib/locale';
import { createNumberFormat } from '@/lib/brief/number-format';
import type { FitProgress as FitProgressNumbers, FitStage } from '@/lib/estimate/types';
import type { FitProgressView } from '@/lib/services/read-fit-progress';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import styles from './fit-progress.module.css';
import { useProgress } from './use-progress';

const STAGES: Record<FitStage, string> = {
  starts: 'Looking for the best fit from many starts',
  polish: 'Refining the best fit',
  'warm-up': 'Learning how wide to look around it',
  sampling: 'Drawing sets of strengths that fit the history',
  outlook: 'Working out the outlook',
};

const whole = new Intl.NumberFormat(LOCALE, { maximumFractionDigits: 0 });
const numbers = createNumberFormat(LOCALE);

interface FitProgressProps {
  marketId: string;
  fitId: string;
  start: FitProgressView;
  canCancel: boolean;
}

export function FitProgress({ marketId, fitId, start, canCancel }: FitProgressProps) {
  const url = `/markets/${marketId}/progress?fit=${encodeURIComponent(fitId)}`;
  const { view, isOffline } = useProgress(url, start);
  return (
    <div className={styles.block}>
      <p role="status" className={styles.stage}>
        {wordStage(view)}
      </p>
      <ProgressNumbers progress={view.progress} />
      {isOffline ? (
        <p className={styles.offline}>The server does not answer. The fit goes on; we keep asking.</p>
      ) : null}
      {canCancel ? <CancelButton marketId={marketId} isCancelling={view.isCancelling} /> : null}
    </div>
  );
}

function wordStage({ state, progress, isCancelling }: FitProgressView): string {
  if (isCancelling) return 'Stopping at the next report';
  if (state === 'queued') return 'Waiting for a worker';
  return progress ? STAGES[progress.stage] : 'Starting';
}

function ProgressNumbers({ progress }: { progress: FitProgressNumbers | null }) {
  const rows = [
    { label: 'Starts done', value: countOf(progress?.startsDone, progress?.startsTotal) },
    {
      label: 'Best value, lower is better',
      value: progress?.bestValue == null ? null : numbers.number(progress.bestValue, undefined),
    },
    {
      label: 'Draws kept',
      value: progress && progress.drawsKept > 0 ? countOf(progress.drawsKept, progress.drawsTarget) : null,
    },
    {
      label: 'R-hat so far, below 1.01 is settled',
      value: progress?.rHat == null ? null : progress.rHat.toFixed(3),
    },
  ];
  return (
    <dl className={styles.numbers}>
      {rows.map((row) => (
        <div key={row.label}>
          <dt>{row.label}</dt>
          <dd>{row.value ?? '–'}</dd>
        </div>
      ))}
    </dl>
  );
}

function countOf(done: number | undefined, total: number | undefined): string | null {
  return done === undefined || !total ? null : `${whole.format(done)} of ${whole.format(total)}`;
}

function CancelButton({ marketId, isCancelling }: { marketId: string; isCancelling: boolean }) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  return (
    <div className={styles.cancel}>
      <Button
        isBusy={isPending || isCancelling}
        busyLabel="Cancelling"
        onClick={() => startTransition(async () => setExplanation(await cancelFitAction(marketId)))}
      >
        Cancel the fit
      </Button>
      <ProblemNote explanation={explanation} />
    </div>
  );
}
