/**
 * Which models the draws come from, and with what weight: a state-space model, plain or with a yearly cycle, without or with a break.
 *
 * 1. The modes of the plain model, climbed to from the point fits.
 * 2. A yearly cycle (1, 2 or 6 harmonics) where two years of data are there and its evidence beats that of none.
 * 3. Single counts that the model cannot believe are flagged (`flag-counts.ts`).
 * 4. A break in any month, marked or not, by evidence (`break-choice.ts`).
 * A generator: each `yield` ends a bounded slice of work.
 */
import { type BreakChoice, chooseBreaks, type ModelComponent } from './break-choice';
import type { Flag } from './flag-counts';
import { flagCounts } from './flag-counts';
import { findLocalMode, type LocalMode } from './local-mode';
import type { Observations } from './observations';
import { fitInformation, type Mode } from './point-fit';
import type { Posterior } from './posterior';
import type { Priors } from './priors';
import type { Harmonics } from './season';
import { createStatePosterior, type StateModel } from './state-posterior';
import type { FitOptions } from './types';

export interface ModelChoice extends BreakChoice {
  harmonics: Harmonics;
  flags: Flag[];
}

/** A yearly cycle needs two years (method of the project). */
export const SEASON_MIN_MONTHS = 24;
const CYCLES: readonly Harmonics[] = [1, 2, 6];

/** Log density below the best mode at which a mode is left out: it would hold less than one draw in twenty thousand. */
const MODE_DEPTH = 10;
/** Modes closer than this in log density are the same after the climb. */
const SAME_DENSITY = 0.05;

/** @param marked months of the grid from which parameters may differ */
export function* chooseModels(
  observations: Observations,
  priors: Priors,
  floors: FitOptions['measurementFloor'],
  points: readonly Mode[],
  marked: readonly number[],
): Generator<undefined, ModelChoice | null> {
  const create = (model: StateModel, flags: readonly Flag[]) => {
    const posterior = createStatePosterior(observations, priors, floors, model);
    for (const { firm, month } of flags) posterior.flags[(firm - 1) * observations.months + month] = 1;
    return posterior;
  };
  const information = fitInformation(points[0]);
  let posterior = create({ harmonics: 0, hasBreak: false }, []);
  let modes = climbFrom(posterior, points);
  if (modes.length === 0) return null;
  yield;

  if (observations.months >= SEASON_MIN_MONTHS) {
    let from = modes[0];
    // the plain mode bends towards the cycle that it lacks: the point fit may be nearer to the first seasonal one
    let starts = points.slice(0, 1);
    for (const harmonics of CYCLES) {
      const seasonal = create({ harmonics, hasBreak: false }, []);
      const start = extend(from.q, seasonal.dimension);
      const extended = findLocalMode(seasonal, start, information) ?? [];
      const found = rankModes([extended, climbFrom(seasonal, starts)].flat());
      starts = [];
      if (found.length === 0) continue;
      from = found[0];
      if (!(from.logEvidence > modes[0].logEvidence)) continue;
      posterior = seasonal;
      modes = found;
      yield;
    }
    yield;
  }

  const flags = flagCounts(posterior, modes[0].q);
  if (flags.length > 0) {
    posterior = create(posterior.model, flags);
    modes = modes.flatMap((mode) => findLocalMode(posterior, mode.q, information) ?? []);
    if (modes.length === 0) return null;
  }
  yield;

  const { harmonics } = posterior.model;
  const plain: ModelComponent = { posterior, modes, weight: 1, breakMonths: null };
  const broken = create({ harmonics, hasBreak: true }, flags);
  const breaks = yield* chooseBreaks(plain, broken, marked, information);
  return { ...breaks, harmonics, flags };
}

/** Modes of a posterior near enough to the best one, best first, climbed to from point fits. */
export function climbFrom(posterior: Posterior, points: readonly Mode[]): LocalMode[] {
  return rankModes(
    points.flatMap(
      (point) =>
        findLocalMode(posterior, posterior.place(point.theta, point.errors), fitInformation(point)) ?? [],
    ),
  );
}

/** Distinct modes of one posterior by density; those of no weight are left out. */
function rankModes(modes: readonly LocalMode[]): LocalMode[] {
  const ranked = [...modes].sort((a, b) => b.density - a.density);
  return ranked.filter((mode, i) => {
    const isNear = mode.density > ranked[0].density - MODE_DEPTH;
    return isNear && (i === 0 || ranked[i - 1].density - mode.density > SAME_DENSITY);
  });
}

/** The coordinates that a larger model adds begin at 0 (seasonal coefficients). */
function extend(q: Float64Array, dimension: number): Float64Array {
  const longer = new Float64Array(dimension);
  longer.set(q);
  return longer;
}
