'use client';

/** The analysis of what the data can tell on its way; the page is read anew when it has ended. */
import type { AnalysisStanding } from '@/lib/services/read-analysis';
import { useProgress } from '../fit/use-progress';
import styles from './identifiability.module.css';

type View = Pick<AnalysisStanding, 'state' | 'progress'>;

interface IdentifiabilityProgressProps {
  marketId: string;
  start: View;
}

export function IdentifiabilityProgress({ marketId, start }: IdentifiabilityProgressProps) {
  const { view } = useProgress(`/markets/${marketId}/identifiability`, start);
  return (
    <p className={styles.waiting} data-screen-only>
      <span role="status">Working out how many more months the data need.</span> {wordCount(view)}
    </p>
  );
}

/** Not part of the status: it changes too often to be read out. */
function wordCount({ state, progress }: View): string {
  return progress && state === 'running' ? `${progress.done} of ${progress.total} parts done.` : '';
}
