/**
 * The crowding form of a segment in logarithms: b_ii = r_i / K_i, b12 = alpha r1 / K2, b21 = beta r2 / K1, and the growth rates.
 */

/** Values per segment. */
export const BENT = 6;

/** Logarithms of b12, b21, b11, b22, r1, r2 of the segment at `at`: b_ii = r_i/K_i, b12 = alpha r1/K2, b21 = beta r2/K1. */
export function fillLogValues(q: Float64Array, at: number, out: Float64Array): void {
  out[at] = q[at + 4] + q[at] - q[at + 3];
  out[at + 1] = q[at + 5] + q[at + 1] - q[at + 2];
  out[at + 2] = q[at] - q[at + 2];
  out[at + 3] = q[at + 1] - q[at + 3];
  out[at + 4] = q[at];
  out[at + 5] = q[at + 1];
}

/** Rows of the linear map of `fillLogValues`, over the six log parameters. */
export const LOG_VALUE_ROWS = [
  [1, 0, 0, -1, 1, 0],
  [0, 1, -1, 0, 0, 1],
  [1, 0, -1, 0, 0, 0],
  [0, 1, 0, -1, 0, 0],
  [1, 0, 0, 0, 0, 0],
  [0, 1, 0, 0, 0, 0],
] as const;

/** 1 where a coordinate is one of the six of a segment. */
export function markBent(segments: readonly number[], n: number): Uint8Array {
  const isBent = new Uint8Array(n);
  for (const at of segments) isBent.fill(1, at, at + BENT);
  return isBent;
}
