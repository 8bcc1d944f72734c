/**
 * Does one forecast beat another by more than chance? The test of Diebold & Mariano (1995) on loss differences d_t, with the small-sample
 * correction of Harvey, Leybourne & Newbold (1997):
 *
 *   DM = mean(d) / sqrt((g_0 + 2 sum_{k=1}^{h-1} g_k) / n),   g_k: autocovariance of d at lag k (divisor n)
 *   DM* = DM sqrt((n + 1 - 2h + h (h - 1) / n) / n),  against Student's t with n - 1 degrees of freedom, two-sided
 */
import { studentTCdf } from '../numeric/student-t';
import { mean } from './scores';

export interface DieboldMariano {
  meanDifference: number;
  /** null, with the p-value: the variance of the mean comes out negative or 0, or the correction leaves nothing. */
  statistic: number | null;
  pValue: number | null;
}

/**
 * @param differences loss of the first forecast less loss of the second, one entry an origin, in order of time
 * @param overlap h: origins whose outcomes lie within one forecast's horizon, 1 for no overlap
 */
export function testDieboldMariano(differences: readonly number[], overlap: number): DieboldMariano {
  if (!(Number.isInteger(overlap) && overlap >= 1)) {
    throw new RangeError(`overlap must be a positive integer, got ${overlap}`);
  }
  const n = differences.length;
  const meanDifference = mean(differences);
  let variance = autocovariance(differences, meanDifference, 0);
  for (let lag = 1; lag < overlap; lag++) variance += 2 * autocovariance(differences, meanDifference, lag);
  const correction = (n + 1 - 2 * overlap + (overlap * (overlap - 1)) / n) / n;
  if (!(n > 1 && variance > 0 && correction > 0)) return { meanDifference, statistic: null, pValue: null };
  const statistic = Math.sqrt(correction) * (meanDifference / Math.sqrt(variance / n));
  const pValue = Math.min(1, 2 * (1 - studentTCdf(Math.abs(statistic), n - 1)));
  return { meanDifference, statistic, pValue };
}

function autocovariance(values: readonly number[], centre: number, lag: number): number {
  let sum = 0;
  for (let t = lag; t < values.length; t++) sum += (values[t] - centre) * (values[t - lag] - centre);
  return sum / values.length;
}
