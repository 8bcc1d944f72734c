/**
 * Predictive distributions of all methods in one shape: MEMBERS equally likely values of ln users, ascending, the quantiles at
 * (i + 1/2) / MEMBERS. A mixture of methods is then a weighted set of members.
 */
import { thinDraws } from '../../estimate/draws';
import type { DrawSet } from '../../estimate/types';
import { quantileSorted } from '../../numeric/quantile';
import type { MonthlySeries } from '../../series/types';
import { type Baseline, type LogSeries, membersAt, standardMembers } from '../baselines/baseline';
import { forecastDampedTrend } from '../baselines/damped-trend';
import { forecastIndependentLogistic } from '../baselines/independent-logistic';
import { forecastRandomWalk } from '../baselines/random-walk-drift';
import { forecastSeasonalNaive } from '../baselines/seasonal-naive';
import { simulateLevels, simulateObservations } from '../simulate';
import type { Method, SIMPLE_METHODS } from './report';

/** Enough for a 5 % quantile to stand on five members. */
export const MEMBERS = 100;
/** Draws and observations per draw that stand for the own model. */
const OWN_DRAWS = 1000;
const OWN_REPLICATES = 2;

/** One firm: members of month h ahead (from 1) at [h - 1]. */
export type FirmMembers = Float64Array[];
/** Focal firm, rival; null: the method gave no forecast for the firm. */
export type MethodMembers = readonly [FirmMembers | null, FirmMembers | null];
export type MembersByMethod = { [Name in Method]: MethodMembers };

const BASELINES: { [Name in (typeof SIMPLE_METHODS)[number]]: Baseline } = {
  'random-walk-drift': forecastRandomWalk,
  'seasonal-naive': forecastSeasonalNaive,
  'independent-logistic': forecastIndependentLogistic,
  'damped-trend': forecastDampedTrend,
};

/** @param months how far ahead of the last month of the series */
export function forecastSimple(
  method: (typeof SIMPLE_METHODS)[number],
  series: MonthlySeries,
  months: number,
): MethodMembers {
  const forecast = (counts: readonly (number | null)[]): FirmMembers | null => {
    const end = BASELINES[method](toLogSeries(counts), months);
    if (!end.ok) return null;
    const standard = standardMembers(end.forecast.df, MEMBERS);
    return Array.from({ length: months }, (_, i) => membersAt(end.forecast, i + 1, standard));
  };
  return [forecast(series.focal), forecast(series.rival)];
}

/** Future observations of the own model; null for a firm that dies out in some of them, which has no logarithm. */
export function forecastOwn(draws: DrawSet, months: number, seed: number): MethodMembers {
  const thinned = thinDraws(draws, OWN_DRAWS);
  const levels = simulateLevels(thinned, months, seed);
  const futures = simulateObservations(thinned, levels, seed, OWN_REPLICATES);
  const toMembers = (users: Float64Array): FirmMembers | null => {
    if (!users.every((value) => value > 0 && value < Number.POSITIVE_INFINITY)) return null;
    return Array.from({ length: months }, (_, i) => {
      const sorted = users
        .subarray(i * futures.count, (i + 1) * futures.count)
        .map(Math.log)
        .sort();
      return Float64Array.from({ length: MEMBERS }, (_, k) => quantileSorted(sorted, (k + 0.5) / MEMBERS));
    });
  };
  return [toMembers(futures.focal), toMembers(futures.rival)];
}

/** ln users from the first positive count on; anything else later counts as not observed. */
export function toLogSeries(counts: readonly (number | null)[]): LogSeries {
  const isCount = (count: number | null) => count !== null && count > 0 && Number.isFinite(count);
  const first = counts.findIndex(isCount);
  return first < 0 ? [] : counts.slice(first).map((count) => (isCount(count) ? Math.log(count!) : null));
}

/** Quantile of members in ascending order, which stand for the levels (i + 1/2) / n. */
export function memberQuantile(members: Float64Array, p: number): number {
  const position = Math.min(members.length - 1, Math.max(0, p * members.length - 0.5));
  const below = Math.floor(position);
  const above = Math.min(below + 1, members.length - 1);
  return members[below] + (position - below) * (members[above] - members[below]);
}

/** Members of a mixture of methods: its quantiles at the levels of a single one. Weights add to 1. */
export function mixMembers(parts: readonly { members: Float64Array; weight: number }[]): Float64Array {
  const pool = parts
    .filter((part) => part.weight > 0)
    .flatMap(({ members, weight }) =>
      Array.from(members, (value) => ({ value, weight: weight / members.length })),
    )
    .sort((a, b) => a.value - b.value);
  const mixed = new Float64Array(MEMBERS);
  let passed = 0;
  let at = 0;
  for (let i = 0; i < MEMBERS; i++) {
    const level = (i + 0.5) / MEMBERS;
    while (at < pool.length - 1 && passed + pool[at].weight < level) passed += pool[at++].weight;
    mixed[i] = pool[at].value;
  }
  return mixed;
}
