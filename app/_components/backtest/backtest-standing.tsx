/** How the test of past forecasts stands while it has no result: on its way, failed, cancelled, or to come with the next fit. */
import { explainAnalysisFailure } from '@/lib/services/explain';
import type { MarketPage } from '@/lib/services/read-market';
import { AnalysisButton } from '../analysis/analysis-button';
import styles from './backtest.module.css';
import { BacktestProgress } from './backtest-progress';

interface BacktestStandingProps {
  page: MarketPage;
  canWrite: boolean;
}

export function BacktestStanding({ page, canWrite }: BacktestStandingProps) {
  const { analyses, market, outlook } = page;
  if (!analyses || !outlook) return null;
  const { backtest } = analyses;
  const again = canWrite ? <AnalysisButton marketId={market.id} kind="backtest" /> : null;
  switch (backtest.state) {
    case 'absent':
      // An outlook that is out of date gets its test with the next fit; a fresh one is about to get it.
      return outlook.staleReasons.length > 0 ? null : <Waiting {...{ page, canWrite }} />;
    case 'queued':
    case 'running':
      return <Waiting {...{ page, canWrite }} />;
    case 'failed': {
      const { what, why, tryThis } = explainAnalysisFailure('backtest', backtest.failureCode);
      const isForGood = backtest.failureCode === 'too-few-origins';
      return (
        <div className={`${styles.block} ${styles.waiting}`}>
          <p>
            {what} {why} {tryThis}
          </p>
          {isForGood ? null : again}
        </div>
      );
    }
    case 'cancelled':
      return (
        <div className={`${styles.block} ${styles.waiting}`}>
          <p>The test of past forecasts was cancelled.</p>
          {again}
        </div>
      );
    case 'done':
      return null;
  }
}

function Waiting({ page, canWrite }: BacktestStandingProps) {
  const { state, progress, isCancelling } = page.analyses!.backtest;
  return (
    <div className={`${styles.block} ${styles.waiting}`} data-screen-only>
      <BacktestProgress
        marketId={page.market.id}
        start={{ state, progress, isCancelling }}
        canCancel={canWrite}
      />
    </div>
  );
}
