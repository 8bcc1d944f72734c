/** How the analysis of what the data can tell stands while it has no result: on its way, failed, cancelled, or to come with the next fit. */
import { explainAnalysisFailure } from '@/lib/services/explain';
import type { MarketPage } from '@/lib/services/read-market';
import { AnalysisButton } from '../analysis/analysis-button';
import styles from './identifiability.module.css';
import { IdentifiabilityProgress } from './identifiability-progress';

interface IdentifiabilityStandingProps {
  page: MarketPage;
  canWrite: boolean;
}

export function IdentifiabilityStanding({ page, canWrite }: IdentifiabilityStandingProps) {
  const { analyses, outlook, market } = page;
  if (!analyses || !outlook) return null;
  const { state, progress, failureCode } = analyses.identifiability;
  // an outlook that is out of date gets its analysis with the next fit; a fresh one is about to get it
  if (state === 'done' || (state === 'absent' && outlook.staleReasons.length > 0)) return null;
  if (state === 'failed' || state === 'cancelled') {
    return (
      <div className={`${styles.waiting} ${styles.ended}`} data-screen-only>
        <p>{wordEnd(state, failureCode)}</p>
        {canWrite ? <AnalysisButton marketId={market.id} kind="identifiability" /> : null}
      </div>
    );
  }
  return <IdentifiabilityProgress marketId={market.id} start={{ state, progress }} />;
}

function wordEnd(state: 'failed' | 'cancelled', failureCode: string | null): string {
  if (state === 'cancelled') return 'Working out what the data can tell was cancelled.';
  const { what, why, tryThis } = explainAnalysisFailure('identifiability', failureCode);
  return `${what} ${why} ${tryThis}`;
}
