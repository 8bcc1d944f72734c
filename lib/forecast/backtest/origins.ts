/**
 * From which months past forecasts can be made and checked. An origin is a number of training months L: what came later is hidden, and
 * the forecast of h months ahead is checked against month L + h. All horizons use the same origins, so that their scores compare.
 */
import { readObservations } from '../../estimate/observations';
import type { MonthlySeries } from '../../series/types';

const HORIZONS = [1, 3, 6, 12];
/** Origins wanted at the longest horizon, and the fewest that say anything. */
export const WANTED_ORIGINS = 6;
export const MIN_ORIGINS = 3;
/** Each costs a whole fit. */
const MAX_ORIGINS = 12;
/** Training months from which the first origin starts where that leaves enough origins. */
const COMFORTABLE_TRAINING = 24;

export type OriginPlan =
  | {
      ok: true;
      /** Ascending; the last is the longest that leaves enough origins. */
      horizons: number[];
      /** Origins from which the longest horizon can be checked. */
      possible: number;
      /** Training months of the origins used, ascending. */
      trainings: number[];
    }
  | { ok: false; code: 'too-few-origins'; possible: number };

export function planOrigins(series: MonthlySeries): OriginPlan {
  const months = series.focal.length;
  const earliest = findEarliestTraining(series);
  const possibleFor = (horizon: number) => Math.max(0, months - horizon - earliest + 1);
  const longestWith = (least: number) => HORIZONS.filter((horizon) => possibleFor(horizon) >= least).at(-1);
  const longest = longestWith(WANTED_ORIGINS) ?? longestWith(MIN_ORIGINS);
  if (longest === undefined)
    return { ok: false, code: 'too-few-origins', possible: possibleFor(HORIZONS[0]) };
  const last = months - longest;
  const first = Math.max(earliest, Math.min(COMFORTABLE_TRAINING, last - WANTED_ORIGINS + 1));
  return {
    ok: true,
    horizons: HORIZONS.filter((horizon) => horizon <= longest),
    possible: possibleFor(longest),
    trainings: spreadEvenly(first, last),
  };
}

/** Training months after which the counts still hidden are cut off. */
export function cutSeries(series: MonthlySeries, training: number): MonthlySeries {
  const { firstMonth, focal, rival } = series;
  return { firstMonth, focal: focal.slice(0, training), rival: rival.slice(0, training) };
}

/** The fewest months that can be fitted; one more than the series has when it never can. */
function findEarliestTraining(series: MonthlySeries): number {
  const months = series.focal.length;
  let training = 1;
  while (training <= months && !readObservations(cutSeries(series, training)).ok) training++;
  return training;
}

/** Whole numbers from first to last, at most MAX_ORIGINS of them, both ends included. */
function spreadEvenly(first: number, last: number): number[] {
  const count = Math.min(MAX_ORIGINS, last - first + 1);
  if (count === 1) return [last];
  return Array.from({ length: count }, (_, i) => Math.round(first + (i * (last - first)) / (count - 1)));
}
