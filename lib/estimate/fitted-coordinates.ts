/**
 * Working coordinates (`coordinate-map.ts`) fitted to points that chains have visited: slopes by regression, units from the middle of each
 * sample, widths by how the spread of each coordinate goes with the errors.
 */
import { choleskyOrNull, sampleCovariance } from '../numeric/cholesky';
import { quantilesInPlace } from '../numeric/quantile';
import {
  bendCoordinates,
  type CoordinateMap,
  orderCoordinates,
  regressionSlopes,
  reorder,
  type Target,
  type Width,
  type WorkingCoordinates,
} from './coordinate-map';
import { BENT, fillLogValues } from './crowding-values';
import { fitLogScale } from './log-scale';

/** Share of the sample beyond which, on each side, a value counts as the last one within: keeps a long tail from ruling the slopes. */
const TAIL = 0.02;
/** Middle part of a sample that stands for one sd on either side. */
const SPREAD_LOW = 0.16;
const SPREAD_HIGH = 0.84;
/** A sample that does not vary still needs a unit; and a covariance of it a little room. */
const SMALLEST_RELATIVE_UNIT = 1e-6;
const ROOM = 1e-6;

/** Coordinates fitted to a sample of q: unlike the curvature at a mode it knows long and lopsided tails. */
export function fitCoordinates(target: Target, sample: readonly Float64Array[]): WorkingCoordinates {
  const n = sample[0].length;
  const order = orderCoordinates(target, n);
  const { values, logUnits } = measureValues(target, sample);
  const trimmed = values.map((row) => row.slice());
  const column = new Float64Array(sample.length);
  for (let j = 0; j < n; j++) {
    const [low, high] = quantilesInPlace(readColumn(values, j, column), [TAIL, 1 - TAIL]);
    for (const row of trimmed) row[j] = Math.min(Math.max(row[j], low), high);
  }
  const covariance = reorder(sampleCovariance(trimmed, n), order);
  for (let p = 0; p < n; p++) covariance[p * (n + 1)] *= 1 + ROOM;
  const slopes = regressionSlopes(choleskyOrNull(covariance, n), n);
  const plain = { order, logUnits, slopes, width: null };
  return bendCoordinates(target, { ...plain, width: fitWidth(target, plain, sample, values) });
}

/** v of every point of a sample, and units that suit it. */
function measureValues(
  { segments }: Target,
  sample: readonly Float64Array[],
): { values: Float64Array[]; logUnits: Float64Array } {
  const values = sample.map((q) => {
    const row = q.slice();
    for (const at of segments) fillLogValues(q, at, row);
    return row;
  });
  const logUnits = new Float64Array(sample[0].length);
  const column = new Float64Array(sample.length);
  for (const at of segments) {
    for (let j = at; j < at + BENT; j++) {
      const [low, middle, high] = quantilesInPlace(readColumn(values, j, column), [
        SPREAD_LOW,
        0.5,
        SPREAD_HIGH,
      ]);
      const relative = (Math.exp(high - middle) - Math.exp(low - middle)) / 2;
      logUnits[j] = middle + Math.log(Math.min(Math.max(relative, SMALLEST_RELATIVE_UNIT), 1));
      for (const row of values) row[j] = Math.exp(row[j] - logUnits[j]);
    }
  }
  return { values, logUnits };
}

function readColumn(rows: readonly Float64Array[], j: number, out: Float64Array): Float64Array {
  for (let i = 0; i < rows.length; i++) out[i] = rows[i][j];
  return out;
}

function fitWidth(
  target: Target,
  plain: CoordinateMap,
  sample: readonly Float64Array[],
  values: readonly Float64Array[],
): Width {
  const { errors } = target;
  const n = sample[0].length;
  const column = new Float64Array(sample.length);
  const centres = new Float64Array(errors.length);
  const spreads = new Float64Array(errors.length);
  errors.forEach((j, e) => {
    const [low, middle, high] = quantilesInPlace(readColumn(values, j, column), [
      SPREAD_LOW,
      0.5,
      SPREAD_HIGH,
    ]);
    centres[e] = middle;
    spreads[e] = Math.max((high - low) / 2, SMALLEST_RELATIVE_UNIT);
  });
  const weights = sample.map((q) =>
    Float64Array.from(errors, (j, e) => 2 * Math.tanh((q[j] - centres[e]) / spreads[e] / 2)),
  );
  const unscaled = bendCoordinates(target, plain);
  const points = sample.map((q) => {
    const u = new Float64Array(n);
    unscaled.fromParameters(q, u);
    return u;
  });
  const middles = new Float64Array(n);
  const leans = new Float64Array(n * errors.length);
  for (let j = 0; j < n; j++) {
    if (errors.includes(j)) continue;
    const { middle, slopes } = fitLogScale(readColumn(points, j, column), weights);
    middles[j] = middle;
    leans.set(slopes, j * errors.length);
  }
  return { middles, leans, centres, spreads };
}
