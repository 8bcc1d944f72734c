/**
 * Hamiltonian Monte Carlo (Duane, Kennedy, Pendleton & Roweth 1987; Neal 2011) with a fixed metric: one chain.
 *
 * Position u, momentum p ~ N(0, I) in the metric M = (C C')^-1 with C lower triangular: u moves along C p, p along C' grad.
 * Leapfrog steps of size eps; the end is taken with probability min(1, exp(-change of energy)).
 */
import type { RandomStream } from '../numeric/random';

export type LogDensity = (u: Float64Array, gradient: Float64Array | null) => number;

export interface HmcChain {
  /** Where the chain stands; changes in place. */
  readonly position: Float64Array;
  readonly logDensity: number;
  /** One trajectory. @returns its acceptance probability; 0 when it left the support */
  move(metric: Float64Array, stepSize: number, steps: number): number;
  /** Puts the chain somewhere else. @returns whether the density is finite there */
  reset(position: Float64Array): boolean;
  /** Puts the chain at a point whose log density is known; its gradient is taken when it is needed. */
  take(position: Float64Array, logDensity: number): void;
}

export function createHmcChain(dimension: number, density: LogDensity, stream: RandomStream): HmcChain {
  const n = dimension;
  const position = new Float64Array(n);
  const gradient = new Float64Array(n);
  const trial = new Float64Array(n);
  const trialGradient = new Float64Array(n);
  const momentum = new Float64Array(n);
  let logDensity = Number.NEGATIVE_INFINITY;
  let hasGradient = false;

  /** momentum += factor C' gradient. */
  const kick = (metric: Float64Array, factor: number, slope: Float64Array) => {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let i = j; i < n; i++) sum += metric[i * n + j] * slope[i];
      momentum[j] += factor * sum;
    }
  };
  /** trial += factor C momentum. */
  const drift = (metric: Float64Array, factor: number) => {
    for (let i = 0; i < n; i++) {
      let sum = 0;
      const row = i * n;
      for (let j = 0; j <= i; j++) sum += metric[row + j] * momentum[j];
      trial[i] += factor * sum;
    }
  };
  const kineticEnergy = () => {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += momentum[j] * momentum[j];
    return sum / 2;
  };

  const move = (metric: Float64Array, stepSize: number, steps: number): number => {
    for (let j = 0; j < n; j++) momentum[j] = stream.normal();
    if (!hasGradient) density(position, gradient);
    hasGradient = true;
    const before = logDensity - kineticEnergy();
    trial.set(position);
    kick(metric, stepSize / 2, gradient);
    let trialDensity = logDensity;
    for (let step = 1; step <= steps; step++) {
      drift(metric, stepSize);
      trialDensity = density(trial, trialGradient);
      if (!(trialDensity > Number.NEGATIVE_INFINITY)) return 0;
      kick(metric, step < steps ? stepSize : stepSize / 2, trialGradient);
    }
    const acceptance = Math.exp(Math.min(0, trialDensity - kineticEnergy() - before));
    if (!(acceptance >= 0)) return 0;
    if (stream.uniform() < acceptance) {
      position.set(trial);
      gradient.set(trialGradient);
      logDensity = trialDensity;
    }
    return acceptance;
  };

  return {
    position,
    get logDensity() {
      return logDensity;
    },
    move,
    take(to, itsDensity) {
      position.set(to);
      logDensity = itsDensity;
      hasGradient = false;
    },
    reset(to) {
      position.set(to);
      logDensity = density(position, gradient);
      hasGradient = true;
      return logDensity > Number.NEGATIVE_INFINITY;
    },
  };
}
