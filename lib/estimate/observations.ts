/**
 * The monthly series as the likelihood reads it: ln counts on a grid that begins with the first positive count of either firm.
 *
 * A count of 0 or null before a firm's first positive count: not launched yet, the firm enters in that first month. A run of zeros to the
 * end while the other firm goes on: it has left, and has no users from the first of them on. Anything else that is not a positive finite
 * number: not observed.
 */
import type { TrajectoryGrid } from '../dynamics/trajectory';
import { MIN_MONTHS_TO_FIT } from '../series/limits';
import type { MonthlySeries } from '../series/types';
import type { FitStatus } from './types';

export interface FirmObservations {
  /** Month index on the grid in which the firm enters. */
  entry: number;
  /** Month index from which on the firm has no users; absent: it is still there. */
  exit?: number;
  /** Month indices with a count, ascending; the first is `entry`. */
  months: Int32Array;
  /** ln users of those months. */
  logCounts: Float64Array;
}

export interface Observations {
  /** Months on the grid. */
  months: number;
  /** Months of the series before the grid begins. */
  skippedMonths: number;
  /** Focal firm, rival. */
  firms: readonly [FirmObservations, FirmObservations];
}

/** When each firm enters and leaves, as an integrator wants it. */
export function gridOf({ months, firms }: Observations): TrajectoryGrid {
  const [first, second] = firms;
  return {
    months,
    entry1: first.entry,
    entry2: second.entry,
    ...(first.exit !== undefined && { exit1: first.exit }),
    ...(second.exit !== undefined && { exit2: second.exit }),
  };
}

export type ObservationsReading =
  | { ok: true; observations: Observations }
  | { ok: false; status: Extract<FitStatus, 'too-short' | 'no-usable-data'> };

/** @throws RangeError when the two rows of the series differ in length */
export function readObservations(series: MonthlySeries): ObservationsReading {
  if (series.focal.length !== series.rival.length) {
    throw new RangeError(
      `series.focal and series.rival must have equal lengths, got ${series.focal.length} and ${series.rival.length}`,
    );
  }
  const firstFocal = series.focal.findIndex(isCount);
  const firstRival = series.rival.findIndex(isCount);
  if (firstFocal < 0 || firstRival < 0) return { ok: false, status: 'no-usable-data' };
  if (countKnownMonths(series, firstFocal, firstRival) < MIN_MONTHS_TO_FIT)
    return { ok: false, status: 'too-short' };

  const skippedMonths = Math.min(firstFocal, firstRival);
  const firms = [
    readFirm(series.focal, skippedMonths, findExit(series.focal, series.rival)),
    readFirm(series.rival, skippedMonths, findExit(series.rival, series.focal)),
  ] as const;
  if (firms.every(isConstant)) return { ok: false, status: 'no-usable-data' };
  return { ok: true, observations: { months: series.focal.length - skippedMonths, skippedMonths, firms } };
}

/** Zeros in a row at the end from which on a firm counts as gone: fewer may be an outage. */
export const EXIT_ZEROS = 3;

/** First of the zeros that end a firm's counts while the other one still has some; null: the firm is still there. */
function findExit(own: readonly (number | null)[], other: readonly (number | null)[]): number | null {
  const last = own.findLastIndex(isCount);
  const rest = own.slice(last + 1);
  const isGone = rest.length >= EXIT_ZEROS && rest.every((count) => count === 0);
  return isGone && other.findLastIndex(isCount) > last ? last + 1 : null;
}

function isCount(value: number | null): value is number {
  return value !== null && value > 0 && value < Number.POSITIVE_INFINITY;
}

/** Months in which both firms are known and at least one has launched; before its launch and once it has left a firm is known to have no users. */
function countKnownMonths(series: MonthlySeries, firstFocal: number, firstRival: number): number {
  const focalExit = findExit(series.focal, series.rival) ?? Number.POSITIVE_INFINITY;
  const rivalExit = findExit(series.rival, series.focal) ?? Number.POSITIVE_INFINITY;
  let known = 0;
  for (let t = Math.min(firstFocal, firstRival); t < series.focal.length; t++) {
    const isFocalKnown = t < firstFocal || isCount(series.focal[t]) || t >= focalExit;
    const isRivalKnown = t < firstRival || isCount(series.rival[t]) || t >= rivalExit;
    if (isFocalKnown && isRivalKnown) known++;
  }
  return known;
}

function readFirm(
  counts: readonly (number | null)[],
  skipped: number,
  exit: number | null,
): FirmObservations {
  const months: number[] = [];
  const logCounts: number[] = [];
  for (let t = skipped; t < counts.length; t++) {
    const count = counts[t];
    if (!isCount(count)) continue;
    months.push(t - skipped);
    logCounts.push(Math.log(count));
  }
  return {
    entry: months[0],
    ...(exit !== null && { exit: exit - skipped }),
    months: Int32Array.from(months),
    logCounts: Float64Array.from(logCounts),
  };
}

function isConstant(firm: FirmObservations): boolean {
  return firm.logCounts.every((value) => value === firm.logCounts[0]);
}
