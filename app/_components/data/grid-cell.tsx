'use client';

/** One cell of the grid: reads its value, or holds the input while it is typed into. */
import { type KeyboardEvent, useEffect, useRef } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import { MAX_REASON_LENGTH } from '@/lib/services/form-limits';
import styles from './count-grid.module.css';
import type { GridPlace } from './grid-draft';
import type { Grid } from './use-grid';

const counts = new Intl.NumberFormat(LOCALE, { maximumFractionDigits: 6 });

interface GridCellProps {
  grid: Grid;
  place: GridPlace;
  value: number | string | null;
  /** As the newest revision has it. */
  before: number | string | null;
  label: string;
}

export function GridCell({ grid, place, value, before, label }: GridCellProps) {
  const ref = useRef<HTMLTableCellElement>(null);
  const { focus, typing, problem } = grid;
  const isFocused = focus.row === place.row && focus.column === place.column;
  const isTyping = isFocused && typing !== null;
  const wasFocused = useRef(isFocused);

  // The focus follows the keys, but is not taken from elsewhere when the page opens.
  useEffect(() => {
    const isNew = isFocused && !wasFocused.current;
    wasFocused.current = isFocused;
    const isInGrid = ref.current?.closest('table')?.contains(document.activeElement) ?? false;
    if (isFocused && !isTyping && (isNew || isInGrid)) ref.current?.focus();
  }, [isFocused, isTyping]);

  const isChanged = value !== before;
  const isWrong = problem !== null && problem.row === place.row && problem.column === place.column;
  return (
    <td
      ref={ref}
      // biome-ignore lint/a11y/noNoninteractiveElementToInteractiveRole: a cell of a grid
      role="gridcell"
      tabIndex={isFocused && !isTyping ? 0 : -1}
      data-column={place.column}
      data-changed={isChanged || undefined}
      data-wrong={isWrong || undefined}
      onFocus={(event) => {
        if (event.target === ref.current && !isFocused) grid.setFocus(place);
      }}
      onDoubleClick={() => grid.startTyping()}
      onKeyDown={isTyping ? undefined : grid.readKey}
    >
      {isTyping ? (
        <CellInput grid={grid} label={label} isWrong={isWrong} />
      ) : (
        <>
          {spell(value)}
          {isChanged ? <span className="visually-hidden">, was {spell(before) || 'empty'}</span> : null}
        </>
      )}
    </td>
  );
}

function CellInput({ grid, label, isWrong }: { grid: Grid; label: string; isWrong: boolean }) {
  const ref = useRef<HTMLInputElement>(null);
  useEffect(() => ref.current?.focus(), []);

  function readKey(event: KeyboardEvent) {
    if (event.key === 'Escape') grid.cancel();
    else if (event.key === 'Enter') grid.commit({ down: event.shiftKey ? -1 : 1, right: 0 });
    else if (event.key === 'Tab') grid.commit({ down: 0, right: event.shiftKey ? -1 : 1 });
    else return;
    event.preventDefault();
    event.stopPropagation();
  }

  return (
    <input
      ref={ref}
      className={styles.input}
      value={grid.typing ?? ''}
      aria-label={label}
      aria-invalid={isWrong || undefined}
      maxLength={MAX_REASON_LENGTH}
      onChange={(event) => grid.type(event.target.value)}
      onKeyDown={readKey}
      onBlur={() => grid.commit()}
    />
  );
}

function spell(value: number | string | null): string {
  return typeof value === 'number' ? counts.format(value) : (value ?? '');
}
