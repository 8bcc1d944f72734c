/**
 * The backtest as a resumable run: from each origin all methods forecast the months that were then hidden; the scores say who did better.
 * Nothing that happened after an origin reaches its forecasts. The own model is fitted whole at each origin, as it would have been then.
 */
import { ENGINE_VERSION } from '../../estimate/engine-version';
import type { FitInput } from '../../estimate/types';
import type { AnalysisInput, AnalysisProgress, AnalysisRun } from '../analysis-run';
import { runFromSteps } from '../analysis-run';
import { createOutlookRun } from '../outlook-run';
import { type Case, listCases } from './cases';
import {
  forecastOwn,
  forecastSimple,
  type MembersByMethod,
  type MethodMembers,
  memberQuantile,
  mixMembers,
} from './members';
import { cutSeries, MIN_ORIGINS, planOrigins } from './origins';
import { type BacktestReport, type Combination, METHODS, type Method, SIMPLE_METHODS } from './report';
import { compareMethods, scoreCombination, scoreMethods } from './score-cases';

export type BacktestFailure =
  /** Fewer than MIN_ORIGINS past months from which a forecast could be checked. */
  | 'too-few-origins'
  /** The own model gave a forecast at fewer than MIN_ORIGINS of them. */
  | 'too-few-forecasts';

const NO_FORECAST: MethodMembers = [null, null];

type Progress = AnalysisProgress;
type End = { result: BacktestReport } | { failure: BacktestFailure };

/** @param createRun how the own model is fitted */
export function createBacktestRun(
  input: AnalysisInput,
  createRun = createOutlookRun,
): AnalysisRun<BacktestReport, BacktestFailure> {
  return runFromSteps(runBacktest(input, createRun));
}

function* runBacktest(input: AnalysisInput, createRun: typeof createOutlookRun): Generator<Progress, End> {
  const { series, options } = input;
  const plan = planOrigins(series);
  if (!plan.ok) return { failure: plan.code };
  const { horizons, trainings } = plan;
  const months = horizons[horizons.length - 1];
  const total = trainings.length * METHODS.length;
  const cases: Case[] = [];
  const answered: number[] = [];
  for (const [origin, training] of trainings.entries()) {
    const cut = { series: cutSeries(series, training), options: { ...options, horizonMonths: months } };
    const done = origin * METHODS.length;
    const competition = yield* runOwn(cut, months, createRun, { done, total });
    yield { done: done + 1, total };
    const forecasts = forecastAll(competition, cut.series, months);
    const found = listCases(series, { origin, training, forecasts }, horizons);
    if (found.length > 0) answered.push(training);
    cases.push(...found);
    yield { done: done + METHODS.length, total };
  }
  if (answered.length < MIN_ORIGINS) return { failure: 'too-few-forecasts' };
  const scores = scoreMethods(cases, horizons);
  const pooled = scoreCombination(cases, horizons);
  const monthsBetween = (answered[answered.length - 1] - answered[0]) / (answered.length - 1);
  return {
    result: {
      engineVersion: ENGINE_VERSION,
      origins: {
        possible: plan.possible,
        used: answered.length,
        failed: trainings.length - answered.length,
        firstTraining: answered[0],
        lastTraining: answered[answered.length - 1],
      },
      horizons,
      scores: [...scores, ...(pooled?.scores ?? [])],
      comparisons: compareMethods(cases, scores, monthsBetween),
      combination: pooled && {
        ...pooled.combination,
        forecast: pooled.combination.isBetter
          ? combineForecasts(input, months, pooled.combination.weights)
          : null,
      },
    },
  };
}

/** The own model's forecast as it would have been at the origin; none where the fit has no result. */
function* runOwn(
  cut: FitInput,
  months: number,
  createRun: typeof createOutlookRun,
  progress: Progress,
): Generator<Progress, MethodMembers> {
  const run = createRun(cut);
  for (;;) {
    const step = run.next();
    if (step.done) return 'failure' in step ? NO_FORECAST : forecastOwn(step.draws, months, cut.options.seed);
    yield progress;
  }
}

function forecastAll(
  competition: MethodMembers,
  series: FitInput['series'],
  months: number,
): MembersByMethod {
  const simple = SIMPLE_METHODS.map((method) => [method, forecastSimple(method, series, months)]);
  return { competition, ...Object.fromEntries(simple) };
}

/** The combined forecast from today; null when a method with weight gives none. */
function combineForecasts(
  { series, options, draws }: AnalysisInput,
  months: number,
  weights: Combination['weights'],
): Combination['forecast'] {
  const forecasts = forecastAll(forecastOwn(draws, months, options.seed), series, months);
  const used = weights.filter(({ weight }) => weight > 0);
  const bands = ([0, 1] as const).map((firm) => {
    const parts = used.map(({ method, weight }) => ({ months: forecasts[method as Method][firm], weight }));
    if (parts.some((part) => part.months === null)) return null;
    const mixed = Array.from({ length: months }, (_, h) =>
      mixMembers(parts.map((part) => ({ members: part.months![h], weight: part.weight }))),
    );
    const at = (p: number) => mixed.map((members) => Math.exp(memberQuantile(members, p)));
    return { q05: at(0.05), q25: at(0.25), q50: at(0.5), q75: at(0.75), q95: at(0.95) };
  });
  const [focal, rival] = bands;
  return focal && rival ? { focal, rival } : null;
}
