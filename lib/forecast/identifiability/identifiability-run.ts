/**
 * What the data can and cannot tell of a fitted market, as a resumable run: error scales, profile intervals, collinearity, sign pattern,
 * months until the data decide, sensitivity.
 */
import { SMALLEST_ERROR } from '../../estimate/ar1-posterior';
import { gridOf, type Observations, readObservations } from '../../estimate/observations';
import { PARAMETERS } from '../../estimate/parameters';
import type { PlainFit } from '../../estimate/plain-fit';
import { createPlainProblem, type PlainSeries } from '../../estimate/plain-problem';
import { buildPriors } from '../../estimate/priors';
import { isUsableTermination } from '../../numeric/termination';
import { type AnalysisInput, type AnalysisProgress, type AnalysisRun, runFromSteps } from '../analysis-run';
import { computeCollinearity } from './collinearity';
import { analyseDecision } from './decide-months';
import { compareScales, fitScale, readPlainSeries } from './error-scales';
import { toPlainTheta } from './plain-point';
import { profileInSteps } from './profile-interval';
import type { IdentifiabilityReport } from './report';
import { computeSensitivity } from './sensitivity';
import { computeSignPatternInSteps } from './sign-pattern';

/** The series cannot be fitted: it has no analysis either. */
export type IdentifiabilityFailure = 'not-fitted';

const PROFILED = ['alpha', 'beta', 'k1', 'k2'] as const;
/** Counted parts besides the futures: two plain fits, the profiles, signs, collinearity, sensitivity. */
const PARTS = 2 + PROFILED.length + 3;
/** Futures count in tens, so that the parts move the bar alike. */
const FUTURE_PARTS = 30;
const TOTAL = PARTS + FUTURE_PARTS;

type Steps<Result> = Generator<AnalysisProgress, Result>;

export function createIdentifiabilityRun(
  input: AnalysisInput,
): AnalysisRun<IdentifiabilityReport, IdentifiabilityFailure> {
  return runFromSteps(runIdentifiability(input));
}

function* runIdentifiability(
  input: AnalysisInput,
): Steps<{ result: IdentifiabilityReport } | { failure: IdentifiabilityFailure }> {
  const reading = readObservations(input.series);
  if (!reading.ok) return { failure: 'not-fitted' };
  const { observations } = reading;
  const { draws, options, report } = input;
  yield { done: 0, total: TOTAL };
  const plain = yield* runPlain(input, observations);
  const signPattern = yield* standAt(
    2 + PROFILED.length,
    computeSignPatternInSteps({
      observations,
      priors: buildPriors(observations, options),
      floors: floorsOf(input),
      point: pointOf(input),
      seed: options.seed,
    }),
  );
  yield { done: PARTS - 2, total: TOTAL };
  const decision = yield* runDecision(input);
  return {
    result: {
      ...plain,
      signPattern,
      decision,
      collinearity: collinearityOf(input, observations),
      sensitivity: computeSensitivity(draws, report.outlook.horizonMonths),
    },
  };
}

/** Runs one part to its end, its slices reported as so many parts done. */
function* standAt<Result>(done: number, part: Generator<void, Result>): Steps<Result> {
  for (;;) {
    const step = part.next();
    if (step.done) return step.value;
    yield { done, total: TOTAL };
  }
}

/** The parts that rest on the plain least-squares fit; null for a series with too few months of both firms. */
function* runPlain(
  { series, options }: AnalysisInput,
  observations: Observations,
): Steps<Pick<IdentifiabilityReport, 'errorScales' | 'profiles'>> {
  const plainSeries = readPlainSeries(series, observations);
  if (!plainSeries) return { errorScales: null, profiles: null };
  const log = yield* standAt(0, fitScale(plainSeries, 'log', options.seed));
  const raw = yield* standAt(1, fitScale(plainSeries, 'raw', options.seed));
  yield { done: 2, total: TOTAL };
  const profiles = isUsableTermination(log.status) ? yield* runProfiles(plainSeries, log) : null;
  return { errorScales: compareScales(log, raw), profiles };
}

function* runProfiles(series: PlainSeries, fit: PlainFit): Steps<IdentifiabilityReport['profiles']> {
  const problem = createPlainProblem(series, 'log');
  const best = toPlainTheta(fit, problem.scales);
  const profiles: NonNullable<IdentifiabilityReport['profiles']> = [];
  for (const quantity of PROFILED) {
    if (!existsIn(fit, quantity)) continue;
    const steps = profileInSteps(problem, best, fit.rss, quantity);
    const profile = yield* standAt(2 + profiles.length, steps);
    if (profile) profiles.push({ ...profile, quantity });
  }
  return profiles.length > 0 ? profiles : null;
}

/** A firm that does not grow alone has no saturation level, and shares of room mean nothing beside it. */
function existsIn({ growsAlone: [first, second] }: PlainFit, quantity: (typeof PROFILED)[number]): boolean {
  if (quantity === 'k1') return first;
  return quantity === 'k2' ? second : first && second;
}

function* runDecision({ draws, options }: AnalysisInput): Steps<IdentifiabilityReport['decision']> {
  const steps = analyseDecision(draws, options.seed);
  for (;;) {
    const { done, value } = steps.next();
    if (done) return value;
    yield { done: PARTS - 2 + Math.floor((value.done / value.total) * FUTURE_PARTS), total: TOTAL };
  }
}

function floorsOf({ options: { measurementFloor } }: AnalysisInput): [number, number] {
  return [Math.max(measurementFloor.focal, SMALLEST_ERROR), Math.max(measurementFloor.rival, SMALLEST_ERROR)];
}

function pointOf({ report: { point } }: AnalysisInput): number[] {
  return PARAMETERS.map(({ id }) => point[id]);
}

function collinearityOf(
  input: AnalysisInput,
  observations: Observations,
): IdentifiabilityReport['collinearity'] {
  const { errors } = input.report;
  return computeCollinearity(
    Float64Array.from(pointOf(input), Math.log),
    { ...gridOf(observations), observed: [observations.firms[0].months, observations.firms[1].months] },
    [errors.focal.q50, errors.rival.q50],
  );
}
