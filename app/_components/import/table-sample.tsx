/** The first rows of a table as they stand, with the chosen columns marked, so that a wrong choice is seen at once. */
import type { SeriesMapping } from '@/lib/series/types';
import styles from './table-sample.module.css';
import type { Understood } from './understood';

/** Beyond these columns only the chosen ones are shown. */
const MOST_COLUMNS = 8;

export function TableSample({ understood, mapping }: { understood: Understood; mapping: SeriesMapping }) {
  const { header, sample, rowCount } = understood;
  const { long } = mapping;
  const roles = new Map<string, string>(
    long
      ? [
          [mapping.month, 'month'],
          [long.firm, 'firm'],
          [long.users, 'users'],
        ]
      : [
          [mapping.month, 'month'],
          [mapping.focal, 'focal'],
          [mapping.rival, 'rival'],
        ],
  );
  const columns = header
    .map((name, index) => ({ name, index, role: roles.get(name) }))
    .filter(({ role }, index) => role !== undefined || index < MOST_COLUMNS);
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section className={styles.scroller} aria-label="First rows of the table" tabIndex={0}>
      <table className={styles.table}>
        <caption className={styles.caption}>
          {rowCount <= sample.length
            ? 'The table as it stands'
            : `The first ${sample.length} of ${rowCount.toLocaleString('en-US')} rows, as they stand`}
        </caption>
        <thead>
          <tr>
            <th scope="col">Row</th>
            {columns.map(({ name, role }) => (
              <th key={name} scope="col" data-role={role}>
                {name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {sample.map(({ row, cells }) => (
            <tr key={row}>
              <th scope="row">{row}</th>
              {columns.map(({ name, index, role }) => (
                <td key={name} data-role={role}>
                  {cells[index]}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
