/**
 * One draw of the whole unobserved path given the counts: forward filter, backward sample (Carter & Kohn 1994; Fruehwirth-Schnatter 1994).
 *
 *   z(T-1) ~ N(m, P);   z(t) | z(t+1) ~ N(m + J (z(t+1) - m'), P - J P' J'),   J = P F' P'^-1
 *
 * m, P filtered at t; m', P' predicted for t+1; F = d Phi / d z. All in ln users.
 */
import type { RandomStream } from '../numeric/random';
import { type FilterHistory, STATE_WIDTH } from './kalman-filter';

/** Added to the variances that are inverted, ln users squared: a firm not yet launched has none. */
const TINY_VARIANCE = 1e-14;

/** Fills `out` (2 x months, firm-major) from the last run of a filter; months before a firm's entry hold whatever the filter did. */
export function sampleStatePath(
  history: FilterHistory,
  months: number,
  stream: RandomStream,
  out: Float64Array,
): void {
  const { states, jacobians } = history;
  const last = (months - 1) * STATE_WIDTH;
  drawPair(
    states[last],
    states[last + 1],
    states[last + 2],
    states[last + 3],
    states[last + 4],
    stream,
    out,
    months - 1,
    months,
  );
  for (let t = months - 2; t >= 0; t--) {
    const at = t * STATE_WIDTH;
    const next = at + STATE_WIDTH + 5;
    const f11 = jacobians[4 * t];
    const f12 = jacobians[4 * t + 1];
    const f21 = jacobians[4 * t + 2];
    const f22 = jacobians[4 * t + 3];
    const p11 = states[at + 2];
    const p12 = states[at + 3];
    const p22 = states[at + 4];
    const s11 = states[next + 2] + TINY_VARIANCE;
    const s12 = states[next + 3];
    const s22 = states[next + 4] + TINY_VARIANCE;
    const determinant = s11 * s22 - s12 * s12;
    // G = P F'
    const g11 = p11 * f11 + p12 * f12;
    const g12 = p11 * f21 + p12 * f22;
    const g21 = p12 * f11 + p22 * f12;
    const g22 = p12 * f21 + p22 * f22;
    const j11 = (g11 * s22 - g12 * s12) / determinant;
    const j12 = (g12 * s11 - g11 * s12) / determinant;
    const j21 = (g21 * s22 - g22 * s12) / determinant;
    const j22 = (g22 * s11 - g21 * s12) / determinant;
    const d1 = out[t + 1] - states[next];
    const d2 = out[months + t + 1] - states[next + 1];
    drawPair(
      states[at] + j11 * d1 + j12 * d2,
      states[at + 1] + j21 * d1 + j22 * d2,
      p11 - (j11 * g11 + j12 * g12),
      p12 - (j11 * g21 + j12 * g22),
      p22 - (j21 * g21 + j22 * g22),
      stream,
      out,
      t,
      months,
    );
  }
}

/** One draw of a bivariate normal; a variance that rounding made negative counts as 0. */
function drawPair(
  mean1: number,
  mean2: number,
  p11: number,
  p12: number,
  p22: number,
  stream: RandomStream,
  out: Float64Array,
  t: number,
  months: number,
): void {
  const sd1 = Math.sqrt(Math.max(p11, 0));
  const slope = p11 > TINY_VARIANCE ? p12 / p11 : 0;
  const deviation = sd1 * stream.normal();
  out[t] = mean1 + deviation;
  out[months + t] = mean2 + slope * deviation + Math.sqrt(Math.max(p22 - slope * p12, 0)) * stream.normal();
}
