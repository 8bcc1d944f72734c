/** What a revision changes of another: one sentence and a row for each month that differs. */
import { LOCALE } from '@/app/_lib/locale';
import { type DifferenceCell, type DifferenceRow, describeDifference } from '@/lib/brief/difference-words';
import { createMonthFormat } from '@/lib/brief/month-words';
import type { MonthChange } from '@/lib/series/compare-series';
import styles from './difference-table.module.css';

interface DifferenceTableProps {
  /** Names the table: "What changes of revision 3". */
  label: string;
  changes: readonly MonthChange[];
  focalName: string;
  rivalName: string;
}

const months = createMonthFormat(LOCALE);

export function DifferenceTable({ label, changes, focalName, rivalName }: DifferenceTableProps) {
  const { summary, rows } = describeDifference(changes, months, LOCALE);
  return (
    <div className={styles.difference}>
      <p className={styles.summary}>{summary}</p>
      {rows.length > 0 ? (
        // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
        <section className={styles.scroller} aria-label={label} tabIndex={0}>
          <table className={styles.table}>
            <thead>
              <tr>
                <th scope="col">Month</th>
                <th scope="col">What</th>
                <th scope="col">{focalName}</th>
                <th scope="col">{rivalName}</th>
              </tr>
            </thead>
            <tbody>{rows.map(renderRow)}</tbody>
          </table>
        </section>
      ) : null}
    </div>
  );
}

function renderRow({ month, label, kind, focal, rival, reason }: DifferenceRow) {
  return (
    <tr key={month}>
      <th scope="row">{label}</th>
      <td>
        {kind}
        {reason ? <span className={styles.reason}>: {reason}</span> : null}
      </td>
      <td className={styles.count}>{renderCell(focal)}</td>
      <td className={styles.count}>{renderCell(rival)}</td>
    </tr>
  );
}

function renderCell({ before, after, isChanged }: DifferenceCell) {
  if (!isChanged) return <span className={styles.same}>{after ?? 'no count'}</span>;
  return (
    <>
      {before === null ? null : (
        <>
          <del>{before}</del>{' '}
        </>
      )}
      <ins>{after ?? 'no count'}</ins>
    </>
  );
}
