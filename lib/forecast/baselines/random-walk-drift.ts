/**
 * Random walk with drift on ln users: the straight trend through the first and the last count.
 *
 *   y(T+h) = y(T) + h d,  d = (y_last - y_first) / M over M months;  variance s^2 (g + h + (g + h)^2 / M)
 *   s^2 = sum over steps of (change - months d)^2 / months / (n - 1): a gap of g months is one step of variance g s^2
 *
 * Student t with n - 1 degrees of freedom, n steps. g: months since the last count. Source: Hyndman & Athanasopoulos, Forecasting:
 * Principles and Practice, section 5.5, whose variance of the drift is the same.
 */
import { type BaselineEnd, endWith, type LogSeries, listObserved } from './baseline';

const MIN_STEPS = 4;

export function forecastRandomWalk(series: LogSeries, months: number): BaselineEnd {
  const { times, values } = listObserved(series);
  const steps = values.length - 1;
  if (steps < MIN_STEPS) return { ok: false, code: 'too-short' };
  const [lastTime, lastValue] = [times[steps], values[steps]];
  const span = lastTime - times[0];
  const drift = (lastValue - values[0]) / span;
  let sum = 0;
  for (let i = 1; i <= steps; i++) {
    const gap = times[i] - times[i - 1];
    sum += (values[i] - values[i - 1] - gap * drift) ** 2 / gap;
  }
  const variance = sum / (steps - 1);
  const since = series.length - 1 - lastTime;
  const ahead = Float64Array.from({ length: months }, (_, i) => since + i + 1);
  return endWith({
    centre: ahead.map((h) => lastValue + h * drift),
    scale: ahead.map((h) => Math.sqrt(variance * (h + (h * h) / span))),
    df: steps - 1,
  });
}
