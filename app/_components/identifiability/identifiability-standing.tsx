'use client';

/** How the analysis of what the data can tell stands while it has no result; the page is read anew when it has ended. */
import type { AnalysisStanding } from '@/lib/services/read-analysis';
import { useProgress } from '../fit/use-progress';
import styles from './identifiability.module.css';

type View = Pick<AnalysisStanding, 'state' | 'progress'>;

interface IdentifiabilityStandingProps {
  marketId: string;
  start: View;
}

export function IdentifiabilityStanding({ marketId, start }: IdentifiabilityStandingProps) {
  const { view } = useProgress(`/markets/${marketId}/identifiability`, start);
  return (
    <p className={styles.waiting} data-screen-only>
      <span role="status">{wordState(view)}</span> {wordCount(view)}
    </p>
  );
}

function wordState({ state }: View): string {
  if (state === 'failed')
    return 'What more months would tell could not be worked out. It is tried again with the next fit.';
  if (state === 'cancelled')
    return 'What more months would tell was not worked out. It will be with the next fit.';
  return 'Working out how many more months the data need.';
}

/** Not part of the status: it changes too often to be read out. */
function wordCount({ state, progress }: View): string {
  return progress && state === 'running' ? `${progress.done} of ${progress.total} parts done.` : '';
}
