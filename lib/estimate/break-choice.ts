/**
 * Whether and when parameters jumped within the series, by evidence.
 *
 * A break in every other month is tried where the series is long enough; months that hang together make one component. A month that
 * somebody marked (a price change, a relaunch) is a component of its own: the month is known and not sampled. At most one of all these
 * breaks is in force in a draw. Components with a share of the posterior worth sampling are kept, each with its weight (Bayesian model
 * averaging, Hoeting, Madigan, Raftery & Volinsky 1999). Before the data: MARKED_PRIOR that the jump was at a marked month, each alike; of
 * the rest BREAK_PRIOR that there was one in another month, each alike.
 */
import { estimateEvidence, findLocalMode, followMode, type LocalMode } from './local-mode';
import type { Posterior } from './posterior';
import { SEGMENT_MONTHS, type StatePosterior } from './state-posterior';

export interface ModelComponent {
  posterior: Posterior;
  /** Modes to start chains from, best first. */
  modes: LocalMode[];
  /** Share of the posterior. */
  weight: number;
  /** Months of the break that belong to the component; null: no break. */
  breakMonths: { first: number; last: number } | null;
}

/** A break needs a series long enough to tell one from curvature. */
const BREAK_MIN_MONTHS = 18;
/** Prior chance of one break within the series: one market in five (common practice: rare, not absurd). */
const BREAK_PRIOR = 0.2;
/** Months tried for a break at most, evenly spread; every other month in a series of up to five years. */
const MAX_BREAK_TRIES = 30;
const BREAK_STEP = 2;
/** Rounds of a climb, and tries of one slice. */
const TRY_ROUNDS = 2;
const TRIES_PER_SLICE = 6;
/** Months climbed to whatever the estimates say. */
const CLIMBED = 3;
/** A chance of a break below this after the first tries is not looked at more closely: it would have to grow sixfold to count. */
const HOPELESS = 0.002;
/** Two months of a break belong to different components when the log evidence between them falls this far below the lower one. */
const VALLEY = 2;

/** Components with a smaller share are left out: their draws would be too few to matter. */
const MIN_WEIGHT = 0.05;

/** Prior chance that parameters jumped at one of the marked months: somebody saw a reason, which is as often right as wrong. */
const MARKED_PRIOR = 0.5;

/** A marked month of the grid, and the posterior chance that parameters jumped in it. */
export interface MarkedBreak {
  month: number;
  chance: number;
}

export interface BreakChoice {
  components: ModelComponent[];
  /** Posterior chance that parameters jumped once within the series, in a month that nobody marked. */
  breakChance: number;
  markedBreaks: MarkedBreak[];
}

/**
 * @param marked months of the grid from which parameters may differ, each with at least one month on both sides
 * @param information J'J of the point fit
 */
export function* chooseBreaks(
  plain: ModelComponent,
  broken: StatePosterior,
  marked: readonly number[],
  information: Float64Array,
): Generator<undefined, BreakChoice> {
  const unbroken = plain.modes[0];
  const start = withSecondSegment(unbroken.q, broken.dimension);
  const atMarks: LocalMode[] = [];
  for (const month of marked) {
    broken.breakMonth = month;
    const mode = findLocalMode(broken, start, information);
    if (mode) atMarks.push(mode);
    yield;
  }
  const isLong = broken.observations.months >= BREAK_MIN_MONTHS;
  const tries = isLong ? yield* tryBreaks(broken, unbroken, information) : NO_TRIES;
  return weighBreaks(plain, broken, tries, atMarks, information);
}

const NO_TRIES: BreakTries = { modes: [], step: 1, possible: 1 };

interface BreakTries {
  /** In the order of their months. */
  modes: LocalMode[];
  /** Months between two tries. */
  step: number;
  /** Months that a break may be in. */
  possible: number;
}

