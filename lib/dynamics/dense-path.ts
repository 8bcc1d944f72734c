/**
 * The path of an integration as a continuous function of time: on every accepted step the fourth-order interpolant of DOPRI5
 * (Hairer, Norsett & Wanner, Solving Ordinary Differential Equations I, section II.6), with s = (t - t_step)/h:
 *
 *   y(t) = c0 + s (c1 + (1 - s) (c2 + s (c3 + (1 - s) c4)))
 */
import { DENSE, STAGES } from './dormand-prince-tableau';

const FIRST_CAPACITY = 64;
const COEFFICIENTS = 5;

export class DensePath {
  /** Number of steps. */
  steps = 0;
  /** Start of each step; `times[steps]` is the end of the last one. */
  private times: Float64Array;
  private coefficients: Float64Array;

  constructor(
    private readonly n: number,
    t0: number,
    private readonly y0: Float64Array,
  ) {
    this.y0 = Float64Array.from(y0);
    this.times = new Float64Array(FIRST_CAPACITY + 1);
    this.times[0] = t0;
    this.coefficients = new Float64Array(FIRST_CAPACITY * COEFFICIENTS * n);
  }

  /** Adds the step from (t, y) to (t + h, y1) with its stage slopes k. */
  append(t: number, h: number, y: Float64Array, y1: Float64Array, k: Float64Array[]): void {
    const { n } = this;
    if (this.steps + 1 >= this.times.length) this.grow();
    this.times[this.steps + 1] = t + h;
    const c = this.coefficients;
    const first = this.steps * COEFFICIENTS * n;
    for (let i = 0; i < n; i++) {
      const change = y1[i] - y[i];
      const bend = h * k[0][i] - change;
      let fourth = 0;
      for (let s = 0; s < STAGES; s++) fourth += DENSE[s] * k[s][i];
      c[first + i] = y[i];
      c[first + n + i] = change;
      c[first + 2 * n + i] = bend;
      c[first + 3 * n + i] = change - h * k[STAGES - 1][i] - bend;
      c[first + 4 * n + i] = h * fourth;
    }
    this.steps++;
  }

  /** Start of step `index`; index = steps gives the end of the path. */
  timeOf(index: number): number {
    return this.times[index];
  }

  /** Fills `out` (length n) with the state at t; t outside the path is answered by its nearest end. */
  evaluateAt(t: number, out: Float64Array): void {
    if (this.steps === 0) {
      out.set(this.y0);
      return;
    }
    const step = this.findStep(t);
    const h = this.times[step + 1] - this.times[step];
    const s = Math.min(1, Math.max(0, (t - this.times[step]) / h));
    const { n, coefficients: c } = this;
    const first = step * COEFFICIENTS * n;
    for (let i = 0; i < n; i++) {
      const inner = c[first + 3 * n + i] + (1 - s) * c[first + 4 * n + i];
      const middle = c[first + 2 * n + i] + s * inner;
      out[i] = c[first + i] + s * (c[first + n + i] + (1 - s) * middle);
    }
  }

  /** Index of the step that holds t, by bisection; times may rise or fall. */
  private findStep(t: number): number {
    const direction = Math.sign(this.times[this.steps] - this.times[0]);
    let low = 0;
    let high = this.steps - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((t - this.times[middle]) * direction >= 0) low = middle;
      else high = middle - 1;
    }
    return low;
  }

  private grow(): void {
    const times = new Float64Array((this.times.length - 1) * 2 + 1);
    times.set(this.times);
    this.times = times;
    const coefficients = new Float64Array(this.coefficients.length * 2);
    coefficients.set(this.coefficients);
    this.coefficients = coefficients;
  }
}
