/** Markets that were taken off the list, folded away; each can be opened and restored. */
import Link from 'next/link';
import { LOCALE } from '@/app/_lib/locale';
import type { ArchivedMarket } from '@/lib/services/list-markets';
import styles from './market-list.module.css';
import { RestoreButton } from './restore-button';

const day = new Intl.DateTimeFormat(LOCALE, { dateStyle: 'medium', timeZone: 'UTC' });

interface ArchiveListProps {
  markets: ArchivedMarket[];
  canWrite: boolean;
}

export function ArchiveList({ markets, canWrite }: ArchiveListProps) {
  if (markets.length === 0) return null;
  return (
    <details className={styles.archived}>
      <summary>{markets.length === 1 ? 'One archived market' : `${markets.length} archived markets`}</summary>
      <ul className={styles.list}>
        {markets.map(({ id, name, focalName, rivalName, archivedAt }) => (
          <li key={id} className={styles.archivedRow}>
            <p>
              <Link href={`/markets/${id}`}>{name}</Link>
              <span className={styles.firms}>
                {' '}
                {focalName} and {rivalName}, archived {day.format(archivedAt)}
              </span>
            </p>
            {canWrite ? <RestoreButton marketId={id} name={name} /> : null}
          </li>
        ))}
      </ul>
    </details>
  );
}
