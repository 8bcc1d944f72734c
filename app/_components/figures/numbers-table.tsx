'use client';

/**
 * The numbers of a figure, folded away under it. Wide tables scroll inside their own frame, reachable by keyboard.
 * A live table, one that follows a slider, is only made while it is open.
 */
import { useState } from 'react';
import type { FigureTable } from '@/lib/brief/types';
import styles from './numbers-table.module.css';

interface NumbersTableProps {
  table: FigureTable;
  isLive?: boolean;
}

export function NumbersTable({ table, isLive = false }: NumbersTableProps) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <details
      className={styles.disclosure}
      data-screen-only
      onToggle={(event) => setIsOpen(event.currentTarget.open)}
    >
      <summary>Table of numbers</summary>
      {isOpen || !isLive ? <NumbersGrid table={table} /> : null}
    </details>
  );
}

interface NumbersGridProps {
  table: FigureTable;
  /** All rows show at once. */
  isWhole?: boolean;
}

/** A table of numbers in the open, in a frame of its own. */
export function NumbersGrid({ table, isWhole = false }: NumbersGridProps) {
  return (
    <section
      className={styles.scroller}
      data-whole={isWhole || undefined}
      aria-label={table.title}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
      tabIndex={0}
    >
      <Numbers table={table} />
    </section>
  );
}

function Numbers({ table }: { table: FigureTable }) {
  return (
    <table className={styles.table}>
      <caption>{table.title}</caption>
      <thead>
        <tr>
          {table.columns.map((column) =>
            column === '' ? (
              <td key="corner" />
            ) : (
              <th key={column} scope="col">
                {column}
              </th>
            ),
          )}
        </tr>
      </thead>
      <tbody>
        {table.rows.map((cells) => (
          <tr key={cells.join('|')}>{cells.map(renderCell)}</tr>
        ))}
      </tbody>
    </table>
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
