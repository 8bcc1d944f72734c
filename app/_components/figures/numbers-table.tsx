/** The numbers of a figure, folded away under it. Wide tables scroll inside their own frame, reachable by keyboard. */
import type { FigureTable } from '@/lib/brief/types';
import styles from './numbers-table.module.css';

export function NumbersTable({ table }: { table: FigureTable }) {
  return (
    <details className={styles.disclosure} data-screen-only>
      <summary>Table of numbers</summary>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard */}
      <section className={styles.scroller} aria-label={table.title} tabIndex={0}>
        <table className={styles.table}>
          <caption>{table.title}</caption>
          <thead>
            <tr>
              {table.columns.map((column) => (
                <th key={column} scope="col">
                  {column}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {table.rows.map((cells) => (
              <tr key={cells.join('|')}>{cells.map(renderCell)}</tr>
            ))}
          </tbody>
        </table>
      </section>
    </details>
  );
}

function renderCell(cell: string, index: number) {
  return index === 0 ? (
    <th key="head" scope="row">
      {cell}
    </th>
  ) : (
    <td key={index}>{cell}</td>
  );
}
