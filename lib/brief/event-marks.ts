/** Dated events and left-out months as marks of a chart: a letter that stands on it, and the words that the letter stands for. */
import type { Exclusion } from '../series/exclusions';
import type { Month } from '../series/types';
import type { MonthFormat } from './month-words';

/** A dated event as a brief tells of it. */
export interface EventFact {
  month: Month;
  note: string;
  /** The firms' strengths may differ before and after it. */
  changesParameters: boolean;
}

export interface EventMark {
  month: Month;
  /** "a", "b", ..., "z", "aa": the events of one month share one. */
  letter: string;
  isBreak: boolean;
  /** "Mar 2024: price change (strengths may have changed)." */
  text: string;
}

const LETTERS = 26;

/** One mark for each month that has events, in order. */
export function markEvents(events: readonly EventFact[], months: MonthFormat): EventMark[] {
  const byMonth = new Map<Month, EventFact[]>();
  for (const event of [...events].sort((a, b) => a.month - b.month)) {
    byMonth.set(event.month, [...(byMonth.get(event.month) ?? []), event]);
  }
  return [...byMonth].map(([month, sharing], index) => ({
    month,
    letter: letterOf(index),
    isBreak: sharing.some(({ changesParameters }) => changesParameters),
    text: `${months.short(month)}: ${sharing.map(describeEvent).join('; ')}.`,
  }));
}

/** "Left out of the fit: Mar 2024 (strike), Apr 2024 (strike)."; empty without exclusions. */
export function tellExclusions(exclusions: readonly Exclusion[], months: MonthFormat): string {
  if (exclusions.length === 0) return '';
  const listed = exclusions.map(({ month, reason }) => `${months.short(month)} (${reason})`);
  return `Left out of the fit: ${listed.join(', ')}.`;
}

function describeEvent({ note, changesParameters }: EventFact): string {
  const plain = note.replace(/[.\s]+$/, '');
  return changesParameters ? `${plain} (strengths may have changed)` : plain;
}

function letterOf(index: number): string {
  const rest = Math.floor(index / LETTERS) - 1;
  return (rest >= 0 ? letterOf(rest) : '') + String.fromCharCode(97 + (index % LETTERS));
}
