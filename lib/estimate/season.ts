/**
 * A yearly cycle as harmonics of ln counts: offset(m) = sum_k (sd / k) (c_k cos(2 pi k m / 12) + d_k sin(2 pi k m / 12)).
 *
 * Coefficients c, d ~ N(0, 1) independently: a shrinking prior, smoother cycles first. The twelve offsets sum to 0 by construction; six
 * harmonics hold every cycle of twelve monthly factors. m counts months of the grid; any first month gives the same prior.
 */
import { SEASON_MONTHS } from './kalman-filter';

/** sd of the first harmonic of ln counts: a cycle of +-10 % is nothing special (common practice). */
const FIRST_SD = 0.1;

export type Harmonics = 0 | 1 | 2 | 6;

/** Rows of twelve offsets, one per coefficient. */
export function createSeasonBasis(harmonics: Harmonics): Float64Array[] {
  const rows: Float64Array[] = [];
  const wave = (k: number, of: (angle: number) => number) =>
    Float64Array.from(
      { length: SEASON_MONTHS },
      (_, m) => (FIRST_SD / k) * of((2 * Math.PI * k * m) / SEASON_MONTHS),
    );
  for (let k = 1; k <= harmonics; k++) {
    rows.push(wave(k, Math.cos));
    // the sine of the shortest wave is 0 in every month
    if (2 * k < SEASON_MONTHS) rows.push(wave(k, Math.sin));
  }
  return rows;
}
