/** Quantiles per month over draws, with one buffer that is used again and again. */
import type { Bands, Interval } from '../forecast/report';
import { quantileSorted } from '../numeric/quantile';

const LEVELS = { q05: 0.05, q25: 0.25, q50: 0.5, q75: 0.75, q95: 0.95 } as const;
const BAND_IDS = Object.keys(LEVELS) as (keyof Bands)[];

/** Bands of month-major values: month h of entry i at (h - 1) * count + i. */
export class BandMaker {
  private readonly buffer: Float64Array;

  /** @param count entries per month */
  constructor(private readonly count: number) {
    this.buffer = new Float64Array(count);
  }

  bands(values: Float64Array, months: number): Bands {
    const bands: Bands = { q05: [], q25: [], q50: [], q75: [], q95: [] };
    for (let h = 0; h < months; h++) {
      this.sortMonth(values, h);
      for (const id of BAND_IDS) bands[id].push(quantileSorted(this.buffer, LEVELS[id]));
    }
    return bands;
  }

  /** Median and 90 % interval of one month, counted from 0. */
  interval(values: Float64Array, h: number): Interval {
    this.sortMonth(values, h);
    return {
      q05: quantileSorted(this.buffer, LEVELS.q05),
      q50: quantileSorted(this.buffer, LEVELS.q50),
      q95: quantileSorted(this.buffer, LEVELS.q95),
    };
  }

  private sortMonth(values: Float64Array, h: number): void {
    this.buffer.set(values.subarray(h * this.count, (h + 1) * this.count));
    this.buffer.sort();
  }
}
