/**
 * The outlook of a fit: odds, bands, destination and milestones from its draws.
 */
import { readColumn, thinDraws } from '../estimate/draws';
import type { Fit } from '../estimate/fit-run';
import type { DrawSet } from '../estimate/types';
import type { Month } from '../series/types';
import { computeSeriesBands, shareOf } from './bands';
import { type DrawEnds, findDrawEnds } from './draw-ends';
import { type DrawTable, readDrawTable } from './draw-table';
import { intervalOf } from './interval';
import {
  computeNearDestination,
  computeOvertaking,
  intervalOfKnown,
  MIN_DRAWS_FOR_INTERVAL,
} from './milestones';
import { computeOdds, computePriorOdds, decideOutcome, outcomeOf } from './odds';
import type { Cloud, FitReport, Outlook } from './report';
import { simulateLevels, simulateObservations } from './simulate';

/** Draws that bands are taken from, and those that are followed to their ends for milestones and maps. */
export const OUTLOOK_DRAWS = 1000;
const FOLLOWED_DRAWS = 500;
/** Observations per draw. */
const REPLICATES = 2;
/** Draws shown on the maps. */
export const CLOUD_SIZE = 400;

export interface OutlookInput {
  fit: Fit;
  seed: number;
  horizonMonths: number;
  /** Last month of the series. */
  lastMonth: Month;
}

export function computeOutlook({ fit, seed, horizonMonths, lastMonth }: OutlookInput): {
  outlook: Outlook;
  cloud: Cloud;
} {
  const draws = thinDraws(fit.draws, OUTLOOK_DRAWS);
  const table = readDrawTable(thinDraws(draws, FOLLOWED_DRAWS));
  const ends = findDrawEnds(table);
  const levels = simulateLevels(draws, horizonMonths, seed);
  const observations = simulateObservations(draws, levels, seed, REPLICATES);
  // the odds alone cost nothing per draw: take them all
  const odds = computeOdds(readColumn(fit.draws, 'alpha'), readColumn(fit.draws, 'beta'));
  const outlook: Outlook = {
    horizonMonths,
    firstMonth: lastMonth + 1,
    odds,
    priorOdds: computePriorOdds(fit.priors),
    // the odds of a contest decide nothing once a firm has left
    decided: findGone(fit) === null ? decideOutcome(odds) : null,
    headStartFocalAhead:
      ends.headStartCount < MIN_DRAWS_FOR_INTERVAL ? null : ends.headStartFocalWins / ends.headStartCount,
    observations: computeSeriesBands(observations),
    levels: computeSeriesBands(levels),
    destination: {
      focal: intervalOf(ends.n1End),
      rival: intervalOf(ends.n2End),
      share: intervalOf(ends.n1End.map((users, i) => shareOf(users, ends.n2End[i]))),
    },
    returnHalfLifeMonths: intervalOfKnown(ends.halfLife),
    overtaking: computeOvertaking(ends, whoIsBehind(fit)),
    nearDestination: computeNearDestination(ends),
  };
  return { outlook, cloud: buildCloud(table, ends) };
}

function findGone({ observations: { firms } }: Fit): 'focal' | 'rival' | null {
  const gone = firms.findIndex(({ exit }) => exit !== undefined);
  return gone < 0 ? null : gone === 0 ? 'focal' : 'rival';
}

/** The firm that has left, or the one with fewer users in the last month in which it was observed. */
function whoIsBehind(fit: Fit): 'focal' | 'rival' {
  const gone = findGone(fit);
  if (gone) return gone;
  const [focal, rival] = fit.observations.firms.map(({ logCounts }) => logCounts[logCounts.length - 1]);
  return focal < rival ? 'focal' : 'rival';
}

function buildCloud(table: DrawTable, ends: DrawEnds): Cloud {
  const size = Math.min(CLOUD_SIZE, table.count);
  return Array.from({ length: size }, (_, k) => {
    const i = Math.floor((k * table.count) / size);
    const alpha = table.alpha[i];
    const beta = table.beta[i];
    return { alpha, beta, outcome: outcomeOf(alpha, beta), n1End: ends.n1End[i], n2End: ends.n2End[i] };
  });
}

/** Errors that do not persist. */
const NONE = { q05: 0, q50: 0, q95: 0 };

/** Error parameters over draws. */
export function computeErrors(draws: DrawSet): FitReport['errors'] {
  const interval = (column: string) => intervalOf(readColumn(draws, column));
  const hasPersistence = draws.errorModel === 'ar1';
  return {
    focal: interval('size1'),
    rival: interval('size2'),
    persistenceFocal: hasPersistence ? interval('persistence1') : NONE,
    persistenceRival: hasPersistence ? interval('persistence2') : NONE,
  };
}
