/**
 * The fitted level in each month of the series: median and 90 % interval over sampled paths, null before a firm's launch and once it has left.
 */
import type { Fit } from '../estimate/fit-run';
import { intervalOf } from './interval';
import type { FitReport, Interval } from './report';

export function computeHistory({ observations, paths }: Fit): FitReport['history'] {
  const { months, skippedMonths, firms } = observations;
  const rows = (firm: 0 | 1): (Interval | null)[] => [
    ...Array.from({ length: skippedMonths }, () => null),
    ...Array.from({ length: months }, (_, t) =>
      t < firms[firm].entry || t >= (firms[firm].exit ?? months) || paths.length === 0
        ? null
        : intervalOf(paths.map((path) => Math.exp(path[firm * months + t]))),
    ),
  ];
  return { focal: rows(0), rival: rows(1) };
}
