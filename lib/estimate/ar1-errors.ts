/**
 * Persistent observation errors of one firm: e_k = ln count - ln level at the observed months t_1 < t_2 < ...,
 *
 *   e_1 ~ N(0, s^2),   e_k | e_{k-1} ~ N(rho_k e_{k-1}, s^2 (1 - rho_k^2)),   rho_k = phi^(t_k - t_{k-1})
 *
 * a stationary first-order autoregression, exact over gaps. s^2 = floor^2 + size^2; s in ln users, phi in (0, 1) without unit.
 */
import type { FirmObservations } from './observations';

/** Gradient of the log likelihood with respect to what the errors are made of. */
export interface ErrorGradient {
  /** d / d ln level, per month of the grid; zeros elsewhere. */
  level: Float64Array;
  /** d / d ln size. */
  logSize: number;
  /** d / d logit phi. */
  logitPersistence: number;
}

/** Log likelihood up to a constant; fills `gradient` (overwritten) unless null. */
export function ar1LogLikelihood(
  firm: FirmObservations,
  logLevel: Float64Array,
  logSize: number,
  logitPersistence: number,
  floor: number,
  gradient: ErrorGradient | null,
): number {
  const { months, logCounts } = firm;
  const count = months.length;
  const sizeSquared = Math.exp(2 * logSize);
  const variance = sizeSquared + floor * floor;
  const phi = 1 / (1 + Math.exp(-logitPersistence));
  const rhoOne = phi;
  const restOne = 1 - rhoOne * rhoOne;

  let value = -0.5 * count * Math.log(variance);
  let squares = 0;
  let slopePhi = 0;
  let previous = 0;
  let previousMonth = 0;
  if (gradient) gradient.level.fill(0);
  for (let k = 0; k < count; k++) {
    const month = months[k];
    const error = logCounts[k] - logLevel[month];
    if (k === 0) {
      squares += error * error;
      if (gradient) gradient.level[month] += error / variance;
    } else {
      const gap = month - previousMonth;
      const rho = gap === 1 ? rhoOne : phi ** gap;
      const rest = gap === 1 ? restOne : 1 - rho * rho;
      const surprise = error - rho * previous;
      const square = (surprise * surprise) / rest;
      squares += square;
      value -= 0.5 * Math.log(rest);
      if (gradient) {
        const pull = surprise / (rest * variance);
        gradient.level[month] += pull;
        gradient.level[previousMonth] -= rho * pull;
        const slopeRho = rho / rest + pull * previous - (rho * square) / (rest * variance);
        slopePhi += slopeRho * (gap === 1 ? 1 : gap * phi ** (gap - 1));
      }
    }
    previous = error;
    previousMonth = month;
  }
  if (gradient) {
    gradient.logSize = (squares / variance - count) * (sizeSquared / variance);
    gradient.logitPersistence = slopePhi * phi * (1 - phi);
  }
  return value - (0.5 * squares) / variance;
}
