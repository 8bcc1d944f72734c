/** What a key does in the grid: the pattern of spreadsheets. */
import { GRID_COLUMNS, type GridPlace } from './grid-draft';

const ROWS_PER_PAGE = 12;
const PRINTABLE = /^[\p{L}\p{N}.,+-]$/u;

export type GridKey =
  | { kind: 'move'; to: GridPlace }
  /** Opens the cell: with the typed character, or with what it holds. */
  | { kind: 'open'; text?: string }
  | { kind: 'empty' }
  | { kind: 'undo' };

export interface PressedKey {
  key: string;
  ctrlKey: boolean;
  metaKey: boolean;
  altKey: boolean;
}

/** @returns null for a key that is not the grid's */
export function readGridKey(pressed: PressedKey, focus: GridPlace, lastRow: number): GridKey | null {
  const isCommand = pressed.ctrlKey || pressed.metaKey;
  const move = (down: number, right: number): GridKey => ({
    kind: 'move',
    to: movePlace(focus, down, right, lastRow),
  });
  switch (pressed.key) {
    case 'ArrowUp':
      return move(-1, 0);
    case 'ArrowDown':
      return move(1, 0);
    case 'ArrowLeft':
      return move(0, -1);
    case 'ArrowRight':
      return move(0, 1);
    case 'PageUp':
      return move(-ROWS_PER_PAGE, 0);
    case 'PageDown':
      return move(ROWS_PER_PAGE, 0);
    case 'Home':
      return move(isCommand ? -lastRow : 0, -GRID_COLUMNS.length);
    case 'End':
      return move(isCommand ? lastRow : 0, GRID_COLUMNS.length);
    case 'Enter':
    case 'F2':
      return { kind: 'open' };
    case 'Delete':
    case 'Backspace':
      return { kind: 'empty' };
  }
  if (isCommand) return pressed.key.toLowerCase() === 'z' ? { kind: 'undo' } : null;
  return !pressed.altKey && PRINTABLE.test(pressed.key) ? { kind: 'open', text: pressed.key } : null;
}

/** The place so many rows down and columns to the right, stopped at the edges. */
export function movePlace(from: GridPlace, down: number, right: number, lastRow: number): GridPlace {
  const clamp = (value: number, last: number) => Math.min(Math.max(value, 0), last);
  const column = clamp(GRID_COLUMNS.indexOf(from.column) + right, GRID_COLUMNS.length - 1);
  return { row: clamp(from.row + down, lastRow), column: GRID_COLUMNS[column]! };
}
