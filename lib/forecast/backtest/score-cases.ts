/** From cases to scores, comparisons and the combination of a backtest. */
import { testDieboldMariano } from '../diebold-mariano';
import { coverage, ensembleCrps, type IntervalForecast, intervalScore, mase, mean } from '../scores';
import { type Case, listCompleteMethods } from './cases';
import { memberQuantile, mixMembers } from './members';
import {
  type Combination,
  type Comparison,
  METHODS,
  type Method,
  type ScoreRow,
  SIMPLE_METHODS,
} from './report';
import { casePoolCrps, type Stacking, stack } from './stacking';

interface Scored extends Pick<Case, 'actual' | 'naiveScale'> {
  members: Float64Array;
  crps: number;
}

/** Rows of every method that gave a forecast at all, horizon by horizon. */
export function scoreMethods(cases: readonly Case[], horizons: readonly number[]): ScoreRow[] {
  const complete = listCompleteMethods(cases);
  return horizons.flatMap((horizonMonths) =>
    METHODS.flatMap((method) => {
      const scored = cases
        .filter((item) => item.horizonMonths === horizonMonths)
        .flatMap(({ actual, naiveScale, members }) => {
          const found = members[method];
          return found ? [{ actual, naiveScale, members: found, crps: ensembleCrps(found, actual) }] : [];
        });
      if (scored.length === 0) return [];
      return [{ method, horizonMonths, isComplete: complete.includes(method), ...score(scored) }];
    }),
  );
}

function score(scored: readonly Scored[]) {
  const [inner, outer] = [0.5, 0.1].map((alpha) => scored.map(({ members }) => intervalOf(members, alpha)));
  const actual = scored.map((item) => item.actual);
  const median = scored.map(({ members }) => memberQuantile(members, 0.5));
  const scaled = scored.flatMap(({ naiveScale }, i) =>
    naiveScale === null ? [] : [mase([Math.exp(actual[i])], [Math.exp(median[i])], naiveScale)],
  );
  return {
    cases: scored.length,
    absoluteLogError: mean(actual.map((y, i) => Math.abs(y - median[i]))),
    mase: scaled.length > 0 ? mean(scaled) : null,
    crps: mean(scored.map((item) => item.crps)),
    intervalScore90: mean(actual.map((y, i) => intervalScore(outer[i], y))),
    coverage50: coverage(inner, actual),
    coverage90: coverage(outer, actual),
  };
}

function intervalOf(members: Float64Array, alpha: number): IntervalForecast {
  return { low: memberQuantile(members, alpha / 2), high: memberQuantile(members, 1 - alpha / 2), alpha };
}

/**
 * The own model against the best complete simple method, horizon by horizon; horizons without one are left out.
 * @param monthsBetween mean distance of neighbouring origins
 */
export function compareMethods(
  cases: readonly Case[],
  scores: readonly ScoreRow[],
  monthsBetween: number,
): Comparison[] {
  const horizons = [...new Set(scores.map((row) => row.horizonMonths))];
  return horizons.flatMap((horizonMonths) => {
    const rows = scores.filter((row) => row.horizonMonths === horizonMonths && row.isComplete);
    const best = SIMPLE_METHODS.map((method) => rows.find((row) => row.method === method))
      .filter((row) => row !== undefined)
      .reduce<ScoreRow | null>((lowest, row) => (lowest && lowest.crps <= row.crps ? lowest : row), null);
    if (!best) return [];
    const bestSimple = best.method as Method;
    const differences = differencesByOrigin(cases, horizonMonths, bestSimple);
    const overlap = Math.max(1, Math.ceil(horizonMonths / monthsBetween));
    return [{ horizonMonths, bestSimple, ...testDieboldMariano(differences, overlap) }];
  });
}

/** CRPS of the own model less that of the other, mean over the firms, origin by origin in order of time. */
function differencesByOrigin(cases: readonly Case[], horizonMonths: number, other: Method): number[] {
  const byOrigin = new Map<number, number[]>();
  for (const { origin, horizonMonths: horizon, actual, members } of cases) {
    if (horizon !== horizonMonths) continue;
    const difference = ensembleCrps(members.competition!, actual) - ensembleCrps(members[other]!, actual);
    byOrigin.set(origin, [...(byOrigin.get(origin) ?? []), difference]);
  }
  return [...byOrigin].sort(([a], [b]) => a - b).map(([, differences]) => mean(differences));
}

export interface CombinationScores {
  combination: Omit<Combination, 'forecast'>;
  /** Rows of the combination, each case with the weights learnt without its origin. */
  scores: ScoreRow[];
}

/** null: fewer than two methods are complete, or fewer than two origins gave cases. */
export function scoreCombination(
  cases: readonly Case[],
  horizons: readonly number[],
): CombinationScores | null {
  const methods = listCompleteMethods(cases);
  const isPossible = methods.length >= 2 && new Set(cases.map(({ origin }) => origin)).size >= 2;
  if (!isPossible) return null;
  const stacking = stack(cases.map((item) => toStackingCase(item, methods)));
  const best = stacking.single.indexOf(Math.min(...stacking.single));
  return {
    combination: {
      weights: methods.map((method, k) => ({ method, weight: Math.min(1, stacking.weights[k]) })),
      crps: stacking.leftOut,
      bestSingle: methods[best],
      bestSingleCrps: stacking.single[best],
      isBetter: stacking.leftOut < stacking.single[best],
    },
    scores: scorePool(cases, horizons, methods, stacking),
  };
}

function toStackingCase({ origin, actual, members }: Case, methods: readonly Method[]) {
  return { group: origin, actual, members: methods.map((method) => members[method]!) };
}

function scorePool(
  cases: readonly Case[],
  horizons: readonly number[],
  methods: readonly Method[],
  { weightsWithout }: Stacking,
): ScoreRow[] {
  return horizons.flatMap((horizonMonths) => {
    const scored = cases
      .filter((item) => item.horizonMonths === horizonMonths)
      .map((item) => {
        const weights = weightsWithout.get(item.origin)!;
        const members = mixMembers(
          methods.map((method, k) => ({ members: item.members[method]!, weight: weights[k] })),
        );
        return { ...item, members, crps: casePoolCrps(toStackingCase(item, methods), weights) };
      });
    if (scored.length === 0) return [];
    return [{ method: 'combination' as const, horizonMonths, isComplete: true, ...score(scored) }];
  });
}
