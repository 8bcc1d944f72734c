/** The cases of a backtest: one forecast of one firm at one horizon from one origin, with what then happened. */
import type { MonthlySeries } from '../../series/types';
import { naiveScale } from '../scores';
import { type MembersByMethod, toLogSeries } from './members';
import { METHODS, type Method } from './report';

export interface Case {
  /** Position among the used origins. */
  origin: number;
  horizonMonths: number;
  /** ln users. */
  actual: number;
  /** Users: mean change from month to month in the training months; null: none. */
  naiveScale: number | null;
  /** Ascending ln users; absent: the method gave no forecast. */
  members: Partial<Record<Method, Float64Array>>;
}

export interface OriginForecasts {
  origin: number;
  /** Training months. */
  training: number;
  forecasts: MembersByMethod;
}

/** Cases in which the own model gave a forecast and the month was observed. */
export function listCases(
  series: MonthlySeries,
  { origin, training, forecasts }: OriginForecasts,
  horizons: readonly number[],
): Case[] {
  return [series.focal, series.rival].flatMap((counts, firm) =>
    horizons.flatMap((horizonMonths) => {
      const count = counts[training - 1 + horizonMonths];
      const [actual] = toLogSeries([count]);
      const members: Case['members'] = {};
      for (const method of METHODS) {
        const found = forecasts[method][firm]?.[horizonMonths - 1];
        if (found) members[method] = found;
      }
      if (actual == null || !members.competition) return [];
      return [{ origin, horizonMonths, actual, naiveScale: naiveScale(counts.slice(0, training)), members }];
    }),
  );
}

/** Methods with a forecast in every case, in the order of METHODS. */
export function listCompleteMethods(cases: readonly Case[]): Method[] {
  return METHODS.filter((method) => cases.every(({ members }) => members[method]));
}
