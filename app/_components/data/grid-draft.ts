/**
 * The counts of a market while they are corrected by hand: rows of months whose cells take what is typed or pasted, or say why
 * they do not. Pure: every change gives new rows.
 */
import { cleanName } from '@/lib/series/clean-name';
import type { MonthContent, SeriesContent } from '@/lib/series/compare-series';
import { readerOf } from '@/lib/series/compare-series';
import { MAX_SERIES_MONTHS } from '@/lib/series/limits';
import { type CountReading, readCountColumn } from '@/lib/series/number';
import type { Month } from '@/lib/series/types';
import { MAX_REASON_LENGTH } from '@/lib/services/form-limits';

export interface DraftRow extends MonthContent {
  month: Month;
}

export const GRID_COLUMNS = ['focal', 'rival', 'exclusion'] as const;
export type GridColumn = (typeof GRID_COLUMNS)[number];

export interface GridPlace {
  row: number;
  column: GridColumn;
}

/** Why a text cannot stand in a cell. */
export interface CellProblem extends GridPlace {
  code: 'unreadable' | 'ambiguous' | 'negative' | 'zero-inside' | 'too-long' | 'too-many-months';
  text: string;
  /** Both readings of an ambiguous count. */
  readings?: [number, number];
}

export type DraftEdit = { ok: true; rows: DraftRow[] } | { ok: false; problem: CellProblem };

export function startDraft(content: SeriesContent): DraftRow[] {
  const read = readerOf(content);
  return content.series.focal.map((_, index) => {
    const month = content.series.firstMonth + index;
    return { month, ...read(month) };
  });
}

/** One more month at the end, without counts. */
export function addMonth(rows: readonly DraftRow[]): DraftRow[] {
  const month = (rows.at(-1)?.month ?? 0) + 1;
  return [...rows, { month, focal: null, rival: null, exclusion: null }];
}

/** Puts a text into a cell: a count, an empty text for a gap, or the reason for leaving the month out. */
export function typeCell(rows: readonly DraftRow[], place: GridPlace, text: string): DraftEdit {
  return fillCells(rows, place, [[text]]);
}

/** Puts cells copied from a spreadsheet into the grid, from `place` on; more lines than months add months. */
export function pasteCells(rows: readonly DraftRow[], place: GridPlace, text: string): DraftEdit {
  const lines = text.replace(/\r\n?/g, '\n').replace(/\n$/, '').split('\n');
  return fillCells(
    rows,
    place,
    lines.map((line) => line.split('\t')),
  );
}

function fillCells(rows: readonly DraftRow[], place: GridPlace, lines: string[][]): DraftEdit {
  let filled = [...rows];
  while (filled.length < place.row + lines.length) {
    if (filled.length >= MAX_SERIES_MONTHS) {
      return refuse('too-many-months', { row: filled.length - 1, column: place.column }, '');
    }
    filled = addMonth(filled);
  }
  const start = GRID_COLUMNS.indexOf(place.column);
  for (const [offset, column] of GRID_COLUMNS.slice(start).entries()) {
    const texts = lines.map((line) => line[offset]);
    if (texts.every((text) => text === undefined)) continue;
    const edit =
      column === 'exclusion'
        ? fillReasons(filled, place.row, texts)
        : fillCounts(filled, place.row, column, texts);
    if (!edit.ok) return edit;
    filled = edit.rows;
  }
  return { ok: true, rows: filled };
}

function fillReasons(rows: DraftRow[], from: number, texts: (string | undefined)[]): DraftEdit {
  const filled = [...rows];
  for (const [index, text] of texts.entries()) {
    if (text === undefined) continue;
    const place = { row: from + index, column: 'exclusion' as const };
    if (text.trim().length > MAX_REASON_LENGTH) return refuse('too-long', place, text);
    filled[place.row] = { ...filled[place.row]!, exclusion: cleanName(text) || null };
  }
  return { ok: true, rows: filled };
}

/** Counts of one column are read together, so that 13,75 tells how 1,234 is meant. */
function fillCounts(
  rows: DraftRow[],
  from: number,
  column: 'focal' | 'rival',
  texts: (string | undefined)[],
): DraftEdit {
  const filled = [...rows];
  const readings = readCountColumn(texts.map((text) => text ?? ''));
  for (const [index, reading] of readings.entries()) {
    const text = texts[index];
    if (text === undefined) continue;
    const place = { row: from + index, column };
    const problem = findProblem(reading, place, text);
    if (problem) return { ok: false, problem };
    filled[place.row] = { ...filled[place.row]!, [column]: reading.kind === 'count' ? reading.value : null };
  }
  const zero = findInnerZero(filled.map((row) => row[column]));
  return zero < 0 ? { ok: true, rows: filled } : refuse('zero-inside', { row: zero, column }, '0');
}

function findProblem(reading: CountReading, place: GridPlace, text: string): CellProblem | null {
  if (reading.kind === 'unreadable') return { code: 'unreadable', ...place, text };
  if (reading.kind === 'ambiguous')
    return { code: 'ambiguous', ...place, text, readings: [reading.point, reading.comma] };
  return reading.kind === 'count' && reading.value < 0 ? { code: 'negative', ...place, text } : null;
}

/** The first zero after a count above zero; -1: none. */
function findInnerZero(counts: (number | null)[]): number {
  const launch = counts.findIndex((count) => count !== null && count > 0);
  return launch < 0 ? -1 : counts.indexOf(0, launch);
}

function refuse(code: CellProblem['code'], place: GridPlace, text: string): DraftEdit {
  return { ok: false, problem: { code, ...place, text } };
}
