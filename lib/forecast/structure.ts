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
    breakMonth: findBreakMonth(draws, choice.markedBreaks, gridStart),
    ...describeExit(observations, gridStart),
    ...(choice.markedBreaks.length > 0 && {
      markedBreaks: choice.markedBreaks.map(({ month, chance }) => ({ month: gridStart + month, chance })),
    }),
    flaggedCounts: choice.flags.map(({ firm, month }) => ({ firm, month: gridStart + month })),
  };
}

/** At most one firm can be gone. */
function describeExit({ firms }: Fit['observations'], gridStart: Month): Pick<Structure, 'exit'> {
  const gone = firms.findIndex(({ exit }) => exit !== undefined);
  return gone < 0 ? {} : { exit: { firm: gone === 0 ? 1 : 2, month: gridStart + firms[gone].exit! } };
}

/** Of breaks in months that nobody marked. */
function findBreakMonth(
  draws: Fit['draws'],
  marked: Fit['choice']['markedBreaks'],
  gridStart: Month,
): Structure['breakMonth'] {
  if (!draws.columns.includes('breakMonth')) return null;
  const known = new Set([-1, ...marked.map(({ month }) => month)]);
  const months = readColumn(draws, 'breakMonth').filter((month) => !known.has(month));
  if (months.length < MIN_DRAWS_FOR_INTERVAL) return null;
  const { q05, q50, q95 } = intervalOf(months);
  return { q05: gridStart + q05, q50: gridStart + q50, q95: gridStart + q95 };
}
