/** What every simple method reads and gives: one firm's ln users in, a predictive distribution a month ahead out. */
import { studentTQuantile } from '../../numeric/student-t';

/** One firm's training months from its first positive count to the last month of the training, ln users; null: not observed. */
export type LogSeries = readonly (number | null)[];

export type BaselineFailure =
  /** The firm has too few counts for this method. */
  | 'too-short'
  /** No finite forecast. */
  | 'failed';

/** ln users h = 1 .. months ahead of the last training month: centre + scale * Student t with df degrees of freedom. */
export interface LogForecast {
  centre: Float64Array;
  scale: Float64Array;
  df: number;
}

export type BaselineEnd = { ok: true; forecast: LogForecast } | { ok: false; code: BaselineFailure };

/** @param months how far to forecast, at least 1 */
export type Baseline = (series: LogSeries, months: number) => BaselineEnd;

/** @returns the forecast, or 'failed' when a number in it is not finite */
export function endWith(forecast: LogForecast): BaselineEnd {
  const isUsable = forecast.centre.every(Number.isFinite) && forecast.scale.every(Number.isFinite);
  return isUsable ? { ok: true, forecast } : { ok: false, code: 'failed' };
}

/** Observed months as times (months from the start of the series) and values. */
export function listObserved(series: LogSeries): { times: number[]; values: number[] } {
  const times: number[] = [];
  const values: number[] = [];
  series.forEach((value, t) => {
    if (value === null) return;
    times.push(t);
    values.push(value);
  });
  return { times, values };
}

/**
 * Equally likely members that stand for a forecast: its quantiles at (i + 1/2) / count, ascending, of month h (from 1).
 * @param standard Student t quantiles from `standardMembers`
 */
export function membersAt(forecast: LogForecast, h: number, standard: Float64Array): Float64Array {
  const [centre, scale] = [forecast.centre[h - 1], forecast.scale[h - 1]];
  return standard.map((quantile) => centre + scale * quantile);
}

export function standardMembers(df: number, count: number): Float64Array {
  const members = new Float64Array(count);
  for (let i = 0; 2 * i < count; i++) {
    const low = studentTQuantile((i + 0.5) / count, df);
    members[i] = low;
    members[count - 1 - i] = -low;
  }
  return members;
}
