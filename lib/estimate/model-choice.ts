/**
 * Which models the draws come from, and with what weight: a state-space model, plain or with a yearly cycle, without or with a break.
 *
 * 1. The modes of the plain model, climbed to from the point fits.
 * 2. A yearly cycle (1, 2 or 6 harmonics) where two years of data are there and its evidence beats that of none.
 * 3. Single counts that the model cannot believe are flagged (`flag-counts.ts`).
 * 4. A break in every other month: the evidences give the chance of a break and of each month of it. Months that hang together make one
 *    component; components with a share of the posterior worth sampling are kept, each with its weight (Bayesian model averaging,
 *    Hoeting, Madigan, Raftery & Volinsky 1999).
 * A generator: each `yield` ends a bounded slice of work.
 */
import type { Flag } from './flag-counts';
import { flagCounts } from './flag-counts';
import { findLocalMode, type LocalMode } from './local-mode';
import type { Observations } from './observations';
import { fitInformation, type Mode } from './point-fit';
import type { Posterior } from './posterior';
import type { Priors } from './priors';
import type { Harmonics } from './season';
import {
  createStatePosterior,
  SEGMENT_MONTHS,
  type StateModel,
  type StatePosterior,
} from './state-posterior';
import type { FitOptions } from './types';

export interface ModelComponent {
  posterior: Posterior;
  /** Modes to start chains from, best first. */
  modes: LocalMode[];
  /** Share of the posterior. */
  weight: number;
  /** Months of the break that belong to the component; null: no break. */
  breakMonths: { first: number; last: number } | null;
}

export interface ModelChoice {
  components: ModelComponent[];
  harmonics: Harmonics;
  flags: Flag[];
  /** Posterior chance that parameters jumped once within the series. */
  breakChance: number;
}

/** A yearly cycle needs two years (method of the project). */
export const SEASON_MIN_MONTHS = 24;
const CYCLES: readonly Harmonics[] = [1, 2, 6];

/** A break needs a series long enough to tell one from curvature. */
export const BREAK_MIN_MONTHS = 18;
/** Prior chance of one break within the series: one market in five (common practice: rare, not absurd). */
export const BREAK_PRIOR = 0.2;
/** Months tried for a break at most, evenly spread; every other month in a series of up to five years. */
const MAX_BREAK_TRIES = 30;
const BREAK_STEP = 2;
/** Rounds of a climb, and tries of one slice. */
const TRY_ROUNDS = 2;
const TRIES_PER_SLICE = 6;
/** A chance of a break below this after the first tries is not looked at more closely: it would have to grow sixfold to count. */
const HOPELESS = 0.005;
/** Two months of a break belong to different components when the log evidence between them falls this far below the lower one. */
const VALLEY = 2;

/** Components with a smaller share are left out: their draws would be too few to matter. */
export const MIN_WEIGHT = 0.03;
/** Log density below the best mode at which a mode is left out: it would hold less than one draw in twenty thousand. */
const MODE_DEPTH = 10;
/** Modes closer than this in log density are the same after the climb. */
const SAME_DENSITY = 0.05;

