/** All revisions of a market, newest first: when, by whom, from which file, why, and what was made from each. */
import Link from 'next/link';
import { formatDay, LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import type { HistoryEntry } from '@/lib/services/list-history';
import styles from './history-list.module.css';

const months = createMonthFormat(LOCALE);

export function HistoryList({ marketId, history }: { marketId: string; history: HistoryEntry[] }) {
  return (
    <ol className={styles.list} reversed>
      {history.map((revision) => (
        <li key={revision.id} className={styles.revision}>
          <h3 className={styles.name}>
            <Link href={`/markets/${marketId}/data/revisions/${revision.number}`}>
              Revision {revision.number}
            </Link>
            <span className={styles.when}>
              {' · '}
              {formatDay(revision.createdAt)}
              {revision.createdByName ? `, ${revision.createdByName}` : ''}
            </span>
          </h3>
          <p className={styles.facts}>{describeRevision(revision)}</p>
          {revision.note ? <p className={styles.note}>{revision.note}</p> : null}
        </li>
      ))}
    </ol>
  );
}

function describeRevision(revision: HistoryEntry): string {
  const last = revision.firstMonth + revision.months - 1;
  const parts = [
    `${revision.months} months to ${months.short(last)}`,
    revision.restoredFrom === null ? '' : `revision ${revision.restoredFrom} brought back`,
    revision.fileName ?? '',
    revision.hasOutlook ? 'the outlook was made from it' : '',
    revision.issuedCount === 0
      ? ''
      : `${revision.issuedCount} ${revision.issuedCount === 1 ? 'forecast' : 'forecasts'} issued from it`,
  ];
  return parts.filter(Boolean).join(' · ');
}
