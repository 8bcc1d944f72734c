'use client';

/** State of the grid: where the focus is, what is being typed, every earlier draft for taking a change back. */
import { type KeyboardEvent, useCallback, useState } from 'react';
import type { SeriesContent } from '@/lib/series/compare-series';
import {
  addMonth,
  type CellProblem,
  type DraftEdit,
  type DraftRow,
  type GridPlace,
  pasteCells,
  startDraft,
  typeCell,
} from './grid-draft';
import { movePlace, readGridKey } from './grid-keys';

export interface Grid {
  rows: DraftRow[];
  focus: GridPlace;
  /** What is being typed into the focused cell; null: nothing. */
  typing: string | null;
  problem: CellProblem | null;
  canUndo: boolean;
  setFocus(place: GridPlace): void;
  type(text: string): void;
  startTyping(text?: string): void;
  /** Takes what was typed, and moves on when it could be taken. */
  commit(move?: { down: number; right: number }): void;
  cancel(): void;
  readKey(event: KeyboardEvent): void;
  paste(text: string): void;
  addMonth(): void;
  undo(): void;
  discard(): void;
}

export function useGrid(content: SeriesContent): Grid {
  const [drafts, setDrafts] = useState<DraftRow[][]>(() => [startDraft(content)]);
  const rows = drafts.at(-1)!;
  const [place, setPlace] = useState<GridPlace>({ row: rows.length - 1, column: 'focal' });
  // Taking back an added month takes its row away.
  const focus = { ...place, row: Math.min(place.row, rows.length - 1) };
  const [typing, setTyping] = useState<string | null>(null);
  const [problem, setProblem] = useState<CellProblem | null>(null);
  const held = String(rows[focus.row]?.[focus.column] ?? '');

  const setFocus = useCallback((place: GridPlace) => {
    setPlace(place);
    setTyping(null);
  }, []);

  /** @returns false when the edit was refused */
  function take(edit: DraftEdit): boolean {
    setProblem(edit.ok ? null : edit.problem);
    if (edit.ok) setDrafts((earlier) => [...earlier, edit.rows]);
    return edit.ok;
  }

  function startTyping(text = held) {
    setTyping(text);
  }

  function commit(move = { down: 0, right: 0 }) {
    if (typing === null) return;
    if (typing === held) setProblem(null);
    else if (!take(typeCell(rows, focus, typing))) return;
    setFocus(movePlace(focus, move.down, move.right, rows.length - 1));
  }

  function undo() {
    setProblem(null);
    setDrafts((earlier) => (earlier.length > 1 ? earlier.slice(0, -1) : earlier));
  }

  function readKey(event: KeyboardEvent) {
    const key = readGridKey(event, focus, rows.length - 1);
    if (!key) return;
    event.preventDefault();
    if (key.kind === 'move') setFocus(key.to);
    else if (key.kind === 'open') startTyping(key.text);
    else if (key.kind === 'undo') undo();
    else take(typeCell(rows, focus, ''));
  }

  return {
    rows,
    focus,
    typing,
    problem,
    canUndo: drafts.length > 1,
    setFocus,
    type: setTyping,
    startTyping,
    commit,
    cancel() {
      setTyping(null);
      setProblem(null);
    },
    readKey,
    paste: (text) => void take(pasteCells(rows, focus, text)),
    addMonth() {
      take({ ok: true, rows: addMonth(rows) });
      setFocus({ row: rows.length, column: 'focal' });
    },
    undo,
    discard() {
      setProblem(null);
      setDrafts([startDraft(content)]);
      setFocus({ row: content.series.focal.length - 1, column: 'focal' });
    },
  };
}