export function* chooseModels(
  observations: Observations,
  priors: Priors,
  floors: FitOptions['measurementFloor'],
  points: readonly Mode[],
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
    let starts = points;
    for (const harmonics of CYCLES) {
      const seasonal = create({ harmonics, hasBreak: false }, []);
      const extended = findLocalMode(seasonal, extend(from.q, seasonal.dimension), information) ?? [];
      // the plain mode bends towards the cycle that it lacks: the point fits may be nearer to the first seasonal one
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
  if (observations.months < BREAK_MIN_MONTHS)
    return { components: [plain], harmonics, flags, breakChance: 0 };
  const broken = create({ harmonics, hasBreak: true }, flags);
  const tries = yield* tryBreaks(broken, modes[0], information);
  return { ...weighBreaks(plain, broken, tries, information), harmonics, flags };
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

interface BreakTries {
  /** In the order of their months. */
  modes: LocalMode[];
  /** Months between two tries. */
  step: number;
  /** Months that a break may be in. */
  possible: number;
}

/** Every other month of those to try first; the ones between them only where a break is not out of the question. */
function* tryBreaks(
  posterior: StatePosterior,
  unbroken: LocalMode,
  information: Float64Array,
): Generator<undefined, BreakTries> {
  const { months } = posterior.observations;
  const possible = months - 2 * SEGMENT_MONTHS + 1;
  const fine = Math.max(BREAK_STEP, Math.ceil(possible / MAX_BREAK_TRIES));
  const start = withSecondSegment(unbroken.q, posterior.dimension);
  const modes: LocalMode[] = [];
  function* tryFrom(first: number, step: number): Generator<undefined> {
    for (let month = first; month <= months - SEGMENT_MONTHS; month += step) {
      posterior.breakMonth = month;
      const mode = findLocalMode(posterior, start, information, TRY_ROUNDS);
      if (mode) modes.push(mode);
      if (modes.length % TRIES_PER_SLICE === 0) yield;
    }
  }
  yield* tryFrom(SEGMENT_MONTHS, 2 * fine);
  const coarse = { modes, step: 2 * fine, possible };
  if (chanceOfBreak(unbroken, coarse) < HOPELESS) return coarse;
  yield* tryFrom(SEGMENT_MONTHS + fine, 2 * fine);
  return { modes: modes.sort((a, b) => a.breakMonth! - b.breakMonth!), step: fine, possible };
}

function chanceOfBreak(unbroken: LocalMode, tries: BreakTries): number {
  const broken = logPriorOfTry(tries) + logSumExp(tries.modes.map((mode) => mode.logEvidence));
  const without = Math.log1p(-BREAK_PRIOR) + unbroken.logEvidence;
  return Math.exp(broken - logSumExp([broken, without]));
}

/** Each try stands for `step` of the months in which a break is possible. */
function logPriorOfTry({ step, possible }: BreakTries): number {
  return Math.log(BREAK_PRIOR) + Math.log(step / possible);
}

/** q with the six parameters of the segment doubled before the seasonal coefficients. */
function withSecondSegment(q: Float64Array, dimension: number): Float64Array {
  const doubled = new Float64Array(dimension);
  const segment = dimension - q.length;
  const base = PLAIN_DIMENSION;
  doubled.set(q.subarray(0, base));
  doubled.set(q.subarray(0, segment), base);
  doubled.set(q.subarray(base), base + segment);
  return doubled;
}

/** Coordinates of the plain model: eight log parameters, two sizes, two process noises. */
const PLAIN_DIMENSION = 12;

/** Posterior weights of the unbroken component and of each group of months of a break. */
function weighBreaks(
  plain: ModelComponent,
  broken: StatePosterior,
  tries: BreakTries,
  information: Float64Array,
): Pick<ModelChoice, 'components' | 'breakChance'> {
  const unbroken = Math.log1p(-BREAK_PRIOR) + plain.modes[0].logEvidence;
  const groups = groupMonths(tries.modes);
  const logs = groups.map((group) => logPriorOfTry(tries) + logSumExp(group.map((mode) => mode.logEvidence)));
  const total = logSumExp([unbroken, ...logs]);
  const weight = Math.exp(unbroken - total);
  const kept: ModelComponent[] = weight >= MIN_WEIGHT ? [{ ...plain, weight }] : [];
  groups.forEach((group, k) => {
    const share = Math.exp(logs[k] - total);
    if (!(share >= MIN_WEIGHT)) return;
    const best = group.reduce((a, b) => (b.logEvidence > a.logEvidence ? b : a));
    broken.breakMonth = best.breakMonth;
    const months = broken.observations.months - SEGMENT_MONTHS;
    kept.push({
      posterior: broken,
      modes: [findLocalMode(broken, best.q, information) ?? best],
      weight: share,
      breakMonths: {
        first: Math.max(group[0].breakMonth! - tries.step + 1, SEGMENT_MONTHS),
        last: Math.min(group[group.length - 1].breakMonth! + tries.step - 1, months),
      },
    });
  });
  if (kept.length === 0) return { components: [plain], breakChance: 0 };
  const sum = kept.reduce((all, component) => all + component.weight, 0);
  return {
    components: kept.map((component) => ({ ...component, weight: component.weight / sum })),
    breakChance: 1 - weight,
  };
}

/** Runs of months in order, cut at valleys of the log evidence deeper than VALLEY on both sides. */
function groupMonths(modes: readonly LocalMode[]): LocalMode[][] {
  const groups: LocalMode[][] = [];
  let from = 0;
  let peak = Number.NEGATIVE_INFINITY;
  let low = Number.POSITIVE_INFINITY;
  let lowAt = 0;
  modes.forEach(({ logEvidence }, i) => {
    if (logEvidence > peak) {
      peak = logEvidence;
      low = logEvidence;
      lowAt = i;
    } else if (logEvidence < low) {
      low = logEvidence;
      lowAt = i;
    }
    if (peak > low + VALLEY && logEvidence > low + VALLEY) {
      groups.push(modes.slice(from, lowAt));
      from = lowAt;
      peak = logEvidence;
      low = logEvidence;
      lowAt = i;
    }
  });
  if (from < modes.length) groups.push(modes.slice(from));
  return groups.filter((group) => group.length > 0);
}

function logSumExp(values: readonly number[]): number {
  const largest = Math.max(...values);
  if (!(largest > Number.NEGATIVE_INFINITY)) return Number.NEGATIVE_INFINITY;
  return largest + Math.log(values.reduce((sum, value) => sum + Math.exp(value - largest), 0));
}
