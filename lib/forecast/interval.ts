import { quantiles } from '../numeric/quantile';
import type { Interval } from './report';

/** Median and 90 % interval of values; at least one value. */
export function intervalOf(values: ArrayLike<number>): Interval {
  const [q05, q50, q95] = quantiles(values, [0.05, 0.5, 0.95]);
  return { q05, q50, q95 };
}
