/**
 * One text per series, for hashing: the same counts give the same text whatever file they came from.
 * Numbers are written in the shortest form that reads back to the same double (ECMAScript Number::toString).
 */
import { formatMonth } from './month';
import type { MonthlySeries } from './types';

const FORMAT = 'elbowroom-series 1';

/** "elbowroom-series 1", then a line "2024-03,focal,rival" a month; a gap is empty. */
export function toCanonicalText({ firstMonth, focal, rival }: MonthlySeries): string {
  const lines = focal.map(
    (count, index) => `${formatMonth(firstMonth + index)},${count ?? ''},${rival[index] ?? ''}`,
  );
  return [FORMAT, ...lines, ''].join('\n');
}
