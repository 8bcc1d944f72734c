/**
 * One chain of a component: Hamiltonian trajectories and, where parameters may jump, Metropolis steps of the month of the break.
 * Each kind of step leaves the posterior as it is, so any fixed mixture of them does.
 */
import type { RandomStream } from '../numeric/random';
import type { ModelComponent } from './break-choice';
import type { WorkingCoordinates } from './coordinate-map';
import { createHmcChain } from './hmc';
import type { LocalMode } from './local-mode';

/** Mean length of a trajectory in units of the metric: a little more than a quarter turn of a standard normal, so that draws swing over. Drawn anew each time, so that no length resonates. */
const MEAN_LENGTH = 2;
const LENGTH_SPREAD = 0.4;
/** Share of trajectories with a far smaller step: they lead a chain out of a corner that is sharper than the metric knows. */
const CAREFUL_SHARE = 0.05;
const CAREFUL_STEP = 0.2;
const CAREFUL_STEPS = 8;
const MAX_STEPS = 40;
/** Moves of the month of the break per draw, and the longest of them. */
const BREAK_MOVES = 2;
const LONGEST_BREAK_MOVE = 8;
/** Tries of a spread-out first place before the mode itself is taken. */
const PLACE_TRIES = 20;
/** Log density below the mode at which a first place is too far out. */
const PLACE_DEPTH = 30;

export interface Walker {
  readonly stream: RandomStream;
  /** Fills q with the point where the walker stands. */
  read(q: Float64Array): void;
  /** Goes on in other coordinates from the point q. */
  change(coordinates: WorkingCoordinates, q: Float64Array): void;
  /** One trajectory. @returns its acceptance; null when it was a careful one, which says nothing about the step */
  move(metric: Float64Array, stepSize: number): number | null;
  /** Moves of the month of the break, where there is one; leaves the posterior at the walker's month. */
  moveBreak(): void;
}

/** A walker begins near its mode, spread as the metric says, so that R-hat means something. */
export function placeWalker(
  { posterior, breakMonths }: ModelComponent,
  metric: Float64Array,
  firstCoordinates: WorkingCoordinates,
  mode: LocalMode,
  stream: RandomStream,
): Walker {
  const n = posterior.dimension;
  let coordinates = firstCoordinates;
  const chain = createHmcChain(n, (u, gradient) => coordinates.logDensity(u, gradient), stream);
  const trial = new Float64Array(n);
  let breakMonth = mode.breakMonth;

  const tryMonth = (first: number, last: number) => {
    const distance = 1 + stream.integer(stream.uniform() < 0.5 ? 1 : LONGEST_BREAK_MOVE);
    const month = breakMonth! + (stream.uniform() < 0.5 ? -distance : distance);
    if (!(month >= first && month <= last)) return;
    posterior.breakMonth = month;
    const density = coordinates.logDensity(chain.position, null);
    if (!(Math.log(stream.uniform()) < density - chain.logDensity)) return;
    breakMonth = month;
    chain.take(chain.position, density);
  };

  const place = () => {
    posterior.breakMonth = breakMonth;
    const centre = new Float64Array(n);
    coordinates.fromParameters(mode.q, centre);
    const top = coordinates.logDensity(centre, null);
    for (let attempt = 0; attempt < PLACE_TRIES; attempt++) {
      const z = Float64Array.from({ length: n }, () => stream.normal());
      for (let i = 0; i < n; i++) {
        trial[i] = centre[i];
        for (let k = 0; k <= i; k++) trial[i] += metric[i * n + k] * z[k];
      }
      if (coordinates.logDensity(trial, null) > top - PLACE_DEPTH && chain.reset(trial)) return;
    }
    chain.reset(centre);
  };

  place();
  return {
    stream,
    read(q) {
      coordinates.toParameters(chain.position, q);
    },
    change(next, q) {
      posterior.breakMonth = breakMonth;
      coordinates = next;
      coordinates.fromParameters(q, trial);
      chain.reset(trial);
    },
    move(currentMetric, stepSize) {
      posterior.breakMonth = breakMonth;
      const length = MEAN_LENGTH * (1 + LENGTH_SPREAD * (2 * stream.uniform() - 1));
      const steps = Math.min(Math.max(Math.round(length / stepSize), 1), MAX_STEPS);
      if (stream.uniform() >= CAREFUL_SHARE) return chain.move(currentMetric, stepSize, steps);
      chain.move(currentMetric, CAREFUL_STEP * stepSize, Math.min(steps, CAREFUL_STEPS));
      return null;
    },
    moveBreak() {
      for (let k = 0; breakMonths && k < BREAK_MOVES; k++) tryMonth(breakMonths.first, breakMonths.last);
      posterior.breakMonth = breakMonth;
    },
  };
}
