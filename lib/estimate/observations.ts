/**
 * The monthly series as the likelihood reads it: ln counts on a grid that begins with the first positive count of either firm.
 *
 * A count of 0 or null before a firm's first positive count: not launched yet, the firm enters in that first month. Anything
 * that is not a positive finite number later on: not observed.
 */
import { MIN_MONTHS_TO_FIT } from '../series/limits';
import type { MonthlySeries } from '../series/types';
import type { FitStatus } from './types';

export interface FirmObservations {
  /** Month index on the grid in which the firm enters. */
  entry: number;
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
  const firms = [readFirm(series.focal, skippedMonths), readFirm(series.rival, skippedMonths)] as const;
  if (firms.every(isConstant)) return { ok: false, status: 'no-usable-data' };
  return { ok: true, observations: { months: series.focal.length - skippedMonths, skippedMonths, firms } };
}

function isCount(value: number | null): value is number {
  return value !== null && value > 0 && value < Number.POSITIVE_INFINITY;
}

/** Months in which both firms are known and at least one has launched; before its launch a firm is known to have no users. */
function countKnownMonths(series: MonthlySeries, firstFocal: number, firstRival: number): number {
  let known = 0;
  for (let t = Math.min(firstFocal, firstRival); t < series.focal.length; t++) {
    const isFocalKnown = t < firstFocal || isCount(series.focal[t]);
    const isRivalKnown = t < firstRival || isCount(series.rival[t]);
    if (isFocalKnown && isRivalKnown) known++;
  }
  return known;
}

function readFirm(counts: readonly (number | null)[], skipped: number): FirmObservations {
  const months: number[] = [];
  const logCounts: number[] = [];
  for (let t = skipped; t < counts.length; t++) {
    const count = counts[t];
    if (!isCount(count)) continue;
    months.push(t - skipped);
    logCounts.push(Math.log(count));
  }
  return { entry: months[0], months: Int32Array.from(months), logCounts: Float64Array.from(logCounts) };
}

function isConstant(firm: FirmObservations): boolean {
  return firm.logCounts.every((value) => value === firm.logCounts[0]);
}
