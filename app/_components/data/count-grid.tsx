'use client';

/**
 * The months of a market as a grid for small corrections: arrow keys move, typing or Enter changes a cell, Escape leaves it, a
 * column can be pasted. What was changed is marked; nothing is stored before the difference was looked at.
 */
import { useEffect, useId, useMemo, useRef, useState } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { compareSeries, readerOf } from '@/lib/series/compare-series';
import { fromMonths } from '@/lib/series/merge-series';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import styles from './count-grid.module.css';
import { explainCell } from './explain-cell';
import { GridCell } from './grid-cell';
import { GRID_COLUMNS } from './grid-draft';
import { type RevisionBase, StoreRevision } from './store-revision';
import { type Grid, useGrid } from './use-grid';

const months = createMonthFormat(LOCALE);

export function CountGrid({ base: newest }: { base: RevisionBase }) {
  // Kept: when the page comes again with a newer revision, the corrections still belong to this one.
  const [base] = useState(newest);
  const grid = useGrid(base);
  const content = useMemo(() => fromMonths(grid.rows), [grid.rows]);
  const changed = useMemo(() => compareSeries(base, content).length, [base, content]);
  const names = { focal: base.focalName, rival: base.rivalName };
  return (
    <>
      <GridTable grid={grid} base={base} />
      <div className={styles.tools}>
        <Button kind="text" onClick={grid.addMonth}>
          Add the next month
        </Button>
        {grid.canUndo ? (
          <>
            <Button kind="text" onClick={grid.undo}>
              Take the last change back
            </Button>
            <Button kind="text" onClick={grid.discard}>
              Discard all changes
            </Button>
          </>
        ) : null}
      </div>
      <ProblemNote explanation={grid.problem ? explainCell(grid.problem, grid.rows, names) : null} />
      {changed > 0 ? (
        <StoreRevision
          base={base}
          proposal={{ ...content, fileName: null, fileHash: null, readingNotes: [] }}
        />
      ) : null}
    </>
  );
}

function GridTable({ grid, base }: { grid: Grid; base: RevisionBase }) {
  const helpId = useId();
  const ref = useRef<HTMLTableElement>(null);
  const { paste, typing } = grid;
  const original = useMemo(() => readerOf(base), [base]);

  useEffect(() => {
    const onPaste = (event: ClipboardEvent) => {
      const isHere = ref.current?.contains(document.activeElement) && typing === null;
      const text = event.clipboardData?.getData('text/plain');
      if (!isHere || !text) return;
      event.preventDefault();
      paste(text);
    };
    document.addEventListener('paste', onPaste);
    return () => document.removeEventListener('paste', onPaste);
  }, [paste, typing]);

  const heads = { focal: base.focalName, rival: base.rivalName, exclusion: 'Left out because' };
  return (
    <>
      <p id={helpId} className={styles.help}>
        To correct a count, move there with the arrow keys or a click and type. Enter or F2 opens a cell,
        Escape leaves it, Delete empties it; a column can be pasted. A month with a reason in the last column
        is left out of the fit and stays on record.
      </p>
      <div className={styles.scroller}>
        <table
          ref={ref}
          // biome-ignore lint/a11y/noNoninteractiveElementToInteractiveRole: a table that is edited is a grid
          role="grid"
          className={styles.grid}
          aria-label="Counts by month"
          aria-describedby={helpId}
        >
          <thead>
            <tr>
              <th scope="col">Month</th>
              {GRID_COLUMNS.map((column) => (
                <th key={column} scope="col" data-column={column}>
                  {heads[column]}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {grid.rows.map((row, index) => (
              <tr key={row.month} data-left-out={row.exclusion !== null || undefined}>
                <th scope="row">{months.short(row.month)}</th>
                {GRID_COLUMNS.map((column) => (
                  <GridCell
                    key={column}
                    grid={grid}
                    place={{ row: index, column }}
                    value={row[column]}
                    before={original(row.month)[column]}
                    label={`${heads[column]}, ${months.long(row.month)}`}
                  />
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </>
  );
}
