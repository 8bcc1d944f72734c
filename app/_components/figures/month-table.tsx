/** The months of a series with both counts, and why a month is left out of the fit. */
import { listMonths } from '@/app/_lib/list-months';
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import type { Exclusion } from '@/lib/series/exclusions';
import type { MonthlySeries } from '@/lib/series/types';
import styles from './history-figure.module.css';

interface MonthTableProps {
  series: MonthlySeries;
  exclusions: readonly Exclusion[];
  focalName: string;
  rivalName: string;
}

export function MonthTable({ series, exclusions, focalName, rivalName }: MonthTableProps) {
  const months = createMonthFormat(LOCALE);
  const counts = new Intl.NumberFormat(LOCALE, { maximumFractionDigits: 1 });
  const reasons = new Map(exclusions.map(({ month, reason }) => [month, reason]));
  const spell = (count: number | null) => (count === null ? 'no count' : counts.format(count));
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section className={styles.scroller} aria-label="Counts by month" tabIndex={0}>
      <table className={styles.table}>
        <thead>
          <tr>
            <th scope="col">Month</th>
            <th scope="col">{focalName}</th>
            <th scope="col">{rivalName}</th>
            {reasons.size > 0 ? (
              <th scope="col" className={styles.reason}>
                Left out because
              </th>
            ) : null}
          </tr>
        </thead>
        <tbody>
          {listMonths(series).map(({ month, focal, rival }) => (
            <tr key={month}>
              <th scope="row">{months.short(month)}</th>
              <td>{spell(focal)}</td>
              <td>{spell(rival)}</td>
              {reasons.size > 0 ? <td className={styles.reason}>{reasons.get(month) ?? ''}</td> : null}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