/** Every fourth month first, in a rough way; every other one only where a break is not out of the question. */
function* tryBreaks(
  posterior: StatePosterior,
  unbroken: LocalMode,
  information: Float64Array,
): Generator<undefined, BreakTries> {
  const possible = posterior.observations.months - 2 * SEGMENT_MONTHS + 1;
  const fine = Math.max(BREAK_STEP, Math.ceil(possible / MAX_BREAK_TRIES));
  const start = withSecondSegment(unbroken.q, posterior.dimension);
  const months = posterior.observations.months - SEGMENT_MONTHS;
  const estimates: number[] = [];
  for (let month = SEGMENT_MONTHS; month <= months; month += 2 * fine) {
    posterior.breakMonth = month;
    estimates.push(estimateEvidence(posterior, start, information));
  }
  yield;
  // what a slope promises from far off is checked by climbing where it promises most; the other places promise too much likewise
  const found = new Map<number, number>();
  let excess = Number.POSITIVE_INFINITY;
  const order = Array.from(estimates.keys()).sort((a, b) => estimates[b] - estimates[a]);
  for (const k of order.slice(0, CLIMBED)) {
    posterior.breakMonth = SEGMENT_MONTHS + 2 * fine * k;
    const mode = findLocalMode(posterior, start, information, TRY_ROUNDS);
    if (mode) {
      excess = Math.min(excess, Math.max(estimates[k] - mode.logEvidence, 0));
      found.set(k, mode.logEvidence);
    }
    yield;
  }
  const logEvidences = estimates.map(
    (estimate, k) => found.get(k) ?? estimate - (found.size > 0 ? excess : 0),
  );
  const coarse = { logEvidences, step: 2 * fine, possible };
  if (chanceOfBreak(unbroken, coarse) < HOPELESS) return NO_TRIES;
  const modes: LocalMode[] = [];
  for (let month = SEGMENT_MONTHS; month <= months; month += fine) {
    posterior.breakMonth = month;
    const before = modes[modes.length - 1];
    const isNear = before && posterior.logDensity(before.q, null) > posterior.logDensity(start, null);
    const mode =
      (isNear && followMode(posterior, before, 1)) ||
      findLocalMode(posterior, start, information, TRY_ROUNDS);
    if (mode) modes.push(mode);
    if (modes.length % TRIES_PER_SLICE === 0) yield;
  }
  return { modes, step: fine, possible };
}

/** Without the marked months: whether the others are worth a closer look. */
function chanceOfBreak(
  unbroken: LocalMode,
  tries: Pick<BreakTries, 'step' | 'possible'> & { logEvidences: readonly number[] },
): number {
  const broken = logPriorOfTry(tries) + logSumExp(tries.logEvidences);
  const without = Math.log1p(-BREAK_PRIOR) + unbroken.logEvidence;
  return Math.exp(broken - logSumExp([broken, without]));
}

/** Each try stands for `step` of the months in which a break is possible. */
function logPriorOfTry({ step, possible }: Pick<BreakTries, 'step' | 'possible'>): number {
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

/** Posterior weights of the unbroken component, of each group of months of a break and of each marked month. */
function weighBreaks(
  plain: ModelComponent,
  broken: StatePosterior,
  tries: BreakTries,
  atMarks: readonly LocalMode[],
  information: Float64Array,
): BreakChoice {
  const logUnmarked = atMarks.length > 0 ? Math.log1p(-MARKED_PRIOR) : 0;
  const hasTries = tries.modes.length > 0;
  const unbroken = logUnmarked + (hasTries ? Math.log1p(-BREAK_PRIOR) : 0) + plain.modes[0].logEvidence;
  const groups = groupMonths(tries.modes);
  const logGroups = groups.map(
    (group) => logUnmarked + logPriorOfTry(tries) + logSumExp(group.map((mode) => mode.logEvidence)),
  );
  const logMarks = atMarks.map((mode) => Math.log(MARKED_PRIOR / atMarks.length) + mode.logEvidence);
  const total = logSumExp([unbroken, ...logGroups, ...logMarks]);
  const chanceOf = (log: number) => Math.exp(log - total);
  const found: ModelComponent[] = [
    { ...plain, weight: chanceOf(unbroken) },
    ...atMarks.map((mode, k) => toComponent(broken, [mode], chanceOf(logMarks[k]), 1, information)),
    ...groups.map((group, k) => toComponent(broken, group, chanceOf(logGroups[k]), tries.step, information)),
  ];
  const kept = found.filter(({ weight }) => weight >= MIN_WEIGHT);
  const components = kept.length > 0 ? kept : [{ ...plain, weight: 1 }];
  const sum = components.reduce((all, component) => all + component.weight, 0);
  return {
    components: components.map((component) => ({ ...component, weight: component.weight / sum })),
    breakChance:
      kept.length > 0
        ? Math.min(
            1,
            logGroups.reduce((all, log) => all + chanceOf(log), 0),
          )
        : 0,
    markedBreaks: atMarks.map((mode, k) => ({ month: mode.breakMonth!, chance: chanceOf(logMarks[k]) })),
  };
}

/** Months that hang together as a component; those between two tries belong to the nearer one. */
function toComponent(
  broken: StatePosterior,
  group: readonly LocalMode[],
  weight: number,
  step: number,
  information: Float64Array,
): ModelComponent {
  const best = group.reduce((a, b) => (b.logEvidence > a.logEvidence ? b : a));
  broken.breakMonth = best.breakMonth;
  const isKnown = step === 1;
  const reach = step - 1;
  const last = broken.observations.months - SEGMENT_MONTHS;
  return {
    posterior: broken,
    modes: [weight >= MIN_WEIGHT ? (findLocalMode(broken, best.q, information) ?? best) : best],
    weight,
    breakMonths: isKnown
      ? { first: best.breakMonth!, last: best.breakMonth! }
      : {
          first: Math.max(group[0].breakMonth! - reach, SEGMENT_MONTHS),
          last: Math.min(group[group.length - 1].breakMonth! + reach, last),
        },
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
