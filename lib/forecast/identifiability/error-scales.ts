/**
 * The plain least-squares fit with errors on the log scale and on the scale of the counts: which of them is right, the data seldom tell, and
 * the outcome may hang on it (Pascual & Kareiva 1996, Ecology 77:337). The months from which both firms are there.
 */
import type { Outcome as DynamicOutcome } from '../../dynamics/outcome';
import type { Observations } from '../../estimate/observations';
import { fitPlainInSteps, type PlainFit } from '../../estimate/plain-fit';
import { type ErrorScale, PLAIN_PARAMETER_COUNT, type PlainSeries } from '../../estimate/plain-problem';
import { isUsableTermination } from '../../numeric/termination';
import type { MonthlySeries } from '../../series/types';
import type { IdentifiabilityReport, Verdict } from './report';

/** Starts of each fit; the regression among them is mostly at the best value already. */
const STARTS = 3;
/** Evaluations after which no further start is tried: several times what counts of a market take. */
const MAX_WORK = 1000;
/** Fewer counts beyond the parameters leave nothing to judge a fit by. */
const SPARE_COUNTS = 4;

const OUTCOME_IDS: Record<DynamicOutcome, Verdict['outcome']> = {
  coexistence: 'coexistence',
  exclusionByFirst: 'exclusionByFocal',
  exclusionBySecond: 'exclusionByRival',
  headStartDecides: 'headStartDecides',
  boundary: 'boundary',
};

/** @returns null when too few months have both firms */
export function readPlainSeries(series: MonthlySeries, observations: Observations): PlainSeries | null {
  const from =
    observations.skippedMonths + Math.max(observations.firms[0].entry, observations.firms[1].entry);
  const usable = (count: number | null) =>
    count !== null && count > 0 && count < Number.POSITIVE_INFINITY ? count : null;
  // once a firm has left, the other one tells nothing more of the contest
  const to =
    observations.skippedMonths +
    Math.min(...observations.firms.map(({ exit }) => exit ?? observations.months));
  const first = series.focal.slice(from, to).map(usable);
  const second = series.rival.slice(from, to).map(usable);
  const counts = [...first, ...second].filter((count) => count !== null).length;
  if (
    counts < PLAIN_PARAMETER_COUNT + SPARE_COUNTS ||
    first.every((c) => c === null) ||
    second.every((c) => c === null)
  )
    return null;
  return { times: first.map((_, t) => t), first, second };
}

/** A generator that yields after every bounded piece of work. */
export function fitScale(
  series: PlainSeries,
  errorScale: ErrorScale,
  seed: number,
): Generator<void, PlainFit> {
  return fitPlainInSteps(series, { errorScale, starts: STARTS, seed, maxWork: MAX_WORK });
}

/** @returns null where a fit found nothing finite */
export function compareScales(log: PlainFit, raw: PlainFit): IdentifiabilityReport['errorScales'] {
  if (!(log.rss < Number.POSITIVE_INFINITY && raw.rss < Number.POSITIVE_INFINITY)) return null;
  const verdicts = { log: toVerdict(log), raw: toVerdict(raw) };
  const outcomes = [verdicts.log.outcome, verdicts.raw.outcome];
  const isSaid = outcomes.every((outcome) => outcome !== 'notIdentified' && outcome !== 'boundary');
  return { ...verdicts, disagree: isSaid && outcomes[0] !== outcomes[1] };
}

/** A fit that did not settle identifies nothing. */
function toVerdict({ status, outcome, alpha, beta, k1, k2 }: PlainFit): Verdict {
  if (outcome === 'notIdentified' || !isUsableTermination(status)) {
    return { outcome: 'notIdentified', alpha, beta, k1, k2 };
  }
  return { outcome: OUTCOME_IDS[outcome], alpha, beta, k1, k2 };
}
