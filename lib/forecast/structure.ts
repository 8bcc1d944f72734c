/**
 * What the series was found to hold besides growth and competition, for people: yearly cycle, break, flagged counts.
 */
import { readColumn } from '../estimate/draws';
import type { Fit } from '../estimate/fit-run';
import type { Month } from '../series/types';
import { intervalOf } from './interval';
import { MIN_DRAWS_FOR_INTERVAL } from './milestones';
import type { Structure } from './report';

export function describeStructure({ choice, draws, observations }: Fit, firstMonth: Month): Structure {
  const gridStart = firstMonth + observations.skippedMonths;
  return {
    seasonHarmonics: choice.harmonics,
    breakChance: choice.breakChance,
    breakMonth: findBreakMonth(draws, gridStart),
    flaggedCounts: choice.flags.map(({ firm, month }) => ({ firm, month: gridStart + month })),
  };
}

function findBreakMonth(draws: Fit['draws'], gridStart: Month): Structure['breakMonth'] {
  if (!draws.columns.includes('breakMonth')) return null;
  const months = readColumn(draws, 'breakMonth').filter((month) => month >= 0);
  if (months.length < MIN_DRAWS_FOR_INTERVAL) return null;
  const { q05, q50, q95 } = intervalOf(months);
  return { q05: gridStart + q05, q50: gridStart + q50, q95: gridStart + q95 };
}
