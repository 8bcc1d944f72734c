/**
 * How the newest fit stands, above the brief or in its place: on its way, failed, cancelled, never asked for, or done but
 * out of date. null when there is nothing to say.
 */
import type { ReactNode } from 'react';
import { type Explanation, explainFailure, explainStaleReason } from '@/lib/services/explain';
import type { MarketPage } from '@/lib/services/read-market';
import type { StaleReason } from '@/lib/services/staleness';
import { Question } from '../frame/question';
import { Headline } from '../text/headline';
import { FitButton } from './fit-button';
import { FitProgress } from './fit-progress';
import styles from './fit-standing.module.css';

interface FitStandingProps {
  page: MarketPage;
  canWrite: boolean;
}

export function FitStanding({ page, canWrite }: FitStandingProps) {
  const standing = describeStanding(page, canWrite);
  if (!standing) return null;
  const hasBrief = page.facts !== null;
  return (
    <Question id="fit" question="How does the fit stand?" isFirst={!hasBrief} isScreenOnly={hasBrief}>
      {hasBrief ? (
        <div className={styles.notice}>
          <p className={styles.what}>{standing.what}</p>
          {standing.detail}
        </div>
      ) : (
        <Headline support={standing.detail}>{standing.what}</Headline>
      )}
      {standing.action ? <div className={styles.action}>{standing.action}</div> : null}
    </Question>
  );
}

interface Standing {
  what: string;
  detail: ReactNode;
  action: ReactNode;
}

function describeStanding(page: MarketPage, canWrite: boolean): Standing | null {
  const { market, fit, outlook } = page;
  const again = (label?: string) => (canWrite ? <FitButton marketId={market.id} label={label} /> : null);
  if (!fit) {
    return {
      what: 'Not fitted yet.',
      detail: <p>The counts are stored; no outlook was asked for.</p>,
      action: again('Fit'),
    };
  }
  switch (fit.state) {
    case 'queued':
    case 'running':
      return {
        what: `Fitting ${market.focalName} and ${market.rivalName}.`,
        detail: <p>{wordWaiting(outlook !== null)}</p>,
        action: <FitProgress marketId={market.id} fitId={fit.id} start={fit} canCancel={canWrite} />,
      };
    case 'cancelled':
      return {
        what: 'The fit was cancelled.',
        detail: (
          <p>{outlook ? 'Below is the outlook from before.' : 'No outlook was made. The counts are kept.'}</p>
        ),
        action: again(),
      };
    case 'failed':
      return { ...explainEnd(explainFailure(fit.failureCode)), action: again() };
    case 'done':
      return outlook && outlook.staleReasons.length > 0
        ? {
            what: 'This outlook is out of date.',
            detail: <StaleReasons page={page} reasons={outlook.staleReasons} />,
            action: again(),
          }
        : null;
  }
}

function wordWaiting(hasOutlook: boolean): string {
  const time = 'It takes from seconds to a few minutes. You can leave this page; the fit goes on.';
  return hasOutlook ? `${time} Below is the outlook from before.` : time;
}

function explainEnd({ what, why, tryThis }: Explanation): Omit<Standing, 'action'> {
  return {
    what,
    detail: (
      <p>
        {why} {tryThis}
      </p>
    ),
  };
}

function StaleReasons({ page, reasons }: { page: MarketPage; reasons: StaleReason[] }) {
  const newest = page.revision.number;
  const numbers = { used: page.facts?.revision.number ?? newest, newest };
  return reasons.map((reason) => <p key={reason}>{explainStaleReason(reason, numbers)}</p>);
}
