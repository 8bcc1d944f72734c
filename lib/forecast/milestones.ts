/**
 * Milestones: when something happens, over draws, and the chance that it never does within the window.
 */
import { type DrawEnds, WINDOW_MONTHS } from './draw-ends';
import { intervalOf } from './interval';
import type { Interval, Milestone, Outlook } from './report';

/** Fewer draws than this say nothing about when. */
export const MIN_DRAWS_FOR_INTERVAL = 20;

/** Overtaking by the firm that is behind in the last observed month. */
export function computeOvertaking(ends: DrawEnds, overtaker: 'focal' | 'rival'): Outlook['overtaking'] {
  const months = overtaker === 'focal' ? ends.firstLeads : ends.secondLeads;
  return { ...describe('overtaking', months), overtaker };
}

export function computeNearDestination(ends: DrawEnds): Milestone {
  return describe('nearDestination', ends.nearMonth);
}

/** Interval of the values that are numbers; null when too few are. */
export function intervalOfKnown(values: Float64Array): Interval | null {
  const known = values.filter((value) => !Number.isNaN(value));
  return known.length < MIN_DRAWS_FOR_INTERVAL ? null : intervalOf(known);
}

function describe(id: Milestone['id'], months: Float64Array): Milestone {
  const happening = months.filter((month) => !Number.isNaN(month)).length;
  return {
    id,
    chance: happening / months.length,
    windowMonths: WINDOW_MONTHS,
    monthsAhead: intervalOfKnown(months),
  };
}
