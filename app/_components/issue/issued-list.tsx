/** Issued forecasts, newest first, each with its links. */
import Link from 'next/link';
import { formatDay } from '@/app/_lib/locale';
import type { IssuedSummary } from '@/lib/services/read-market';
import { ForecastLinks } from './forecast-links';
import styles from './issue.module.css';

interface IssuedListProps {
  marketId: string;
  issued: IssuedSummary[];
  /** Number of the market's newest revision. */
  newestRevision: number;
  canWrite: boolean;
}

export function IssuedList({ marketId, issued, newestRevision, canWrite }: IssuedListProps) {
  if (issued.length === 0) return <p className={styles.none}>No forecast of this market was issued yet.</p>;
  return (
    <ol className={styles.issuedList}>
      {issued.map((forecast) => (
        <li key={forecast.id} className={styles.issued}>
          <h3 className={styles.issuedName}>
            <Link href={`/markets/${marketId}/issued/${forecast.id}`}>
              Issued {formatDay(forecast.issuedAt)}
            </Link>
            <span className={styles.by}>
              {' '}
              by {forecast.issuedByName}, {nameRevision(forecast.revisionNumber, newestRevision)}
            </span>
          </h3>
          <ForecastLinks
            marketId={marketId}
            issuedId={forecast.id}
            links={forecast.links}
            canWrite={canWrite}
          />
        </li>
      ))}
    </ol>
  );
}

function nameRevision(used: number, newest: number): string {
  return used === newest
    ? `from revision ${used}, the newest counts`
    : `from revision ${used}; revision ${newest} is the newest`;
}
