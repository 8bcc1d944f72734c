/** All markets of the workspace: outcome in words, odds strip, age of the data, state. */
import Link from 'next/link';
import type { MarketSummary } from '@/lib/services/list-markets';
import { OddsBar } from '../brief/odds-strip';
import styles from './market-list.module.css';
import { sortByAttention, stripParts, wordData, wordOutcome, wordState } from './market-rows';

interface MarketListProps {
  markets: MarketSummary[];
  /** Month of the reader, for the age of the data. */
  thisMonth: number;
}

export function MarketList({ markets, thisMonth }: MarketListProps) {
  return (
    <ul className={styles.list}>
      {sortByAttention(markets).map((market) => (
        <MarketRow key={market.id} market={market} thisMonth={thisMonth} />
      ))}
    </ul>
  );
}

function MarketRow({ market, thisMonth }: { market: MarketSummary; thisMonth: number }) {
  const outcome = wordOutcome(market);
  const state = wordState(market);
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
        <p className={styles.small}>
          {state ? <strong>{state}. </strong> : null}
          {wordData(market, thisMonth)}
        </p>
      </div>
    </li>
  );
}
