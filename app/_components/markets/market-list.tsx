/** All markets of the workspace: outcome in words, odds strip, where the share is heading, age of the data, state. */
import Link from 'next/link';
import type { MarketSummary } from '@/lib/services/list-markets';
import { OddsBar } from '../brief/odds-strip';
import { ArchiveButton } from './archive-button';
import styles from './market-list.module.css';
import {
  hasOldCounts,
  sortByAttention,
  stripParts,
  wordData,
  wordOutcome,
  wordShare,
  wordState,
} from './market-rows';

interface MarketListProps {
  markets: MarketSummary[];
  /** Month of the reader, for the age of the data. */
  thisMonth: number;
  canWrite: boolean;
}

export function MarketList({ markets, thisMonth, canWrite }: MarketListProps) {
  return (
    <ul className={styles.list}>
      {sortByAttention(markets, thisMonth).map((market) => (
        <MarketRow key={market.id} market={market} thisMonth={thisMonth} canWrite={canWrite} />
      ))}
    </ul>
  );
}

interface MarketRowProps extends Omit<MarketListProps, 'markets'> {
  market: MarketSummary;
}

function MarketRow({ market, thisMonth, canWrite }: MarketRowProps) {
  const outcome = wordOutcome(market);
  const state = wordState(market);
  const data = wordData(market, thisMonth);
  return (
    <li className={styles.row}>
      <div>
        <h2 className={styles.name}>
          <Link href={`/markets/${market.id}`}>{market.name}</Link>
        </h2>
        <p className={styles.firms}>
          {market.focalName} and {market.rivalName}
          {market.isDemo ? ', a demonstration' : ''}
        </p>
        {canWrite ? (
          <div className={styles.archive}>
            <ArchiveButton marketId={market.id} name={market.name} />
          </div>
        ) : null}
      </div>
      <div>
        {outcome ? <p className={styles.outcome}>{outcome}</p> : null}
        {market.fit?.odds ? (
          <OddsBar
            rows={stripParts(market.fit.odds)}
            description={`Odds in ${market.name}. ${outcome}`}
            isThin
          />
        ) : null}
        <p className={styles.small}>{wordShare(market)}</p>
        <p className={styles.small}>
          {state ? <strong>{state}. </strong> : null}
          {hasOldCounts(market, thisMonth) ? <strong>{data}</strong> : data}
        </p>
      </div>
    </li>
  );
}
