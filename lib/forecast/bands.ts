/**
 * Quantile bands per future month: 5, 25, 50, 75, 95 % of users of each firm, their total and the focal firm's share.
 */
import { quantilesInPlace } from '../numeric/quantile';
import type { Bands, SeriesBands } from './report';
import type { Futures } from './simulate';

const LEVELS = { q05: 0.05, q25: 0.25, q50: 0.5, q75: 0.75, q95: 0.95 } as const;

export function computeSeriesBands(futures: Futures): SeriesBands {
  const { focal, rival } = futures;
  const total = focal.map((users, at) => users + rival[at]);
  const share = focal.map((users, at) => shareOf(users, rival[at]));
  return {
    focal: computeBands(focal, futures),
    rival: computeBands(rival, futures),
    total: computeBands(total, futures),
    share: computeBands(share, futures),
  };
}

/** Share of the focal firm; a half when nobody has a user. */
export function shareOf(focal: number, rival: number): number {
  const total = focal + rival;
  return total > 0 ? focal / total : 0.5;
}

/** Bands of month-major values (see `Futures`). */
export function computeBands(
  values: Float64Array,
  { months, count }: { months: number; count: number },
): Bands {
  const ids = Object.keys(LEVELS) as (keyof Bands)[];
  const levels = ids.map((id) => LEVELS[id]);
  const bands: Bands = { q05: [], q25: [], q50: [], q75: [], q95: [] };
  for (let h = 0; h < months; h++) {
    const row = quantilesInPlace(values.slice(h * count, (h + 1) * count), levels);
    ids.forEach((id, k) => {
      bands[id].push(row[k]);
    });
  }
  return bands;
}
