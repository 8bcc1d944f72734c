/** What can be done about a problem, and the choices of a person among it. The first of a list is done without a choice. */
import type { ProblemFix, SeriesMapping, SeriesProblem, SeriesProblemCode } from './types';

const FIXES: Partial<Record<SeriesProblemCode, ProblemFix[]>> = {
  'month-duplicate': ['skip-row', 'use'],
  'month-in-future': ['use', 'skip-row'],
  'month-partial': ['skip-row', 'use'],
  'month-unfinished': ['use', 'skip-row'],
  'count-unreadable': ['gap', 'skip-row'],
  'count-negative': ['gap', 'skip-row'],
  'zero-inside': ['gap', 'skip-row'],
  jump: ['use', 'gap', 'skip-row'],
  'unit-mismatch': ['use', 'times-thousand'],
};

const FIX_NAMES: Record<ProblemFix, string> = {
  use: 'use as it stands',
  gap: 'keep as a gap',
  'skip-row': 'leave the row out',
  'times-thousand': 'take it times 1,000',
};

export function fixesOf(code: SeriesProblemCode): ProblemFix[] | undefined {
  return FIXES[code];
}

export function nameFix(fix: ProblemFix): string {
  return FIX_NAMES[fix];
}

/** Names a problem apart from the others of its file, for keeping a choice. */
export function problemKey({ code, row, column }: Pick<SeriesProblem, 'code' | 'row' | 'column'>): string {
  return [code, row ?? '', column ?? ''].join('|');
}

/** What is done about the problem under these choices; null: there is nothing to choose. */
export function chosenFix(problem: SeriesProblem, fixes: SeriesMapping['fixes']): ProblemFix | null {
  const offered = problem.fixes ?? [];
  const wanted = fixes?.[problemKey(problem)];
  return wanted !== undefined && offered.includes(wanted) ? wanted : (offered[0] ?? null);
}

/** The choices as the reading applies them. */
export interface Corrections {
  skippedRows: ReadonlySet<number>;
  /** "row|column" of cells that become gaps. */
  gaps: ReadonlySet<string>;
  /** Columns to be taken times a thousand. */
  thousands: ReadonlySet<string>;
  keepsPartialMonths: boolean;
  /** Months after the current one are left out. */
  skipsFuture: boolean;
}

/** Of the problems that a reading without choices found, those with a choice that differs from what is done anyway. */
export function readCorrections(
  problems: readonly SeriesProblem[],
  fixes: SeriesMapping['fixes'],
): Corrections {
  const skippedRows = new Set<number>();
  const gaps = new Set<string>();
  const thousands = new Set<string>();
  let keepsPartialMonths = false;
  let skipsFuture = false;
  for (const problem of problems) {
    const fix = chosenFix(problem, fixes);
    if (fix === null || fix === problem.fixes?.[0]) continue;
    const { code, row, column, other } = problem;
    if (code === 'month-partial') keepsPartialMonths = fix === 'use';
    else if (code === 'month-in-future') skipsFuture = true;
    else if (code === 'month-duplicate') skippedRows.add(other?.row ?? -1);
    else if (fix === 'times-thousand') thousands.add(column ?? '');
    else if (fix === 'gap') gaps.add(cellKey(row, column));
    else if (fix === 'skip-row' && row !== null) skippedRows.add(row);
  }
  return { skippedRows, gaps, thousands, keepsPartialMonths, skipsFuture };
}

export function cellKey(row: number | null, column: string | null): string {
  return `${row ?? ''}|${column ?? ''}`;
}

export const NO_CORRECTIONS: Corrections = {
  skippedRows: new Set(),
  gaps: new Set(),
  thousands: new Set(),
  keepsPartialMonths: false,
  skipsFuture: false,
};
