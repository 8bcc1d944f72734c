/** The small version of `npm run calibrate`: few repetitions, so a gross fault only; the script with 300 repetitions is the proof. */
import { expect, test } from 'vitest';
import { CALIBRATED, RANKS, rankTruth } from '../../bench/calibration';

const REPETITIONS = 24;

test('ranks of the true parameters among the draws are centred and spread as uniform ones', () => {
  const rows = Array.from({ length: REPETITIONS }, (_, i) => rankTruth(5_000 + i)).filter(
    (row) => row !== null,
  );
  expect(rows.length).toBeGreaterThan(REPETITIONS - 3);
  const sdOfMean = RANKS / Math.sqrt(12 * rows.length);
  CALIBRATED.forEach((id, j) => {
    const ranks = rows.map((row) => row[j]);
    const mean = ranks.reduce((sum, rank) => sum + rank, 0) / ranks.length;
    // 4 sd of the mean of uniform ranks: twelve of them fail by chance once in a thousand runs.
    expect(Math.abs(mean - (RANKS - 1) / 2), id).toBeLessThan(4 * sdOfMean);
    const ends = ranks.filter((rank) => rank < RANKS / 20 || rank >= RANKS - RANKS / 20).length;
    // A tenth of uniform ranks lies in the outer twentieths; 9 of 24 or more do once in 3,000 times (binomial).
    expect(ends, `${id}: too many ranks at the ends, draws too narrow`).toBeLessThan(9);
  });
});
